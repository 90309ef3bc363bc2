/**
 * Which links a fabric has, decided from the model's definition link by link. Deliberately not taken from the
 * compiled fabric, so that a fault there cannot hide a fault in a route.
 */
import type { Fabric } from '../fabric/fabric';

interface Position {
  row: number;
  col: number;
}

/** Steps between two coordinates of one side; around the edge too where the side wraps. */
function steps(from: number, to: number, side: number, wraps: boolean): number {
  const direct = Math.abs(from - to);
  return wraps ? Math.min(direct, side - direct) : direct;
}

function inPreset(fabric: Fabric, from: Position, to: Position): boolean {
  const wraps = fabric.topology === 'torus';
  const down = steps(from.row, to.row, fabric.rows, wraps);
  const right = steps(from.col, to.col, fabric.cols, wraps);
  return fabric.topology === 'diagonal' ? Math.max(down, right) === 1 : down + right === 1;
}

const read = (text: string): Position | null => {
  const match = /^r(\d{1,2})c(\d{1,2})$/.exec(text);
  return match ? { row: Number(match[1]), col: Number(match[2]) } : null;
};

/** Row and column of a tile that lies in the fabric, or null. */
export function tileInFabric(fabric: Fabric, tile: string): Position | null {
  const at = read(tile);
  return at !== null && at.row < fabric.rows && at.col < fabric.cols ? at : null;
}

export interface LinkTest {
  /** The link's two tiles where the fabric has the link, else null. */
  ends(link: string): { from: string; to: string } | null;
  channels(link: string): number;
}

/** Answers for one fabric which links it has and how wide they are. */
export function linkTest(fabric: Fabric): LinkTest {
  const removed = new Set<string>(fabric.removedLinks);
  const added = new Set<string>(fabric.addedLinks);
  const widths = new Map<string, number>(Object.entries(fabric.linkChannels));
  return {
    ends(link) {
      const [from, to, more] = link.split('>');
      if (from === undefined || to === undefined || more !== undefined || from === to) return null;
      const a = tileInFabric(fabric, from);
      const b = tileInFabric(fabric, to);
      if (a === null || b === null) return null;
      const present = added.has(link) || (inPreset(fabric, a, b) && !removed.has(link));
      return present ? { from, to } : null;
    },
    channels: (link) => widths.get(link) ?? fabric.channels,
  };
}
