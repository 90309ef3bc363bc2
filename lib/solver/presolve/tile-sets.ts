/**
 * Sets of tiles as bits, each different set held once: ops with the same candidates share a number, so that what is
 * computed for a set is computed once for all of them.
 */
export type TileSetId = number;

export interface TileSets {
  tileCount: number;
  of(tiles: readonly number[]): TileSetId;
  ofBits(bits: Uint32Array): TileSetId;
  bits(set: TileSetId): Uint32Array;
  /** How many tiles the set has. */
  count(set: TileSetId): number;
  /** Ascending. */
  tiles(set: TileSetId): readonly number[];
  and(a: TileSetId, b: TileSetId): TileSetId;
  /** a without b. */
  without(a: TileSetId, b: TileSetId): TileSetId;
  isWithin(a: TileSetId, b: TileSetId): boolean;
  /** Whether some tile of the set is one of these, and whether some is not. */
  parted(set: TileSetId, by: Uint32Array): { within: boolean; beyond: boolean };
}

export const hasTile = (bits: Uint32Array, tile: number): boolean =>
  ((bits[tile >>> 5] as number) & (1 << (tile & 31))) !== 0;

export const addTile = (bits: Uint32Array, tile: number): void => {
  bits[tile >>> 5] = (bits[tile >>> 5] as number) | (1 << (tile & 31));
};

export const noTiles = (tileCount: number): Uint32Array => new Uint32Array(Math.ceil(tileCount / 32));

/** How many tiles the sets have in common. */
export function commonTiles(a: Uint32Array, b: Uint32Array): number {
  let count = 0;
  for (let i = 0; i < a.length; i++) count += bitCount((a[i] as number) & (b[i] as number));
  return count;
}

function bitCount(word: number): number {
  let bits = word - ((word >>> 1) & 0x55555555);
  bits = (bits & 0x33333333) + ((bits >>> 2) & 0x33333333);
  return Math.imul((bits + (bits >>> 4)) & 0x0f0f0f0f, 0x01010101) >>> 24;
}

export function tileSets(tileCount: number): TileSets {
  const known = new Map<string, TileSetId>();
  const knownLists = new Map<readonly number[], TileSetId>();
  const all: Uint32Array[] = [];
  const counts: number[] = [];
  const lists: (readonly number[] | undefined)[] = [];
  const bits = (set: TileSetId): Uint32Array => all[set] as Uint32Array;
  const ofBits = (made: Uint32Array): TileSetId => {
    const key = String.fromCharCode(...new Uint16Array(made.buffer, made.byteOffset, made.length * 2));
    const found = known.get(key);
    if (found !== undefined) return found;
    known.set(key, all.length);
    counts.push(commonTiles(made, made));
    return all.push(made) - 1;
  };
  const ofList = (tiles: readonly number[]): TileSetId => {
    const made = noTiles(tileCount);
    for (const tile of tiles) addTile(made, tile);
    return ofBits(made);
  };
  const remembered = (join: (x: number, y: number) => number) => {
    const made = new Map<number, TileSetId>();
    return (a: TileSetId, b: TileSetId): TileSetId => {
      const key = a * 2 ** 26 + b;
      const right = bits(b);
      const set = made.get(key) ?? ofBits(bits(a).map((word, i) => join(word, right[i] as number)));
      made.set(key, set);
      return set;
    };
  };
  return {
    tileCount,
    of: (tiles) => {
      const set = knownLists.get(tiles) ?? ofList(tiles);
      knownLists.set(tiles, set);
      return set;
    },
    ofBits,
    bits,
    count: (set) => counts[set] as number,
    tiles: (set) => {
      const list = lists[set] ?? listed(bits(set), tileCount);
      lists[set] = list;
      knownLists.set(list, set);
      return list;
    },
    and: remembered((x, y) => x & y),
    without: remembered((x, y) => x & ~y),
    isWithin: (a, b) => (counts[a] as number) <= (counts[b] as number) && isWithin(bits(a), bits(b)),
    parted: (set, by) => parted(bits(set), by),
  };
}

function isWithin(own: Uint32Array, other: Uint32Array): boolean {
  for (let i = 0; i < own.length; i++) {
    if (((own[i] as number) & ~(other[i] as number)) !== 0) return false;
  }
  return true;
}

function parted(own: Uint32Array, by: Uint32Array): { within: boolean; beyond: boolean } {
  let within = false;
  let beyond = false;
  for (let i = 0; i < own.length && !(within && beyond); i++) {
    within ||= ((own[i] as number) & (by[i] as number)) !== 0;
    beyond ||= ((own[i] as number) & ~(by[i] as number)) !== 0;
  }
  return { within, beyond };
}

const listed = (bits: Uint32Array, tileCount: number): number[] => {
  const tiles: number[] = [];
  for (let tile = 0; tile < tileCount; tile++) if (hasTile(bits, tile)) tiles.push(tile);
  return tiles;
};
