/**
 * Tells the vertices of a labelled set apart by what they see of the others (colour refinement: Weisfeiler and Leman
 * 1968), also after single vertices got a colour of their own (McKay 1981).
 */

export interface PairLabels {
  count: number;
  /** [v · count + u]: the label of the ordered pair (v, u); 0 is the one that most pairs have. */
  label: Int32Array;
  /** The pairs (v, neighbour[k]) that have a label one way or the other: k from start[v] to start[v + 1] − 1. */
  start: Int32Array;
  neighbour: Int32Array;
  /** Both labels of the pair in one number. Equal labels give equal digests, not always the reverse. */
  digest: Int32Array;
}

/** Cells of vertices of one colour, in an order that depends on the labels alone, not on the vertices' numbers. */
export interface Colouring {
  /** The vertices cell by cell. */
  order: Int32Array;
  /** A vertex's colour: where its cell starts in `order`. */
  colour: Int32Array;
  /** How many vertices have the colour. */
  size: Int32Array;
  cells: number;
  /** A digest of the last refinement: where two differ, no automorphism takes one colouring to the other. */
  trace: number;
}

/** What is left to spend, in looks at a pair of about 2 ns; below zero the work was broken off. */
export interface WorkLeft {
  pairLooks: number;
}

/** What a vertex costs besides its pairs where its cell is split. */
const LOOKS_PER_VERTEX = 10;

/** Multiplication by odd numbers spreads bits (Knuth 1973, 6.4). A collision costs time, never correctness. */
const spread = (value: number): number => {
  const mixed = Math.imul(value, 0x9e3779b1);
  return Math.imul(mixed ^ (mixed >>> 15), 0x85ebca6b);
};

/** Takes labels over, and the colours into the labels of the pairs (v, v). Cost: count². */
export function pairLabels(count: number, label: Int32Array, colour: Int32Array): PairLabels {
  const own = new Map<string, number>();
  const start = new Int32Array(count + 1);
  for (let v = 0; v < count; v++) {
    const key = `${label[v * count + v]} ${colour[v]}`;
    own.set(key, own.get(key) ?? own.size + 1);
    label[v * count + v] = own.get(key) as number;
  }
  const neighbours: number[] = [];
  const digests: number[] = [];
  for (let v = 0; v < count; v++) {
    for (let u = 0; u < count; u++) {
      const there = label[v * count + u] as number;
      const back = label[u * count + v] as number;
      if (there === 0 && back === 0) continue;
      neighbours.push(u);
      digests.push(spread((spread(there + 1) ^ (u === v ? 1 : 0)) + back));
    }
    start[v + 1] = neighbours.length;
  }
  return { count, label, start, neighbour: Int32Array.from(neighbours), digest: Int32Array.from(digests) };
}

/** The coarsest colouring whose vertices of a colour see alike. Cost: about the labelled pairs · log of the vertices. */
export function stableColouring(labels: PairLabels, work: WorkLeft): Colouring {
  const { count } = labels;
  const all = Int32Array.from({ length: count }, (_, v) => v);
  const size = new Int32Array(count);
  size[0] = count;
  const parts = {
    order: all.slice(),
    colour: new Int32Array(count),
    size,
    cells: Math.min(count, 1),
    trace: 0,
  };
  return refine(labels, parts, [...all], work);
}

/** The coarsest one below a stable colouring in which one vertex has a colour of its own. */
export function singledOut(labels: PairLabels, from: Colouring, vertex: number, work: WorkLeft): Colouring {
  const order = from.order.slice();
  const colour = from.colour.slice();
  const size = from.size.slice();
  const start = colour[vertex] as number;
  const length = size[start] as number;
  if (length === 1) return from;
  const end = start + length - 1;
  order[order.indexOf(vertex, start)] = order[end] as number;
  order[end] = vertex;
  colour[vertex] = end;
  size[start] = length - 1;
  size[end] = 1;
  return refine(labels, { order, colour, size, cells: from.cells + 1, trace: 0 }, [vertex], work);
}

/** Splits cells by what their vertices see of the vertices whose colour is new, until nothing is new. */
function refine(labels: PairLabels, parts: Colouring, recoloured: number[], work: WorkLeft): Colouring {
  const { count, start, neighbour, digest } = labels;
  const { colour } = parts;
  const sight = new Int32Array(count);
  let fresh = recoloured;
  while (fresh.length > 0 && parts.cells < count && work.pairLooks >= 0) {
    const isSeen = new Uint8Array(count);
    for (const u of fresh) {
      const hue = spread((colour[u] as number) + 1);
      const end = start[u + 1] as number;
      for (let k = start[u] as number; k < end; k++) {
        const v = neighbour[k] as number;
        const one = Math.imul((digest[k] as number) ^ hue, 0x85ebca6b);
        sight[v] = (sight[v] as number) + Math.imul(one ^ (one >>> 13), 0x9e3779b1);
        isSeen[colour[v] as number] = 1;
      }
      work.pairLooks -= end - (start[u] as number);
    }
    work.pairLooks -= 2 * count;
    const next: number[] = [];
    for (let cell = 0; cell < count; cell++) {
      if (isSeen[cell] !== 1) continue;
      work.pairLooks -= LOOKS_PER_VERTEX * (parts.size[cell] as number);
      splitCell(parts, cell, sight, next);
    }
    sight.fill(0);
    fresh = next;
  }
  return parts;
}

/** The largest part keeps the cell's colour; the vertices of the others are added to `fresh`. */
function splitCell(parts: Colouring, cell: number, sight: Int32Array, fresh: number[]): void {
  const { order, colour, size } = parts;
  const members = order.subarray(cell, cell + (size[cell] as number));
  const note = (key: number, length: number) => {
    parts.trace = spread(spread(parts.trace + key) + length * colour.length + cell);
  };
  const first = sight[members[0] as number] as number;
  if (members.every((v) => sight[v] === first)) {
    note(first, members.length);
    return;
  }
  const groups = new Map<number, number[]>();
  for (const v of members) {
    const key = sight[v] as number;
    const group = groups.get(key);
    if (group) group.push(v);
    else groups.set(key, [v]);
  }
  const ranked = [...groups].sort(([a, as], [b, bs]) => bs.length - as.length || a - b);
  let at = cell;
  for (const [key, group] of ranked) {
    note(key, group.length);
    order.set(group, at);
    size[at] = group.length;
    if (at !== cell) {
      for (const v of group) colour[v] = at;
      fresh.push(...group);
      parts.cells++;
    }
    at += group.length;
  }
}
