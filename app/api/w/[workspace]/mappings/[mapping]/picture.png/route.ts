import { join } from 'node:path';
import { Resvg } from '@resvg/resvg-js';
import { defineRoute } from '@/app/_server/define-route';
import { mappingSvg } from '@/lib/mapping/picture/mapping-svg';
import { ok } from '@/lib/result';
import { fileResponse, mappingForFile, mappingParams } from '../mapping-file';

const fonts = ['source-sans-3-400', 'source-sans-3-600', 'jetbrains-mono-400', 'jetbrains-mono-600'];
const SHARPNESS = 2;
/** The largest fabric (64 × 64) would give more pixels than a picture needs. */
const LONGEST_SIDE_PX = 6000;

export const GET = defineRoute({
  name: 'mapping.picture png',
  access: { role: 'viewer' },
  params: mappingParams,
  run: async ({ params, workspace }) => {
    const found = await mappingForFile(params, workspace);
    if (!found.ok) return found;
    const { document, kernel, fabric, name } = found.value;
    const svg = mappingSvg(document, kernel, fabric);
    const longest = Math.max(fabric.rows, fabric.cols) * 104 + 200;
    const directory = join(/* turbopackIgnore: true */ process.cwd(), 'public', 'fonts');
    const picture = new Resvg(svg, {
      fitTo: { mode: 'zoom', value: Math.min(SHARPNESS, LONGEST_SIDE_PX / longest) },
      font: {
        loadSystemFonts: false,
        fontFiles: fonts.map((font) => join(directory, `${font}.ttf`)),
        defaultFontFamily: 'Source Sans 3',
      },
    }).render();
    return ok(fileResponse(new Uint8Array(picture.asPng()), 'image/png', name, 'png'));
  },
});
