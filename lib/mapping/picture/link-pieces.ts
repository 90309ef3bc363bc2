/**
 * The way a link takes through the channels: straight pieces along one row channel or one column channel.
 *
 * Neighbours have one piece. A diagonal or knight-like link has two, along its start's row and then its end's column,
 * without a knot in between. A wrap link of a torus runs out at one side of the grid and in at the other.
 */

import type { Fabric } from '../../fabric/fabric';
import type { FabricLink } from '../../fabric/link-graph';
import { columnChannelX, MARGIN_PX, PITCH_PX, positionOf, rowChannelY } from './fabric-geometry';

export type ChannelAxis = 'row' | 'column';

/** A stretch of one channel. `line` is the row or column; `start` and `end` are px along it, in the link's direction. */
export interface LinkPiece {
  axis: ChannelAxis;
  line: number;
  start: number;
  end: number;
}

export interface LinkWay {
  pieces: readonly LinkPiece[];
  /** The way is broken after the first piece: the thread leaves the picture and comes in on the other side. */
  wraps: boolean;
}

type Side = Pick<Fabric, 'rows' | 'cols' | 'topology'>;

export function linkWay(fabric: Side, link: Pick<FabricLink, 'from' | 'to'>): LinkWay {
  const from = positionOf(fabric, link.from);
  const to = positionOf(fabric, link.to);
  if (fabric.topology === 'torus') {
    const wrapped = wrapWay(fabric, from, to);
    if (wrapped) return wrapped;
  }
  const along: LinkPiece = {
    axis: 'row',
    line: from.row,
    start: columnChannelX(from.col),
    end: columnChannelX(to.col),
  };
  const down: LinkPiece = {
    axis: 'column',
    line: to.col,
    start: rowChannelY(from.row),
    end: rowChannelY(to.row),
  };
  const pieces = [...(from.col === to.col ? [] : [along]), ...(from.row === to.row ? [] : [down])];
  return { pieces, wraps: false };
}

interface Position {
  row: number;
  col: number;
}

/** A link between the two ends of a row or column that are no neighbours otherwise. */
function wrapWay({ rows, cols }: Side, from: Position, to: Position): LinkWay | null {
  if (from.row === to.row && cols > 2 && Math.abs(from.col - to.col) === cols - 1) {
    const size = 2 * MARGIN_PX + cols * PITCH_PX;
    return broken('row', from.row, columnChannelX(from.col), columnChannelX(to.col), size, from.col > to.col);
  }
  if (from.col === to.col && rows > 2 && Math.abs(from.row - to.row) === rows - 1) {
    const size = 2 * MARGIN_PX + rows * PITCH_PX;
    return broken('column', from.col, rowChannelY(from.row), rowChannelY(to.row), size, from.row > to.row);
  }
  return null;
}

function broken(
  axis: ChannelAxis,
  line: number,
  start: number,
  end: number,
  size: number,
  forward: boolean,
): LinkWay {
  const [out, back] = forward ? [size - 2, 2] : [2, size - 2];
  return {
    pieces: [
      { axis, line, start, end: out },
      { axis, line, start: back, end },
    ],
    wraps: true,
  };
}
