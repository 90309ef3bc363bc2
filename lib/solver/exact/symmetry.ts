/**
 * Symmetries of a placement problem: what an exact search need not try twice.
 * Both kinds are found from the instance's data alone; nothing is assumed about topologies or kernels.
 */
import type { PlacementInstance } from '../instance';
import { automorphismBetween, automorphisms, differingColours } from './automorphism-group';
import {
  type Colouring,
  type PairLabels,
  pairLabels,
  singledOut,
  stableColouring,
  type WorkLeft,
} from './partition-refinement';

/** Above so many tiles only the identity is returned: the table of labels would take its time. */
export const LARGEST_FABRIC_TILES = 576;
/** Above so many ops (and, for `wire`, nets) together no symmetry of the kernel is looked for. */
export const LARGEST_KERNEL_VERTICES = 400;

/** Work on one fabric, and on one kernel; counted, so that the same instance always gets the same list. */
const FABRIC_PAIR_LOOKS = 5e7;
const KERNEL_PAIR_LOOKS = 2e7;
/** For one pair of ops: a pair that resists must not use up the work of the others. */
const ONE_PAIR_LOOKS = 3e5;

interface DirectedLink {
  from: number;
  to: number;
  channels: number;
}

/**
 * Permutations of the tiles, image[tile], the identity first: they keep every op's candidates, all distances and
 * the links with their channels. All there are, where they are at most `limit`. Otherwise, or where the work (about
 * 0.3 s) does not suffice, a subgroup: those that leave a few chosen tiles in place, at worst the identity alone.
 * Always a group. Only the identity above `LARGEST_FABRIC_TILES`.
 */
export function fabricSymmetries(
  instance: PlacementInstance,
  links: readonly DirectedLink[],
  limit: number,
): Int32Array[] {
  const { tileCount, distance } = instance;
  if (tileCount > LARGEST_FABRIC_TILES) return [Int32Array.from({ length: tileCount }, (_, tile) => tile)];
  const label = Int32Array.from(distance);
  const channelsAt = new Map<number, number[]>();
  for (const { from, to, channels } of links) {
    const at = from * tileCount + to;
    channelsAt.set(at, [...(channelsAt.get(at) ?? []), channels]);
  }
  const numberOf = numbering();
  for (const [at, channels] of channelsAt) {
    // Beyond every distance, so that no link is taken for a pair without one.
    label[at] = 0x10000 + numberOf(`${distance[at]}:${channels.sort((a, b) => a - b).join()}`);
  }
  const work = { pairLooks: FABRIC_PAIR_LOOKS };
  return automorphisms(pairLabels(tileCount, label, tileColours(instance)), limit, work);
}

/** Tiles get the same colour if they are candidates of the same ops. Linear in all candidate lists. */
function tileColours({ tileCount, candidates }: PlacementInstance): Int32Array {
  const colour = new Int32Array(tileCount);
  let used = 1;
  for (const tiles of candidates) {
    const inside = new Map<number, number>();
    for (const tile of tiles) {
      const old = colour[tile] as number;
      const known = inside.get(old) ?? used++;
      inside.set(old, known);
      colour[tile] = known;
    }
  }
  return colour;
}

/** Gives equal keys equal numbers, 0 first. */
function numbering(): (key: string | number) => number {
  const known = new Map<string | number, number>();
  return (key) => {
    const number = known.get(key) ?? known.size;
    known.set(key, number);
    return number;
  };
}

/**
 * Permutations of the ops, image[op], the identity not among them: they keep candidate lists, the pairs (with their
 * weights for `path`) and, for `wire`, the nets with their weights. Under `path` a net is what its source's pairs
 * say, as `buildInstance` makes them. For any ops i and j of one orbit the list has one of those that take i to j
 * and move the fewest ops: the exchange of the two if that is a symmetry. At most `limit`: first those that join
 * the orbits together, then the others, among each the ones that move fewest. In general the list is no group.
 *
 * Empty above `LARGEST_KERNEL_VERTICES`. Where the bounded work (about 0.1 s) ends early, some are missing or not
 * the smallest; each one that is there is right.
 */
