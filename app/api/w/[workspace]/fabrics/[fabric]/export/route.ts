import { z } from 'zod';
import { defineRoute } from '@/app/_server/define-route';
import { notFound } from '@/app/_server/errors';
import { database } from '@/db/client';
import { getFabricVersionByNumber } from '@/db/queries/fabric-versions';
import { getFabricDraft } from '@/db/queries/fabrics';
import { writeFabricJson } from '@/lib/formats/fabric-json';
import { fabricFileName } from '@/lib/formats/file-names';
import { idSchema } from '@/lib/ids';
import { err, ok } from '@/lib/result';

/** The fabric as a JSON file; with `?version=3` that version instead of the present state. */
export const GET = defineRoute({
  name: 'fabric.export',
  access: { role: 'viewer' },
  params: z.object({ workspace: z.string(), fabric: idSchema('fabric') }),
  query: z.object({ version: z.coerce.number().int().min(1).max(1e9).optional() }),
  run: async ({ workspace, params, query }) => {
    const of = { workspaceId: workspace.id, fabricId: params.fabric };
    const found = query.version
      ? await getFabricVersionByNumber(database(), { ...of, number: query.version })
      : await getFabricDraft(database(), of);
    if (!found) return err(notFound('fabric'));
    return ok(
      new Response(writeFabricJson(found.document), {
        headers: {
          'content-type': 'application/json; charset=utf-8',
          'content-disposition': `attachment; filename="${fabricFileName(found.document.name, query.version ?? null)}"`,
        },
      }),
    );
  },
});
