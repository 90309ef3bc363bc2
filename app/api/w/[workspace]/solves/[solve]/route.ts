import { z } from 'zod';
import { defineRoute } from '@/app/_server/define-route';
import { notFound } from '@/app/_server/errors';
import { database } from '@/db/client';
import { getSolve } from '@/db/queries/solve-jobs';
import { idSchema } from '@/lib/ids';
import { err, ok } from '@/lib/result';

/** How far a solve has come; asked again and again while it runs. */
export const GET = defineRoute({
  name: 'solve.read',
  access: { role: 'viewer' },
  params: z.object({ workspace: z.string(), solve: idSchema('solve') }),
  run: async ({ params, workspace }) => {
    const solve = await getSolve(database(), { workspaceId: workspace.id, solveId: params.solve });
    return solve ? ok(solve) : err(notFound('solve'));
  },
});
