/**
 * Hops of the least tree from a source to two others: its paths part at some tile, each of them as short as can be.
 * `hops` from tile p to tile q at [p · tileCount + q]. Cost: the tiles.
 */
export function meetingHops(
  hops: ArrayLike<number>,
  tileCount: number,
  source: number,
  left: number,
  right: number,
): number {
  let least = Number.POSITIVE_INFINITY;
  for (let m = 0; m < tileCount; m++) {
    const length =
      (hops[source * tileCount + m] as number) +
      (hops[m * tileCount + left] as number) +
      (hops[m * tileCount + right] as number);
    if (length < least) least = length;
  }
  return least;
}
