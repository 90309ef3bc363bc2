/** A fabric's links as plain integer arrays: what the inner loops of the searches read. */
import type { LinkGraph } from '../../fabric/link-graph';

export interface LinkArrays {
  /** Tile that each link leaves and enters. */
  tail: Int32Array;
  head: Int32Array;
  /** The links out of tile t are outLinks[outStart[t] … outStart[t + 1] − 1]; likewise into it. */
  outStart: Int32Array;
  outLinks: Int32Array;
  inStart: Int32Array;
  inLinks: Int32Array;
}

/** Compiled graphs do not change, so their arrays are made once. */
const known = new WeakMap<LinkGraph, LinkArrays>();

export function linkArrays(graph: LinkGraph): LinkArrays {
  const found = known.get(graph);
  if (found) return found;
  const [outStart, outLinks] = flat(graph.outLinks);
  const [inStart, inLinks] = flat(graph.inLinks);
  const made: LinkArrays = {
    tail: Int32Array.from(graph.links, (link) => link.from),
    head: Int32Array.from(graph.links, (link) => link.to),
    outStart,
    outLinks,
    inStart,
    inLinks,
  };
  known.set(graph, made);
  return made;
}

function flat(lists: readonly (readonly number[])[]): [start: Int32Array, items: Int32Array] {
  const start = new Int32Array(lists.length + 1);
  lists.forEach((list, i) => {
    start[i + 1] = (start[i] ?? 0) + list.length;
  });
  return [start, Int32Array.from(lists.flat())];
}
