import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { cache } from 'react';
import { requireMember } from '@/app/_server/access';
import { Instant } from '@/components/fabric-list/instant';
import { FabricActions } from '@/components/fabric-view/fabric-actions';
import { FabricView } from '@/components/fabric-view/fabric-view';
import { TopBar } from '@/components/shell/top-bar';
import { Badge } from '@/components/ui/badge';
import { database } from '@/db/client';
import { listFabricVersions } from '@/db/queries/fabric-versions';
import { getFabricDraft } from '@/db/queries/fabrics';
import { parseId } from '@/lib/ids';
import { roleReaches } from '@/lib/roles';
import {
  archiveFabricAction,
  duplicateFabricAction,
  keepFabricVersionAction,
  renameFabricAction,
} from '../actions';

interface FabricPageProps {
  params: Promise<{ workspace: string; fabric: string }>;
}

const commands = {
  archive: archiveFabricAction,
  duplicate: duplicateFabricAction,
  rename: renameFabricAction,
  keepVersion: keepFabricVersionAction,
};

/** Asked once per request, by the title and by the page. */
const loadFabric = cache(async (slug: string, idText: string) => {
  const member = await requireMember(slug);
  const fabricId = parseId('fabric', idText);
  if (!fabricId) notFound();
  const fabric = await getFabricDraft(database(), { workspaceId: member.workspace.id, fabricId });
  if (!fabric) notFound();
  return { member, fabric };
});

export async function generateMetadata({ params }: FabricPageProps): Promise<Metadata> {
  const { workspace, fabric } = await params;
  return { title: (await loadFabric(workspace, fabric)).fabric.name };
}

export default async function FabricPage({ params }: FabricPageProps) {
  const { workspace: slug, fabric: idText } = await params;
  const { member, fabric } = await loadFabric(slug, idText);
  const versions = await listFabricVersions(database(), {
    workspaceId: member.workspace.id,
    fabricId: fabric.id,
  });
  const archived = fabric.archivedAt !== null;
  return (
    <>
      <TopBar
        path={[{ label: 'Fabrics', href: `/w/${slug}/fabrics` }, { label: fabric.name }]}
        status={
          <span className="flex flex-wrap items-center gap-2">
            {archived ? <Badge>archived</Badge> : null}
            {fabric.latestVersion ? `version ${fabric.latestVersion} · ` : ''}changed{' '}
            <Instant at={fabric.updatedAt.toISOString()} /> by {fabric.updatedByName}
          </span>
        }
        actions={
          <FabricActions
            workspace={slug}
            fabric={{ id: fabric.id, name: fabric.name, revision: fabric.revision, archived }}
            commands={roleReaches(member.role, 'editor') ? commands : undefined}
          />
        }
      />
      <FabricView
        workspace={slug}
        fabricId={fabric.id}
        fabric={fabric.document}
        versions={versions.map(({ number, label, createdByName, createdAt }) => ({
          number,
          label,
          createdByName,
          createdAt: createdAt.toISOString(),
        }))}
      />
    </>
  );
}
