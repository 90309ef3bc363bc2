/**
 * The cost that the search minimises: one term a pair (`path`) or a net (`wire`), evaluated on the hop table.
 *
 * Path objective: exact without congestion. Wire objective: exact for nets of up to three terminals; above that an
 * upper bound of the least tree (tree-estimate.ts). Paths beyond the hop limit cost `LIMIT_PENALTY` and their excess.
 */
import { type PlacementInstance, UNREACHABLE_HOPS, withinReach } from '../instance';
import { type LengthOf, treeEstimates } from './tree-estimate';

export const LIMIT_PENALTY = 1000;

export interface PlacementCost {
  termCount: number;
  /** Terms that an op takes part in. */
  termsOf: readonly (readonly number[])[];
  /** Ops that share a term with an op, without itself. */
  neighboursOf: readonly (readonly number[])[];
  /** Cost of one term under a tiling. */
  term(term: number, tiling: Int32Array): number;
  total(tiling: Int32Array): number;
  /** What a net costs with no other net around: its term, or the sum of its pairs' terms. */
  net(net: number, tiling: Int32Array): number;
}

/** What is not in `table`, from the first op to the second, is counted by `more`. */
interface Term {
  ops: readonly number[];
  weight: number;
  table: Uint16Array;
  more: LengthOf | null;
}

export function placementCost(instance: PlacementInstance): PlacementCost {
  const terms = instance.objective === 'path' ? pairTerms(instance) : netTerms(instance);
  const termsOf: number[][] = Array.from({ length: instance.opCount }, () => []);
  const neighbours = Array.from({ length: instance.opCount }, () => new Set<number>());
  terms.forEach(({ ops }, t) => {
    for (const op of ops) {
      termsOf[op]?.push(t);
      for (const other of ops) if (other !== op) neighbours[op]?.add(other);
    }
  });
  const term = termCost(instance.tileCount, terms);
  return {
    termCount: terms.length,
    termsOf,
    neighboursOf: neighbours.map((set) => [...set]),
    term,
    total: (tiling) => {
      let sum = 0;
      for (let t = 0; t < terms.length; t++) sum += term(t, tiling);
      return sum;
    },
    net: netCost(instance, term),
  };
}

function termCost(tileCount: number, terms: readonly Term[]): PlacementCost['term'] {
  const from = Int32Array.from(terms, ({ ops }) => ops[0] ?? 0);
  const to = Int32Array.from(terms, ({ ops }) => ops[1] ?? 0);
  const weight = Float64Array.from(terms, (term) => term.weight);
  const table = terms.map((term) => term.table);
  const more = terms.map((term) => term.more);
  return (t, tiling) => {
    const rest = more[t];
    if (rest) return (weight[t] as number) * rest(tiling);
    const at = (tiling[from[t] as number] as number) * tileCount + (tiling[to[t] as number] as number);
    return (weight[t] as number) * ((table[t] as Uint16Array)[at] as number);
  };
}

function netCost(instance: PlacementInstance, term: PlacementCost['term']): PlacementCost['net'] {
  if (instance.objective === 'wire') return term;
  const pairsFrom: number[][] = Array.from({ length: instance.opCount }, () => []);
  instance.pairs.forEach(({ from }, pair) => {
    pairsFrom[from]?.push(pair);
  });
  const pairsOf = instance.nets.map(({ source }) => pairsFrom[source] as number[]);
  return (net, tiling) => {
    let sum = 0;
    for (const pair of pairsOf[net] as number[]) sum += term(pair, tiling);
    return sum;
  };
}

function pairTerms(instance: PlacementInstance): Term[] {
  const table = hopTable(instance, (hops) => hops);
  return instance.pairs.map(({ from, to, weight }) => ({ ops: [from, to], weight, table, more: null }));
}

function netTerms(instance: PlacementInstance): Term[] {
  const table = hopTable(instance, (hops) => hops);
  const isLimited = table !== instance.distance;
  const excess = isLimited ? hopTable(instance, () => 0) : null;
  const estimate = treeEstimates(instance);
  return instance.nets.map(({ source, consumers, weight }) => {
    const ops = [source, ...consumers];
    if (ops.length === 2) return { ops, weight, table, more: null };
    const length = estimate(ops);
    return {
      ops,
      weight,
      table,
      more: excess ? withExcess(length, excess, instance.tileCount, ops) : length,
    };
  });
}

const withExcess =
  (length: LengthOf, excess: Uint16Array, tileCount: number, ops: readonly number[]): LengthOf =>
  (tiling) => {
    let sum = length(tiling);
    const row = (tiling[ops[0] as number] as number) * tileCount;
    for (let k = 1; k < ops.length; k++) sum += excess[row + (tiling[ops[k] as number] as number)] as number;
    return sum;
  };

/** The hop table itself where every path is within the limit; else paths beyond it at their price. */
export function hopTable(instance: PlacementInstance, inReach: (hops: number) => number): Uint16Array {
  if (instance.distance.every((hops) => withinReach(instance, hops))) return instance.distance;
  const limit = instance.maxHops ?? 0;
  return instance.distance.map((hops) => {
    if (withinReach(instance, hops)) return inReach(hops);
    return LIMIT_PENALTY + (hops === UNREACHABLE_HOPS ? instance.tileCount : hops - limit);
  });
}
