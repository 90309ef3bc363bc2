import { z } from 'zod';
import { defineRoute } from '@/app/_server/define-route';
import { notFound } from '@/app/_server/errors';
import { database } from '@/db/client';
import { getKernelVersionByNumber } from '@/db/queries/kernel-versions';
import { getKernelDraft } from '@/db/queries/kernels';
import { kernelFileName } from '@/lib/formats/file-names';
import { writeKernelDot } from '@/lib/formats/kernel-dot';
import { writeKernelJson } from '@/lib/formats/kernel-json';
import { idSchema } from '@/lib/ids';
import { err, ok } from '@/lib/result';

const formats = {
  json: { write: writeKernelJson, type: 'application/json; charset=utf-8', ending: 'kernel.json' },
  dot: { write: writeKernelDot, type: 'text/vnd.graphviz; charset=utf-8', ending: 'dot' },
} as const;

/** The draft, or one version, as a file to save. */
export const GET = defineRoute({
  name: 'kernel.export',
  access: { role: 'viewer' },
  params: z.object({ workspace: z.string(), kernel: idSchema('kernel') }),
  query: z.object({
    format: z.enum(['json', 'dot']),
    version: z.coerce.number().int().min(1).max(2147483647).optional(),
  }),
  run: async ({ workspace, params, query }) => {
    const of = { workspaceId: workspace.id, kernelId: params.kernel };
    const found =
      query.version === undefined
        ? await getKernelDraft(database(), of)
        : await getKernelVersionByNumber(database(), { ...of, number: query.version });
    if (!found) return err(notFound('kernel'));
    const { write, type, ending } = formats[query.format];
    const name = kernelFileName(found.document.name, query.version ?? null, ending);
    return ok(
      new Response(write(found.document), {
        headers: { 'content-type': type, 'content-disposition': `attachment; filename="${name}"` },
      }),
    );
  },
});
