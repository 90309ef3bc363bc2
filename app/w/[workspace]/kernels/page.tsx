import type { Metadata } from 'next';
import { requireMember } from '@/app/_server/access';
import { ImportKernel } from '@/components/kernel-import/import-kernel';
import { type KernelRow, KernelTable } from '@/components/kernel-list/kernel-table';
import { NewKernel } from '@/components/kernel-list/new-kernel';
import { TopBar } from '@/components/shell/top-bar';
import { database } from '@/db/client';
import { type KernelListItem, listKernels } from '@/db/queries/kernels';
import { roleReaches } from '@/lib/roles';
import { archiveKernelAction, createKernelAction, duplicateKernelAction } from './actions';

export const metadata: Metadata = { title: 'Kernels' };

interface KernelsPageProps {
  params: Promise<{ workspace: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

export default async function KernelsPage({ params, searchParams }: KernelsPageProps) {
  const { workspace: slug } = await params;
  const archived = (await searchParams).show === 'archived';
  const { workspace, role } = await requireMember(slug);
  const items = await listKernels(database(), { workspaceId: workspace.id, archived });
  const mayEdit = roleReaches(role, 'editor');
  return (
    <>
      <TopBar
        path={[{ label: 'Kernels' }]}
        actions={
          mayEdit ? (
            <>
              <ImportKernel workspace={slug} create={createKernelAction} />
              <NewKernel workspace={slug} create={createKernelAction} />
            </>
          ) : null
        }
      />
      <div className="p-4">
        <KernelTable
          workspace={slug}
          archived={archived}
          rows={items.map(rowOf)}
          commands={mayEdit ? { archive: archiveKernelAction, duplicate: duplicateKernelAction } : null}
        />
      </div>
    </>
  );
}

const rowOf = (item: KernelListItem): KernelRow => ({
  id: item.id,
  name: item.name,
  opCount: item.opCount,
  edgeCount: item.edgeCount,
  errorCount: item.errorCount,
  latestVersion: item.latestVersion,
  changedByName: item.updatedByName,
  changedAt: item.updatedAt.toISOString(),
});
