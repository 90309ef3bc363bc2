import { defineRoute } from '@/app/_server/define-route';
import { writeMappingJson } from '@/lib/formats/mapping-json';
import { ok } from '@/lib/result';
import { fileResponse, mappingForFile, mappingParams } from '../mapping-file';

export const GET = defineRoute({
  name: 'mapping.json',
  access: { role: 'viewer' },
  params: mappingParams,
  run: async ({ params, workspace }) => {
    const found = await mappingForFile(params, workspace);
    if (!found.ok) return found;
    const { document, name } = found.value;
    return ok(fileResponse(writeMappingJson(document), 'application/json; charset=utf-8', name, 'json'));
  },
});
