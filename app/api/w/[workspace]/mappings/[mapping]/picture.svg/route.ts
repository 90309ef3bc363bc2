import { defineRoute } from '@/app/_server/define-route';
import { mappingSvg } from '@/lib/mapping/picture/mapping-svg';
import { ok } from '@/lib/result';
import { fileResponse, mappingForFile, mappingParams } from '../mapping-file';

export const GET = defineRoute({
  name: 'mapping.picture svg',
  access: { role: 'viewer' },
  params: mappingParams,
  run: async ({ params, workspace }) => {
    const found = await mappingForFile(params, workspace);
    if (!found.ok) return found;
    const { document, kernel, fabric, name } = found.value;
    return ok(
      fileResponse(mappingSvg(document, kernel, fabric), 'image/svg+xml; charset=utf-8', name, 'svg'),
    );
  },
});
