/** The beds of the channels: where links are, before any thread runs in them. */
import type { FabricGraph } from '../../fabric/compile';
import type { Fabric, LinkId } from '../../fabric/fabric';
import { type Box, CHANNEL_PX, columnChannelX, rowChannelY } from './fabric-geometry';
import { type LinkPiece, linkWay } from './link-pieces';

export interface ChannelBar extends Box {
  links: readonly LinkId[];
}

const HALF_PX = 7;

/**
 * One bar for each directed link's straight way, on its own half of the channel (right-hand traffic), so that a
 * missing direction shows. Links that turn a corner are told by `slantedLinks`.
 */
export function channelBars(
  fabric: Pick<Fabric, 'rows' | 'cols' | 'topology'>,
  graph: Pick<FabricGraph, 'links'>,
): ChannelBar[] {
  return graph.links.flatMap((link) => {
    const { pieces, wraps } = linkWay(fabric, link);
    if (pieces.length > 1 && !wraps) return [];
    return pieces.map((piece) => ({ ...barBox(piece), links: [link.id] }));
  });
}

function barBox(piece: LinkPiece): Box {
  const low = Math.min(piece.start, piece.end);
  const length = Math.abs(piece.end - piece.start);
  const forward = piece.end > piece.start;
  if (piece.axis === 'row') {
    const y = rowChannelY(piece.line);
    return { x: low, y: forward ? y : y - HALF_PX, width: length, height: HALF_PX };
  }
  const x = columnChannelX(piece.line);
  return { x: forward ? x - HALF_PX : x, y: low, width: HALF_PX, height: length };
}

/** Where a link is marked in the drawing, for pointing at it: its way, as wide as the channel. */
export function linkBoxes(
  fabric: Pick<Fabric, 'rows' | 'cols' | 'topology'>,
  link: { from: number; to: number },
): Box[] {
  const half = CHANNEL_PX / 2 - 2;
  return linkWay(fabric, link).pieces.map((piece) => {
    const low = Math.min(piece.start, piece.end);
    const length = Math.abs(piece.end - piece.start);
    return piece.axis === 'row'
      ? { x: low, y: rowChannelY(piece.line) - half, width: length, height: 2 * half }
      : { x: columnChannelX(piece.line) - half, y: low, width: 2 * half, height: length };
  });
}
