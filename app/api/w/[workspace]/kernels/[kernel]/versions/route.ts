import { z } from 'zod';
import { defineRoute } from '@/app/_server/define-route';
import { notFound } from '@/app/_server/errors';
import type { VersionSummary } from '@/components/kernel-editor/server-calls';
import { database } from '@/db/client';
import { listKernelVersions } from '@/db/queries/kernel-versions';
import { getKernelDraft } from '@/db/queries/kernels';
import { idSchema } from '@/lib/ids';
import { err, ok } from '@/lib/result';

/** The versions of a kernel, newest first. */
export const GET = defineRoute({
  name: 'kernel.versions',
  access: { role: 'viewer' },
  params: z.object({ workspace: z.string(), kernel: idSchema('kernel') }),
  run: async ({ workspace, params }) => {
    const of = { workspaceId: workspace.id, kernelId: params.kernel };
    if (!(await getKernelDraft(database(), of))) return err(notFound('kernel'));
    const versions = await listKernelVersions(database(), of);
    return ok(
      versions.map(
        ({ number, label, opCount, edgeCount, createdByName, createdAt }): VersionSummary => ({
          number,
          label,
          opCount,
          edgeCount,
          createdByName,
          createdAt: createdAt.toISOString(),
        }),
      ),
    );
  },
});
