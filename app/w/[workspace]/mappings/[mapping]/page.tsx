import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { cache } from 'react';
import { requireMember } from '@/app/_server/access';
import { KeptMapping } from '@/components/mapping-bench/kept-mapping';
import { database } from '@/db/client';
import { getMapping } from '@/db/queries/mappings';
import { parseId } from '@/lib/ids';
import { roleReaches } from '@/lib/roles';
import { continueFromMapping, renameKeptMapping } from '../actions';

interface PageProps {
  params: Promise<{ workspace: string; mapping: string }>;
}

const load = cache(async (workspaceSlug: string, mappingText: string) => {
  const member = await requireMember(workspaceSlug);
  const mappingId = parseId('mapping', mappingText);
  const mapping = mappingId
    ? await getMapping(database(), { workspaceId: member.workspace.id, mappingId })
    : null;
  if (!mapping) notFound();
  return { member, mapping };
});

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  const { workspace, mapping } = await params;
  return { title: (await load(workspace, mapping)).mapping.name };
}

export default async function KeptMappingPage({ params }: PageProps) {
  const { workspace, mapping: mappingText } = await params;
  const { member, mapping } = await load(workspace, mappingText);
  return (
    <KeptMapping
      key={mapping.id}
      workspace={workspace}
      mappingId={mapping.id}
      name={mapping.name}
      madeBy={mapping.madeByName}
      madeAtMs={mapping.createdAt.getTime()}
      archived={mapping.archivedAt !== null}
      document={mapping.document}
      kernel={mapping.kernel}
      fabric={mapping.fabric}
      kernelHref={`/w/${workspace}/kernels/${mapping.kernelId}`}
      fabricHref={`/w/${workspace}/fabrics/${mapping.fabricId}`}
      mayEdit={roleReaches(member.role, 'editor')}
      continueFrom={continueFromMapping}
      rename={renameKeptMapping}
    />
  );
}
