/** The relaxation of the whole problem: the pairs' costs of the instance, nothing yet moved. */
import { neighboursOf, pairCosts, type WeightedPair } from '../bounds/pair-costs';
import type { PlacementInstance } from '../instance';
import { matchOps } from '../search/matching';
import { listPairs, NOBODY, type PairTable, type Relaxation } from './relaxation';

/** Entries of all tables together, before anything is struck out. */
export function tableEntries(instance: PlacementInstance): number {
  const size = (op: number) => instance.candidates[op]?.length ?? 0;
  const both = neighboursOf(instance).reduce(
    (sum, others, op) => sum + [...others].reduce((all, other) => all + size(op) * size(other), 0),
    0,
  );
  return both / 2;
}

/** Null where not even one tile for each op can be found. */
export function rootRelaxation(instance: PlacementInstance): Relaxation | null {
  const { tileCount, opCount, candidates } = instance;
  const matched = matchOps(candidates, tileCount);
  if (!matched.ok) return null;
  const domains = candidates.map((tiles) => Int32Array.from(tiles));
  const residual = new Float64Array(opCount * tileCount).fill(Number.POSITIVE_INFINITY);
  domains.forEach((domain, op) => {
    for (const tile of domain) residual[op * tileCount + tile] = 0;
  });
  const groups = joined(pairCosts(instance));
  const size = groups.reduce((sum, { a, b }) => sum + sizeOf(domains, a) * sizeOf(domains, b), 0);
  const tables = new Float64Array(size);
  const pairs: PairTable[] = [];
  let offset = 0;
  for (const group of groups) {
    pairs.push({ a: group.a, b: group.b, offset });
    fillTable(tables, offset, group, domains, tileCount);
    offset += sizeOf(domains, group.a) * sizeOf(domains, group.b);
  }
  const tileOf = Int32Array.from(matched.tiling);
  const holderOf = new Int32Array(tileCount).fill(NOBODY);
  tileOf.forEach((tile, op) => {
    holderOf[tile] = op;
  });
  return {
    tileCount,
    ops: Int32Array.from({ length: opCount }, (_, op) => op),
    domains,
    residual,
    pairs,
    tables,
    pairsOf: listPairs(pairs, opCount),
    emptyCost: new Float64Array(tileCount),
    tileOf,
    holderOf,
    constant: 0,
  };
}

const sizeOf = (domains: readonly Int32Array[], op: number): number => (domains[op] as Int32Array).length;

interface Group {
  a: number;
  b: number;
  terms: WeightedPair[];
}

/** All costs between the same two ops, the lower op first. */
function joined(costs: readonly WeightedPair[]): Group[] {
  const groups = new Map<string, Group>();
  for (const term of costs) {
    const [a, b] = term.a < term.b ? [term.a, term.b] : [term.b, term.a];
    const key = `${a}:${b}`;
    const known = groups.get(key);
    if (known) known.terms.push(term);
    else groups.set(key, { a, b, terms: [term] });
  }
  return [...groups.values()];
}

function fillTable(
  tables: Float64Array,
  offset: number,
  { a, b, terms }: Group,
  domains: readonly Int32Array[],
  tileCount: number,
): void {
  let at = offset;
  for (const p of domains[a] as Int32Array) {
    for (const q of domains[b] as Int32Array) {
      let cost = p === q ? Number.POSITIVE_INFINITY : 0;
      for (const { a: first, weight, table } of terms) {
        const entry = table[first === a ? p * tileCount + q : q * tileCount + p] as number;
        if (entry === Number.POSITIVE_INFINITY) cost = entry;
        else cost += weight * entry;
      }
      tables[at++] = cost;
    }
  }
}
