import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { requireMember } from '@/app/_server/access';
import { VersionView } from '@/components/kernel-editor/versions/version-view';
import { database } from '@/db/client';
import { getKernelVersionByNumber } from '@/db/queries/kernel-versions';
import { parseId } from '@/lib/ids';

interface VersionPageProps {
  params: Promise<{ workspace: string; kernel: string; number: string }>;
}

async function findVersion(params: VersionPageProps['params']) {
  const { workspace: slug, kernel, number } = await params;
  const { workspace } = await requireMember(slug);
  const kernelId = parseId('kernel', kernel);
  if (!kernelId || !/^[1-9]\d{0,8}$/.test(number)) notFound();
  const of = { workspaceId: workspace.id, kernelId, number: Number(number) };
  const version = await getKernelVersionByNumber(database(), of);
  if (!version) notFound();
  return { slug, version };
}

export async function generateMetadata({ params }: VersionPageProps): Promise<Metadata> {
  const { version } = await findVersion(params);
  return { title: `${version.document.name}, version ${version.number}` };
}

export default async function VersionPage({ params }: VersionPageProps) {
  const { slug, version } = await findVersion(params);
  const { number, label, opCount, edgeCount, createdByName, createdAt } = version;
  return (
    <VersionView
      places={{ workspace: slug, kernelId: version.kernelId }}
      version={{ number, label, opCount, edgeCount, createdByName, createdAt: createdAt.toISOString() }}
      document={version.document}
    />
  );
}
