import type { Metadata } from 'next';
import { requireMember } from '@/app/_server/access';
import { NewBenchForm } from '@/components/mapping-bench/lists/new-bench-form';
import { TopBar } from '@/components/shell/top-bar';
import { ButtonLink } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/notice';
import { database } from '@/db/client';
import { listFabrics } from '@/db/queries/fabrics';
import { listKernels } from '@/db/queries/kernels';
import { createBench } from '../actions';

export const metadata: Metadata = { title: 'New mapping' };

interface PageProps {
  params: Promise<{ workspace: string }>;
  searchParams: Promise<{ kernel?: string; fabric?: string }>;
}

export default async function NewMappingPage({ params, searchParams }: PageProps) {
  const { workspace: slug } = await params;
  const chosen = await searchParams;
  const { workspace } = await requireMember(slug, 'editor');
  const of = { workspaceId: workspace.id, archived: false };
  const [kernels, fabrics] = await Promise.all([listKernels(database(), of), listFabrics(database(), of)]);
  const missing = kernels.length === 0 ? 'kernel' : fabrics.length === 0 ? 'fabric' : null;
  return (
    <>
      <TopBar path={[{ label: 'Mappings', href: `/w/${slug}/mappings` }, { label: 'New mapping' }]} />
      <div className="p-4">
        {missing ? (
          <EmptyState
            title={`There is no ${missing} yet`}
            action={
              <ButtonLink href={`/w/${slug}/${missing}s`} look="primary">
                To the {missing}s
              </ButtonLink>
            }
          >
            A mapping needs a kernel to place and a fabric to place it on.
          </EmptyState>
        ) : (
          <NewBenchForm
            workspace={slug}
            kernels={kernels.map((kernel) => ({
              id: kernel.id,
              name: kernel.name,
              opCount: kernel.opCount,
              hasErrors: kernel.errorCount > 0,
              latestVersion: kernel.latestVersion,
            }))}
            fabrics={fabrics.map(({ id, name, rows, cols }) => ({ id, name, rows, cols }))}
            kernelId={chosen.kernel ?? null}
            fabricId={chosen.fabric ?? null}
            createBench={createBench}
          />
        )}
      </div>
    </>
  );
}
