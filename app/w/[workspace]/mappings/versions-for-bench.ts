import { type AppResult, appError, notFound } from '@/app/_server/errors';
import type { Tx } from '@/db/client';
import { createFabricVersion, listFabricVersions } from '@/db/queries/fabric-versions';
import { getFabricDraft } from '@/db/queries/fabrics';
import { createKernelVersion, listKernelVersions } from '@/db/queries/kernel-versions';
import { getKernelDraft } from '@/db/queries/kernels';
import { validateFabric } from '@/lib/fabric/validate-fabric';
import { validateKernel } from '@/lib/graph/validate';
import type { Id } from '@/lib/ids';
import { err, ok } from '@/lib/result';

interface Wanted {
  workspaceId: Id<'workspace'>;
  userId: Id<'user'>;
  kernelId: Id<'kernel'>;
  fabricId: Id<'fabric'>;
}

/**
 * The versions that a new bench stands on. A draft without errors becomes a version first, unless the newest version
 * is the same; a draft with errors is passed over for the newest version, and refused where there is none.
 */
export async function versionsForBench(
  tx: Tx,
  wanted: Wanted,
): Promise<AppResult<{ kernelVersionId: Id<'kernelversion'>; fabricVersionId: Id<'fabricversion'> }>> {
  const kernel = await kernelVersion(tx, wanted);
  if (!kernel.ok) return kernel;
  const fabric = await fabricVersion(tx, wanted);
  if (!fabric.ok) return fabric;
  return ok({ kernelVersionId: kernel.value, fabricVersionId: fabric.value });
}

const changedJustNow = (what: string) =>
  appError('conflict', `The ${what} was changed at this very moment. Try again.`);

async function kernelVersion(tx: Tx, wanted: Wanted): Promise<AppResult<Id<'kernelversion'>>> {
  const draft = await getKernelDraft(tx, wanted);
  if (!draft || draft.archivedAt) return err(notFound('kernel'));
  const errors = validateKernel(draft.document).filter((problem) => problem.severity === 'error');
  if (errors.length === 0) {
    const made = await createKernelVersion(tx, { ...wanted, revision: draft.revision, label: '' });
    return made.ok ? ok(made.value.id) : err(changedJustNow('kernel'));
  }
  const [newest] = await listKernelVersions(tx, wanted);
  if (newest) return ok(newest.id);
  return err(
    appError(
      'invalid',
      `${draft.name} cannot be placed yet. ${errors[0]?.message ?? ''} Open the kernel and mend it.`,
      {
        fields: { kernelId: 'This kernel has errors and no version yet' },
      },
    ),
  );
}

async function fabricVersion(tx: Tx, wanted: Wanted): Promise<AppResult<Id<'fabricversion'>>> {
  const draft = await getFabricDraft(tx, wanted);
  if (!draft || draft.archivedAt) return err(notFound('fabric'));
  const errors = validateFabric(draft.document).filter((problem) => problem.severity === 'error');
  if (errors.length === 0) {
    const made = await createFabricVersion(tx, { ...wanted, revision: draft.revision, label: '' });
    return made.ok ? ok(made.value.id) : err(changedJustNow('fabric'));
  }
  const [newest] = await listFabricVersions(tx, wanted);
  if (newest) return ok(newest.id);
  return err(
    appError(
      'invalid',
      `${draft.name} cannot be used yet. ${errors[0]?.message ?? ''} Open the fabric and mend it.`,
      {
        fields: { fabricId: 'This fabric has errors and no version yet' },
      },
    ),
  );
}
