import { z } from 'zod';
import type { Member } from '@/app/_server/access';
import { type AppResult, notFound } from '@/app/_server/errors';
import { database } from '@/db/client';
import { getMapping, type MappingView } from '@/db/queries/mappings';
import { mappingFileName } from '@/lib/formats/file-names';
import { idSchema } from '@/lib/ids';
import { err, ok } from '@/lib/result';

export const mappingParams = z.object({ workspace: z.string(), mapping: idSchema('mapping') });

/** The mapping that a file is made of; its present name, since names may change. */
export async function mappingForFile(
  params: z.output<typeof mappingParams>,
  workspace: Member['workspace'],
): Promise<AppResult<MappingView>> {
  const mapping = await getMapping(database(), { workspaceId: workspace.id, mappingId: params.mapping });
  if (!mapping) return err(notFound('mapping'));
  return ok({ ...mapping, document: { ...mapping.document, name: mapping.name } });
}

/** A file to save, named after the mapping in letters that every file system takes. */
export function fileResponse(body: BodyInit, type: string, name: string, ending: string): Response {
  return new Response(body, {
    headers: {
      'content-type': type,
      'content-disposition': `attachment; filename="${mappingFileName(name, ending)}"`,
      'x-content-type-options': 'nosniff',
    },
  });
}
