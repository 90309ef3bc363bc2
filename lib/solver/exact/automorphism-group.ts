/**
 * The automorphisms of a labelled set: permutations of the vertices that keep every label.
 *
 * One is read off two refinements that end alike, after further vertices were singled out where there is a choice
 * (McKay 1981). The group is a chain of stabilisers with a transversal each (Sims 1970).
 */
import {
  type Colouring,
  type PairLabels,
  singledOut,
  stableColouring,
  type WorkLeft,
} from './partition-refinement';

/** What a vertex costs, in looks at a pair, where its image is guessed. */
const LOOKS_PER_GUESS = 10;

/**
 * An automorphism that takes one stable colouring to the other and moves fewer than `below` of the first `counted`
 * vertices, of these one that moves fewest. Null where there is none; also, or not the fewest, where work ran out.
 *
 * What has the same colour in both stays if it can; what has not, moves under every such automorphism. So where the
 * first guess holds, and it mostly does, it is the answer. Otherwise by branching, with that number as the bound.
 * With `counted` 0, the first one found. Recursion: at most one level a vertex.
 */
export function automorphismBetween(
  labels: PairLabels,
  ends: { from: Colouring; to: Colouring },
  work: WorkLeft,
  counted = 0,
  below = Number.POSITIVE_INFINITY,
): Int32Array | null {
  let best: Int32Array | null = null;
  let fewest = below;
  const visit = (from: Colouring, to: Colouring): void => {
    const leastMoved = differingColours(from, to, counted);
    if (from.cells !== to.cells || from.trace !== to.trace || leastMoved >= fewest) return;
    const guess = guessBetween(from, to);
    if (guess === null) return;
    work.pairLooks -= labels.neighbour.length + LOOKS_PER_GUESS * labels.count;
    const { image, doubtful } = guess;
    if (keepsLabels(labels, image)) {
      best = image;
      fewest = leastMoved;
      return;
    }
    if (doubtful < 0) return;
    const likely = image[doubtful] as number;
    const nextFrom = singledOut(labels, from, doubtful, work);
    for (let way = -1; way < labels.count; way++) {
      const target = way < 0 ? likely : way;
      if (way === likely || to.colour[target] !== from.colour[doubtful]) continue;
      if (work.pairLooks < 0 || leastMoved >= fewest) return;
      visit(nextFrom, singledOut(labels, to, target, work));
    }
  };
  visit(ends.from, ends.to);
  return best;
}

/** How many of the first vertices have another colour in one than in the other: so many move at least. */
export function differingColours(from: Colouring, to: Colouring, counted: number): number {
  let differing = 0;
  for (let v = 0; v < counted; v++) if (from.colour[v] !== to.colour[v]) differing++;
  return differing;
}

/** Whether the permutation keeps every label. Cost: the pairs that have one. */
function keepsLabels({ count, label, start, neighbour }: PairLabels, image: Int32Array): boolean {
  for (let v = 0; v < count; v++) {
    const row = (image[v] as number) * count;
    for (let k = start[v] as number; k < (start[v + 1] as number); k++) {
      const u = neighbour[k] as number;
      if (label[v * count + u] !== label[row + (image[u] as number)]) return false;
    }
  }
  return true;
}

/**
 * The permutation that keeps colours and leaves in place what it can, and a vertex whose image it chose: one that
 * has to move if possible, of a colour that few have; −1 where the colours left no choice. Null where the cells
 * differ in size.
 */
function guessBetween(from: Colouring, to: Colouring): { image: Int32Array; doubtful: number } | null {
  const count = from.colour.length;
  /** For each colour, those who have it only in `to`, as a list: the first, and after each the next. */
  const first = new Int32Array(count).fill(-1);
  const next = new Int32Array(count);
  for (let v = count - 1; v >= 0; v--) {
    const after = to.colour[v] as number;
    if (from.colour[v] === after) continue;
    next[v] = first[after] as number;
    first[after] = v;
  }
  const image = new Int32Array(count);
  let doubtful = -1;
  let leastRank = Number.POSITIVE_INFINITY;
  for (let v = 0; v < count; v++) {
    const cell = from.colour[v] as number;
    const stays = cell === to.colour[v];
    const comer = stays ? v : (first[cell] as number);
    if (comer < 0) return null;
    image[v] = comer;
    if (!stays) first[cell] = next[comer] as number;
    const size = from.size[cell] as number;
    const rank = size + (stays ? count : 0);
    if (size === 1 || rank >= leastRank) continue;
    doubtful = v;
    leastRank = rank;
  }
  return { image, doubtful };
}

/**
 * Automorphisms as image[vertex], the identity first. All of them where they are at most `limit` and the work
 * suffices; otherwise those that leave the first few vertices of a base in place. Always a group.
 */
export function automorphisms(labels: PairLabels, limit: number, work: WorkLeft): Int32Array[] {
  let elements = [Int32Array.from({ length: labels.count }, (_, v) => v)];
  const { base, path } = baseOf(labels, work);
  const generators: Int32Array[] = [];
  for (let level = base.length - 1; level >= 0; level--) {
    const most = Math.floor(limit / elements.length);
    const transversal = transversalAt(labels, { base, path, level }, generators, most, work);
    if (transversal === null) break;
    elements = transversal.flatMap((outer) => elements.map((inner) => inner.map((v) => outer[v] as number)));
  }
  return elements;
}

interface Base {
  /** Only the identity leaves all of these vertices in place. */
  base: number[];
  /** path[i]: the colours with the first i vertices of the base singled out. */
  path: Colouring[];
}

/** Singles out the first vertex of the smallest cell that has several, until all vertices differ. */
function baseOf(labels: PairLabels, work: WorkLeft): Base {
  const base: number[] = [];
  let last = stableColouring(labels, work);
  const path = [last];
  while (last.cells < labels.count) {
    if (work.pairLooks < 0) return { base: [], path };
    const { doubtful } = guessBetween(last, last) as { doubtful: number };
    base.push(doubtful);
    last = singledOut(labels, last, doubtful, work);
    path.push(last);
  }
  return { base, path };
}

/**
 * For each vertex that the level's base vertex can go to, one automorphism that takes it there and leaves the base
 * before it in place; the identity first. `generators` of the next level's group become those of this one's. Null
 * where the vertices are more than `most` or the work ran out.
 */
function transversalAt(
  labels: PairLabels,
  { base, path, level }: Base & { level: number },
  generators: Int32Array[],
  most: number,
  work: WorkLeft,
): Int32Array[] | null {
  const vertex = base[level] as number;
  const before = path[level] as Colouring;
  const after = path[level + 1] as Colouring;
  const reached = new Map([[vertex, Int32Array.from(before.colour, (_, v) => v)]]);
  const outside = new Set<number>();
  for (let target = 0; target < labels.count; target++) {
    if (before.colour[target] !== before.colour[vertex]) continue;
    if (reached.has(target) || outside.has(target)) continue;
    const found = automorphismBetween(
      labels,
      { from: after, to: singledOut(labels, before, target, work) },
      work,
    );
    if (work.pairLooks < 0) return null;
    if (found === null) {
      const orbit = new Set([target]);
      for (const at of orbit) for (const g of generators) orbit.add(g[at] as number);
      for (const at of orbit) outside.add(at);
      continue;
    }
    generators.push(found);
    for (const [at, taking] of reached) {
      for (const g of generators) {
        const next = g[at] as number;
        if (!reached.has(next))
          reached.set(
            next,
            taking.map((v) => g[v] as number),
          );
      }
      if (reached.size > most) return null;
    }
  }
  return [...reached.values()];
}
