import type { Metadata } from 'next';
import Link from 'next/link';
import { requireMember } from '@/app/_server/access';
import { MappingsTable } from '@/components/mapping-bench/lists/mappings-table';
import { TopBar } from '@/components/shell/top-bar';
import { ButtonLink } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/notice';
import { database } from '@/db/client';
import { listMappingDrafts } from '@/db/queries/mapping-drafts';
import { listMappings } from '@/db/queries/mappings';
import { roleReaches } from '@/lib/roles';
import { setArchived } from './actions';
import { changedSinceKept, draftRow, mappingRow } from './list-rows';

export const metadata: Metadata = { title: 'Mappings' };

interface PageProps {
  params: Promise<{ workspace: string }>;
  searchParams: Promise<{ archived?: string }>;
}

export default async function MappingsPage({ params, searchParams }: PageProps) {
  const { workspace: slug } = await params;
  const archived = (await searchParams).archived !== undefined;
  const { workspace, role } = await requireMember(slug);
  const of = { workspaceId: workspace.id, archived };
  const [benches, kept] = await Promise.all([
    listMappingDrafts(database(), of),
    listMappings(database(), of),
  ]);
  const drafts = benches.filter((bench) => changedSinceKept(bench, kept));
  const base = `/w/${slug}/mappings`;
  const rows = [...kept.map((item) => mappingRow(item, base)), ...drafts.map((item) => draftRow(item, base))];
  const mayEdit = roleReaches(role, 'editor');
  const create = mayEdit ? (
    <ButtonLink href={`${base}/new`} look="primary">
      New mapping
    </ButtonLink>
  ) : null;
  return (
    <>
      <TopBar
        path={archived ? [{ label: 'Mappings', href: base }, { label: 'Archived' }] : [{ label: 'Mappings' }]}
        actions={archived ? null : create}
      />
      <div className="p-4">
        <MappingsTable
          workspace={slug}
          rows={rows}
          mayEdit={mayEdit}
          archived={archived}
          setArchived={setArchived}
          empty={
            <EmptyState
              title={archived ? 'Nothing is archived' : 'No mappings yet'}
              action={archived ? undefined : create}
            >
              {archived
                ? 'Drafts and mappings that are put away appear here.'
                : 'A mapping lays a kernel onto a fabric: each op on a PE, each net over its links. Choose both to open the bench.'}
            </EmptyState>
          }
        />
        <p className="mt-3 text-sm">
          <Link href={archived ? base : `${base}?archived`} className="text-quiet underline hover:text-ink">
            {archived ? 'Back to the list' : 'Archived'}
          </Link>
        </p>
      </div>
    </>
  );
}
