/** A binary heap of tiles by cost, ties by the lower tile index, so that searches are deterministic. */

export interface TileHeap {
  push(tile: number, cost: number): void;
  /** The tile of least cost, or −1 when empty; its cost is then in `lastCost()`. */
  pop(): number;
  lastCost(): number;
  clear(): void;
}

/** An empty heap. A tile may be pushed again with a lower cost; the caller skips outdated entries. */
export function tileHeap(): TileHeap {
  const tiles: number[] = [];
  const costs: number[] = [];
  let last = 0;
  const before = (a: number, b: number): boolean => {
    const difference = (costs[a] ?? 0) - (costs[b] ?? 0);
    return difference < 0 || (difference === 0 && (tiles[a] ?? 0) < (tiles[b] ?? 0));
  };
  const swap = (a: number, b: number): void => {
    const tile = tiles[a] ?? 0;
    const cost = costs[a] ?? 0;
    tiles[a] = tiles[b] ?? 0;
    costs[a] = costs[b] ?? 0;
    tiles[b] = tile;
    costs[b] = cost;
  };
  const sink = (): void => {
    let at = 0;
    for (;;) {
      const left = 2 * at + 1;
      if (left >= tiles.length) return;
      const child = left + 1 < tiles.length && before(left + 1, left) ? left + 1 : left;
      if (!before(child, at)) return;
      swap(child, at);
      at = child;
    }
  };
  return {
    push(tile, cost) {
      tiles.push(tile);
      costs.push(cost);
      let at = tiles.length - 1;
      while (at > 0 && before(at, (at - 1) >> 1)) {
        swap(at, (at - 1) >> 1);
        at = (at - 1) >> 1;
      }
    },
    pop() {
      const top = tiles[0];
      if (top === undefined) return -1;
      last = costs[0] ?? 0;
      swap(0, tiles.length - 1);
      tiles.pop();
      costs.pop();
      sink();
      return top;
    },
    lastCost: () => last,
    clear() {
      tiles.length = 0;
      costs.length = 0;
    },
  };
}