export function kernelSymmetries(instance: PlacementInstance, limit: number): Int32Array[] {
  const { opCount } = instance;
  const nets = instance.objective === 'wire' ? joinedNets(instance) : [];
  if (limit <= 0 || opCount + nets.length > LARGEST_KERNEL_VERTICES) return [];
  const labels = kernelLabels(instance, nets);
  const open = alikePairs(labels, opCount, { pairLooks: KERNEL_PAIR_LOOKS / 2 });
  const work = { pairLooks: KERNEL_PAIR_LOOKS / 2 };
  const orbits = orbitBook(opCount);
  const found = new Map<string, KernelSymmetry>();
  /** [i · opCount + j]: how many ops move under the smallest symmetry found that takes i to j; 0 where none is. */
  const movedAt = new Uint16Array(opCount * opCount);
  for (const { i, j, from, to, leastMoved } of open) {
    // With the list full or most of the work gone, only what joins orbits is looked for.
    const isFull = found.size >= limit || work.pairLooks < KERNEL_PAIR_LOOKS / 8;
    const isKnown = orbits.areOne(i, j);
    const knownMoves = movedAt[i * opCount + j] || Number.POSITIVE_INFINITY;
    if (work.pairLooks < 0 || orbits.areApart(i, j)) continue;
    if (isKnown && (isFull || knownMoves <= leastMoved)) continue;
    const own = { pairLooks: Math.min(work.pairLooks, ONE_PAIR_LOOKS) };
    const granted = own.pairLooks;
    const whole = automorphismBetween(labels, { from, to }, own, opCount, knownMoves);
    work.pairLooks -= granted - own.pairLooks;
    if (whole === null) {
      if (own.pairLooks >= 0 && !isKnown) orbits.setApart(i, j);
      continue;
    }
    const there = kernelSymmetry(whole.slice(0, opCount));
    const back = kernelSymmetry(inverse(there.image));
    for (const one of [there, back]) {
      found.set(one.key, one);
      for (const op of one.moved) {
        const at = op * opCount + (one.image[op] as number);
        movedAt[at] = Math.min(movedAt[at] || opCount, one.moved.length);
        orbits.join(op, one.image[op] as number);
      }
    }
  }
  return joiningFirst([...found.values()], opCount)
    .slice(0, limit)
    .map(({ image }) => image);
}

interface KernelSymmetry {
  image: Int32Array;
  moved: number[];
  key: string;
}

function kernelSymmetry(image: Int32Array): KernelSymmetry {
  const moved = Array.from(image, (_, op) => op).filter((op) => image[op] !== op);
  return { image, moved, key: moved.map((op) => `${op}>${image[op]}`).join() };
}

function joiningFirst(all: readonly KernelSymmetry[], opCount: number): KernelSymmetry[] {
  const orbits = orbitBook(opCount);
  const joins: KernelSymmetry[] = [];
  const others: KernelSymmetry[] = [];
  for (const one of [...all].sort((a, b) => a.moved.length - b.moved.length)) {
    const isNew = one.moved.some((op) => !orbits.areOne(op, one.image[op] as number));
    (isNew ? joins : others).push(one);
    for (const op of one.moved) orbits.join(op, one.image[op] as number);
  }
  return [...joins, ...others];
}

interface AlikePair {
  i: number;
  j: number;
  from: Colouring;
  to: Colouring;
  leastMoved: number;
}

/**
 * Pairs of ops that refinement cannot tell apart, each with the colourings that single out the one and the other.
 * First those with the fewest ops whose colours differ there: so many ops have to move.
 */
