import { z } from 'zod';
import { defineRoute } from '@/app/_server/define-route';
import { notFound } from '@/app/_server/errors';
import { database } from '@/db/client';
import { getKernelVersionByNumber } from '@/db/queries/kernel-versions';
import { idSchema } from '@/lib/ids';
import { err, ok } from '@/lib/result';

/** The document of one version. */
export const GET = defineRoute({
  name: 'kernel.version',
  access: { role: 'viewer' },
  params: z.object({
    workspace: z.string(),
    kernel: idSchema('kernel'),
    number: z.coerce.number().int().min(1).max(2147483647),
  }),
  run: async ({ workspace, params }) => {
    const version = await getKernelVersionByNumber(database(), {
      workspaceId: workspace.id,
      kernelId: params.kernel,
      number: params.number,
    });
    return version ? ok(version.document) : err(notFound('version'));
  },
});
