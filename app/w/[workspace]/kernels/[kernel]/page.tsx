import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { requireMember } from '@/app/_server/access';
import { KernelEditor } from '@/components/kernel-editor/kernel-editor';
import { database } from '@/db/client';
import { getKernelDraft } from '@/db/queries/kernels';
import { parseId } from '@/lib/ids';
import { roleReaches } from '@/lib/roles';
import { createKernelAction, keepKernelVersionAction, saveKernelDraftAction } from '../actions';

interface KernelPageProps {
  params: Promise<{ workspace: string; kernel: string }>;
}

async function findKernel(params: KernelPageProps['params']) {
  const { workspace: slug, kernel } = await params;
  const { workspace, role } = await requireMember(slug);
  const kernelId = parseId('kernel', kernel);
  const draft = kernelId && (await getKernelDraft(database(), { workspaceId: workspace.id, kernelId }));
  if (!draft) notFound();
  return { slug, role, draft };
}

export async function generateMetadata({ params }: KernelPageProps): Promise<Metadata> {
  const { draft } = await findKernel(params);
  return { title: draft.name };
}

export default async function KernelPage({ params }: KernelPageProps) {
  const { slug, role, draft } = await findKernel(params);
  const readOnlyReason = !roleReaches(role, 'editor')
    ? `read only: your role here is ${role}`
    : draft.archivedAt
      ? 'archived: restore it in the list to change it'
      : null;
  return (
    <KernelEditor
      key={draft.id}
      places={{ workspace: slug, kernelId: draft.id }}
      document={draft.document}
      revision={draft.revision}
      savedAt={draft.updatedAt.toISOString()}
      readOnlyReason={readOnlyReason}
      calls={{
        save: saveKernelDraftAction,
        create: createKernelAction,
        keepVersion: keepKernelVersionAction,
      }}
    />
  );
}
