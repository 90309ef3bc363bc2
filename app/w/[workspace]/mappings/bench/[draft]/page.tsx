import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { cache } from 'react';
import { requireMember } from '@/app/_server/access';
import { Bench } from '@/components/mapping-bench/bench';
import { database } from '@/db/client';
import { getMappingDraft } from '@/db/queries/mapping-drafts';
import { lastSolves } from '@/db/queries/solve-jobs';
import { parseId } from '@/lib/ids';
import { roleReaches } from '@/lib/roles';
import { keepAsMapping, renameBench, saveBench, saveBenchAsNew } from '../../actions';
import { startSolve, stopSolve } from '../../solve-actions';

interface PageProps {
  params: Promise<{ workspace: string; draft: string }>;
}

const load = cache(async (workspaceSlug: string, draftText: string) => {
  const member = await requireMember(workspaceSlug);
  const draftId = parseId('draft', draftText);
  const of = draftId && { workspaceId: member.workspace.id, draftId };
  const draft = of ? await getMappingDraft(database(), of) : null;
  if (!of || !draft) notFound();
  return { member, of, draft };
});

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  const { workspace, draft } = await params;
  return { title: (await load(workspace, draft)).draft.name };
}

export default async function BenchPage({ params }: PageProps) {
  const { workspace, draft: draftText } = await params;
  const { member, of, draft } = await load(workspace, draftText);
  const last = await lastSolves(database(), of);
  return (
    <Bench
      key={draft.id}
      workspace={workspace}
      draftId={draft.id}
      name={draft.name}
      revision={draft.revision}
      content={{ ...draft.document, provenance: draft.provenance }}
      kernel={{ name: draft.kernel.name, version: draft.kernel.number, document: draft.kernel.document }}
      fabric={{ name: draft.fabric.name, version: draft.fabric.number, document: draft.fabric.document }}
      solveId={last.ordinary}
      askedSolveId={last.asked}
      readOnly={!roleReaches(member.role, 'editor') || draft.archivedAt !== null}
      calls={{ saveBench, saveBenchAsNew, keepAsMapping, renameBench, startSolve, stopSolve }}
    />
  );
}
