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
  let tiles = new Int32Array(64);
  let costs = new Float64Array(64);
  let size = 0;
  let last = 0;
  const grow = (): void => {
    const [moreTiles, moreCosts] = [new Int32Array(2 * size), new Float64Array(2 * size)];
    moreTiles.set(tiles);
    moreCosts.set(costs);
    [tiles, costs] = [moreTiles, moreCosts];
  };
  return {
    push(tile, cost) {
      if (size === tiles.length) grow();
      let at = size++;
      while (at > 0) {
        const up = (at - 1) >> 1;
        const above = costs[up] as number;
        if (above < cost || (above === cost && (tiles[up] as number) <= tile)) break;
        costs[at] = above;
        tiles[at] = tiles[up] as number;
        at = up;
      }
      costs[at] = cost;
      tiles[at] = tile;
    },
    pop() {
      if (size === 0) return -1;
      const top = tiles[0] as number;
      last = costs[0] as number;
      size--;
      const tile = tiles[size] as number;
      const cost = costs[size] as number;
      let at = 0;
      for (let child = 1; child < size; child = 2 * at + 1) {
        const right = child + 1;
        if (right < size && isBefore(costs, tiles, right, child)) child = right;
        const below = costs[child] as number;
        if (cost < below || (cost === below && tile <= (tiles[child] as number))) break;
        costs[at] = below;
        tiles[at] = tiles[child] as number;
        at = child;
      }
      costs[at] = cost;
      tiles[at] = tile;
      return top;
    },
    lastCost: () => last,
    clear() {
      size = 0;
    },
  };
}

function isBefore(costs: Float64Array, tiles: Int32Array, a: number, b: number): boolean {
  const difference = (costs[a] as number) - (costs[b] as number);
  return difference < 0 || (difference === 0 && (tiles[a] as number) < (tiles[b] as number));
}
