import type { Metadata } from 'next';
import { requireMember } from '@/app/_server/access';
import { type FabricRow, FabricTable } from '@/components/fabric-list/fabric-table';
import { ImportFabric } from '@/components/fabric-list/import-fabric';
import { TopBar } from '@/components/shell/top-bar';
import { ButtonLink } from '@/components/ui/button';
import { database } from '@/db/client';
import { fabricDocuments } from '@/db/queries/fabric-documents';
import { type FabricListItem, listFabrics } from '@/db/queries/fabrics';
import { compileFabric } from '@/lib/fabric/compile';
import type { Fabric } from '@/lib/fabric/fabric';
import { countUnits } from '@/lib/fabric/presets';
import { unitSpec } from '@/lib/fabric/unit-library';
import { roleReaches } from '@/lib/roles';
import { archiveFabricAction, duplicateFabricAction, importFabricAction } from './actions';

export const metadata: Metadata = { title: 'Fabrics' };

interface FabricsPageProps {
  params: Promise<{ workspace: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

export default async function FabricsPage({ params, searchParams }: FabricsPageProps) {
  const { workspace: slug } = await params;
  const archived = (await searchParams).show === 'archived';
  const { workspace, role } = await requireMember(slug);
  const of = { workspaceId: workspace.id, archived };
  const [items, documents] = await Promise.all([
    listFabrics(database(), of),
    fabricDocuments(database(), of),
  ]);
  const mayEdit = roleReaches(role, 'editor');
  return (
    <>
      <TopBar
        path={[{ label: 'Fabrics' }]}
        actions={
          mayEdit ? (
            <>
              <ImportFabric workspace={slug} importFabric={importFabricAction} />
              <ButtonLink href={`/w/${slug}/fabrics/new`} look="primary">
                New fabric
              </ButtonLink>
            </>
          ) : null
        }
      />
      <div className="p-4">
        <FabricTable
          workspace={slug}
          archived={archived}
          rows={items.map((item) => rowOf(item, documents.get(item.id)))}
          commands={mayEdit ? { archive: archiveFabricAction, duplicate: duplicateFabricAction } : undefined}
        />
      </div>
    </>
  );
}

/** A fabric that was added between the two reads has no document here yet; its figures come with the next load. */
function rowOf(item: FabricListItem, document: Fabric | undefined): FabricRow {
  const graph = document && compileFabric(document);
  return {
    id: item.id,
    name: item.name,
    rows: item.rows,
    cols: item.cols,
    topology: item.topology,
    peCount: item.peCount,
    units: [...countUnits(document?.units ?? [])].map(([unit, peCount]) => ({
      label: unitSpec(unit)?.label ?? unit,
      peCount,
    })),
    linkCount: graph?.links.length ?? 0,
    maxHops: graph?.maxHops ?? null,
    latestVersion: item.latestVersion,
    errorCount: item.errorCount,
    changedByName: item.updatedByName,
    changedAt: item.updatedAt.toISOString(),
  };
}
