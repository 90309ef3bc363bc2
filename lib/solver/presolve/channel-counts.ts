/** Channels of all links into and out of each tile. */
import type { LinkGraph } from '../../fabric/link-graph';

export function channelCounts(
  { links }: Pick<LinkGraph, 'links'>,
  tileCount: number,
): { into: Int32Array; outOf: Int32Array } {
  const into = new Int32Array(tileCount);
  const outOf = new Int32Array(tileCount);
  for (const { from, to, channels } of links) {
    outOf[from] = (outOf[from] as number) + channels;
    into[to] = (into[to] as number) + channels;
  }
  return { into, outOf };
}
