/**
 * Which ops the relaxation looks at together: the same in every node of the exact search. Pairs are ops that cost
 * something together, or that join two of a triple; triples let costs pass around the short cycles of the pairs, where
 * pairs alone see no contradiction (a grid has no triangles, and no three common neighbours of two tiles).
 *
 * Source: relaxations of graphical models tightened by clusters of three (Sontag, Meltzer, Globerson, Jaakkola and
 * Weiss 2008); here the clusters are all triangles and four-cycles, and fans over the longer cycles of a cycle basis.
 */
import { shortCycleBasis } from './cycle-basis';

export interface CostGraph {
  opCount: number;
  tileCount: number;
  /** Ops of each pair, first < second. */
  first: Int32Array;
  second: Int32Array;
  /** Pairs of each op. */
  pairsOf: readonly Int32Array[];
  triples: readonly OpTriple[];
  /** Tables of a node: one for each pair, then three for each triple. */
  tableCount: number;
  /** Of each table: its two ops, the lower one first, and the other op of its triple, −1 for a pair. */
  tableA: Int32Array;
  tableB: Int32Array;
  tableThird: Int32Array;
}

export interface OpTriple {
  /** Ascending. */
  a: number;
  b: number;
  c: number;
  /** The pairs (a, b), (a, c) and (b, c). */
  ab: number;
  ac: number;
  bc: number;
  /** Its first table; the next two follow. */
  table: number;
}

/** Cycles longer than this are left to the pairs. */
const LONGEST_CYCLE = 12;
/** Where pairs are as dense as in a general assignment problem, triples cost more than they gain (measured on QAPLIB). */
const MOST_TRIANGLES_A_PAIR = 2;
/** The basis of cycles takes about a tenth of a second at this size. */
const MOST_OPS_FOR_CYCLES = 400;

/** `pairs` are the ops that cost something together, each once. `work` bounds the entries of all tables. */
export function costGraph(
  opCount: number,
  tileCount: number,
  pairs: readonly (readonly [number, number])[],
  tilesOf: (op: number) => number,
  work: number,
): CostGraph {
  const graph = growingGraph(opCount, pairs);
  const limited = withinWork(graph, tilesOf, work);
  const closed = triangles(graph, MOST_TRIANGLES_A_PAIR * pairs.length);
  if (closed) {
    for (const triangle of closed) limited([triangle]);
    fourCycles(graph, limited);
    if (opCount <= MOST_OPS_FOR_CYCLES) longerCycles(graph, limited, tilesOf);
  }
  const first = Int32Array.from(graph.pairs, ([a]) => a);
  const second = Int32Array.from(graph.pairs, ([, b]) => b);
  const lists = Array.from({ length: opCount }, (): number[] => []);
  for (const [pair, ends] of graph.pairs.entries()) for (const op of ends) lists[op]?.push(pair);
  const pairsOf = lists.map((list) => Int32Array.from(list));
  const triples = graph.triples.map(({ a, b, c }, i) => ({
    a,
    b,
    c,
    ab: graph.pairAt(a, b),
    ac: graph.pairAt(a, c),
    bc: graph.pairAt(b, c),
    table: graph.pairs.length + 3 * i,
  }));
  const tableOps = [
    ...graph.pairs.map(([a, b]) => [a, b, -1] as const),
    ...triples.flatMap(({ a, b, c }) => [[a, b, c] as const, [a, c, b] as const, [b, c, a] as const]),
  ];
  return {
    opCount,
    tileCount,
    first,
    second,
    pairsOf,
    triples,
    tableCount: tableOps.length,
    tableA: Int32Array.from(tableOps, ([a]) => a),
    tableB: Int32Array.from(tableOps, ([, b]) => b),
    tableThird: Int32Array.from(tableOps, ([, , third]) => third),
  };
}

interface GrowingGraph {
  pairs: [number, number][];
  triples: { a: number; b: number; c: number }[];
  /** Ops that cost something together. */
  neighbours: readonly ReadonlySet<number>[];
  /** −1 where there is none. */
  pairAt(one: number, other: number): number;
  addTriple(x: number, y: number, z: number): void;
}

