/** A set of tiles and the channels that lead out of it and into it: what every net between its sides has to go through. */
import type { FabricLink } from '../../fabric/link-graph';
import { hasTile } from '../presolve/tile-sets';

export interface TileCut {
  /** One bit a tile: the tiles inside. */
  inside: Uint32Array;
  /** Channels of the links from the inside to the outside, and back. */
  channelsOut: number;
  channelsIn: number;
}

/** Cost: one look at every link. */
export function tileCut(inside: Uint32Array, links: readonly FabricLink[]): TileCut {
  let channelsOut = 0;
  let channelsIn = 0;
  for (const { from, to, channels } of links) {
    const leaves = hasTile(inside, from);
    if (leaves === hasTile(inside, to)) continue;
    if (leaves) channelsOut += channels;
    else channelsIn += channels;
  }
  return { inside, channelsOut, channelsIn };
}
