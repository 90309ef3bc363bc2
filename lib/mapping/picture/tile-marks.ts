/** The form of a unit's tile besides its tint: an outline, and strokes drawn over it. Texts are SVG path data. */
import type { UnitForm } from '../../fabric/unit-library';
import type { Box } from './fabric-geometry';

const NOTCH_PX = 13;
const TICK_PX = 9;

export interface TileMarks {
  outline: string;
  strokes: string;
  /** The outline is sewn: drawn with dashes. */
  stitched: boolean;
}

export function tileMarks(form: UnitForm, { x, y, width, height }: Box): TileMarks {
  const [right, foot] = [x + width, y + height];
  const plain = `M${x} ${y}H${right}V${foot}H${x}Z`;
  switch (form) {
    case 'notch':
      return {
        outline: `M${x} ${y}H${right - NOTCH_PX}L${right} ${y + NOTCH_PX}V${foot}H${x}Z`,
        strokes: '',
        stitched: false,
      };
    case 'cornerTicks':
      return {
        outline: plain,
        strokes: [
          `M${x} ${y + TICK_PX}L${x + TICK_PX} ${y}`,
          `M${right - TICK_PX} ${y}L${right} ${y + TICK_PX}`,
          `M${x} ${foot - TICK_PX}L${x + TICK_PX} ${foot}`,
          `M${right - TICK_PX} ${foot}L${right} ${foot - TICK_PX}`,
        ].join(''),
        stitched: false,
      };
    case 'footBar':
      return {
        outline: plain,
        strokes: `M${x + 5} ${foot - 7}H${right - 5}M${x + 5} ${foot - 4}H${right - 5}`,
        stitched: false,
      };
    case 'stitched':
      return {
        outline: plain,
        strokes: `M${x + 4} ${y + 4}H${right - 4}V${foot - 4}H${x + 4}Z`,
        stitched: true,
      };
    case 'plain':
      return { outline: plain, strokes: '', stitched: false };
  }
}