function growingGraph(opCount: number, given: readonly (readonly [number, number])[]): GrowingGraph {
  const pairs: [number, number][] = [];
  const numbers = new Map<number, number>();
  const known = new Set<string>();
  const triples: GrowingGraph['triples'] = [];
  const keyOf = (one: number, other: number) => Math.min(one, other) * opCount + Math.max(one, other);
  const addPair = (one: number, other: number) => {
    if (numbers.has(keyOf(one, other))) return;
    numbers.set(keyOf(one, other), pairs.length);
    pairs.push([Math.min(one, other), Math.max(one, other)]);
  };
  for (const [one, other] of given) addPair(one, other);
  const neighbours = Array.from({ length: opCount }, () => new Set<number>());
  for (const [one, other] of pairs) {
    neighbours[one]?.add(other);
    neighbours[other]?.add(one);
  }
  return {
    pairs,
    triples,
    neighbours,
    pairAt: (one, other) => numbers.get(keyOf(one, other)) ?? -1,
    addTriple(x, y, z) {
      const [a, b, c] = [x, y, z].sort((one, other) => one - other) as [number, number, number];
      const key = `${a},${b},${c}`;
      if (known.has(key)) return;
      known.add(key);
      addPair(a, b);
      addPair(a, c);
      addPair(b, c);
      triples.push({ a, b, c });
    },
  };
}

type Three = readonly [number, number, number];
type AddTriples = (triples: readonly Three[]) => void;

/** Adds triples as long as all tables together stay within the work; each lot whole or not at all. */
function withinWork(graph: GrowingGraph, tilesOf: (op: number) => number, work: number): AddTriples {
  let used = graph.pairs.reduce((sum, [a, b]) => sum + tilesOf(a) * tilesOf(b), 0);
  return (triples) => {
    // Three messages, and at most two new pairs.
    const size = triples.reduce(
      (sum, [x, y, z]) =>
        sum + 2 * (tilesOf(x) * tilesOf(y) + tilesOf(x) * tilesOf(z) + tilesOf(y) * tilesOf(z)),
      0,
    );
    if (used + size > work) return;
    used += size;
    for (const [x, y, z] of triples) graph.addTriple(x, y, z);
  };
}

/** Null where there are more than `most`: a net of hundreds of consumers has millions. */
function triangles({ pairs, neighbours }: GrowingGraph, most: number): Three[] | null {
  const found: Three[] = [];
  for (const [a, b] of pairs) {
    for (const c of neighbours[a] as ReadonlySet<number>) {
      if (c <= b || !neighbours[b]?.has(c)) continue;
      if (found.length >= most) return null;
      found.push([a, b, c]);
    }
  }
  return found;
}

/** Two ops with several common neighbours: a chord between them, and a triple with each of those. */
function fourCycles({ neighbours }: GrowingGraph, add: AddTriples): void {
  for (let a = 0; a < neighbours.length; a++) {
    const own = neighbours[a] as ReadonlySet<number>;
    const reached = new Set([...own].flatMap((between) => [...(neighbours[between] as ReadonlySet<number>)]));
    for (const b of [...reached].sort((one, other) => one - other)) {
      if (b <= a || own.has(b)) continue;
      const common = [...own].filter((between) => neighbours[b]?.has(between));
      if (common.length > 1) add(common.map((between) => [a, between, b] as const));
    }
  }
}

/** A fan of triples over each longer cycle of a basis, from the op that needs the fewest new chords. */
function longerCycles(graph: GrowingGraph, add: AddTriples, tilesOf: (op: number) => number): void {
  for (const cycle of shortCycleBasis(graph.neighbours, LONGEST_CYCLE)) {
    if (cycle.length < 5) continue;
    const at = (i: number) => cycle[i % cycle.length] as number;
    let apex = 0;
    let least = Number.POSITIVE_INFINITY;
    for (let i = 0; i < cycle.length; i++) {
      let chords = 0;
      for (let k = 2; k < cycle.length - 1; k++) if (graph.pairAt(at(i), at(i + k)) < 0) chords++;
      const score = chords * graph.neighbours.length * 1e4 + tilesOf(at(i));
      if (score < least) {
        least = score;
        apex = i;
      }
    }
    add(
      Array.from(
        { length: cycle.length - 2 },
        (_, k) => [at(apex), at(apex + k + 1), at(apex + k + 2)] as const,
      ),
    );
  }
}