function alikePairs(labels: PairLabels, opCount: number, work: WorkLeft): AlikePair[] {
  const stable = stableColouring(labels, work);
  const single = new Map<number, Colouring>();
  const singleAt = (op: number): Colouring => {
    const known = single.get(op) ?? singledOut(labels, stable, op, work);
    single.set(op, known);
    return known;
  };
  const pairs: AlikePair[] = [];
  for (let i = 0; i < opCount; i++) {
    for (let j = i + 1; j < opCount && work.pairLooks >= 0; j++) {
      if (stable.colour[i] !== stable.colour[j]) continue;
      const from = singleAt(i);
      const to = singleAt(j);
      if (from.trace !== to.trace || work.pairLooks < 0) continue;
      work.pairLooks -= opCount;
      pairs.push({ i, j, from, to, leastMoved: differingColours(from, to, opCount) });
    }
  }
  return pairs.sort((a, b) => a.leastMoved - b.leastMoved);
}

interface JoinedNet {
  source: number;
  consumers: number[];
  /** Of all nets with this source and these consumers, ascending. */
  weights: number[];
}

function joinedNets({ nets }: PlacementInstance): JoinedNet[] {
  const joined = new Map<string, JoinedNet>();
  for (const { source, consumers, weight } of nets) {
    const distinct = [...new Set(consumers)].sort((a, b) => a - b);
    const key = `${source}>${distinct.join()}`;
    const known = joined.get(key) ?? { source, consumers: distinct, weights: [] };
    known.weights.push(weight);
    known.weights.sort((a, b) => a - b);
    joined.set(key, known);
  }
  return [...joined.values()];
}

/** Ops, then nets as vertices of their own: a net's source and consumers are its pairs with ops. */
function kernelLabels(
  { opCount, candidates, pairs, objective }: PlacementInstance,
  nets: readonly JoinedNet[],
): PairLabels {
  const count = opCount + nets.length;
  const label = new Int32Array(count * count);
  const weightAt = new Map<number, number>();
  for (const { from, to, weight } of pairs) {
    const at = from * count + to;
    weightAt.set(at, (weightAt.get(at) ?? 0) + weight);
  }
  const numberOf = numbering();
  for (const [at, weight] of weightAt) label[at] = 1 + numberOf(objective === 'path' ? weight : 'pair');
  nets.forEach(({ source, consumers }, i) => {
    const net = opCount + i;
    label[source * count + net] = 1;
    for (const consumer of consumers) label[net * count + consumer] = 1;
  });
  const colourOf = numbering();
  const colour = Int32Array.from({ length: count }, (_, v) =>
    colourOf(v < opCount ? `op ${candidates[v]?.join()}` : `net ${nets[v - opCount]?.weights.join()}`),
  );
  return pairLabels(count, label, colour);
}

function inverse(image: Int32Array): Int32Array {
  const back = new Int32Array(image.length);
  image.forEach((to, op) => {
    back[to] = op;
  });
  return back;
}

/** Which ops are known to be in one orbit, and which orbits are known to be different ones. */
function orbitBook(opCount: number) {
  const leader = Int32Array.from({ length: opCount }, (_, op) => op);
  const apart = new Uint8Array(opCount * opCount);
  const leaderOf = (op: number): number => {
    let at = op;
    while (leader[at] !== at) at = leader[at] as number;
    return at;
  };
  const areOne = (i: number, j: number): boolean => leaderOf(i) === leaderOf(j);
  const areApart = (i: number, j: number): boolean => apart[leaderOf(i) * opCount + leaderOf(j)] === 1;
  const setApart = (i: number, j: number): void => {
    const [a, b] = [leaderOf(i), leaderOf(j)];
    apart[a * opCount + b] = 1;
    apart[b * opCount + a] = 1;
  };
  const join = (i: number, j: number): void => {
    const [a, b] = [leaderOf(i), leaderOf(j)];
    if (a === b) return;
    leader[b] = a;
    for (let op = 0; op < opCount; op++) if (apart[b * opCount + op] === 1) setApart(a, op);
  };
  return { areOne, areApart, setApart, join };
}
