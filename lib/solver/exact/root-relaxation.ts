/** The relaxation of the whole problem: the pairs' costs of the instance, nothing yet moved. */
import { neighboursOf, pairCosts, type WeightedPair } from '../bounds/pair-costs';
import type { PlacementInstance } from '../instance';
import { matchOps } from '../search/matching';
import { costGraph } from './cost-graph';
import { blankRelaxation, layTables, NOBODY, type Relaxation } from './relaxation';

/** Entries of all tables together, before anything is struck out. */
export function tableEntries(instance: PlacementInstance): number {
  const size = (op: number) => instance.candidates[op]?.length ?? 0;
  const both = neighboursOf(instance).reduce(
    (sum, others, op) => sum + [...others].reduce((all, other) => all + size(op) * size(other), 0),
    0,
  );
  return both / 2;
}

/** Entries of all tables of pairs and triples together; triples beyond it are left out. */
const TABLE_WORK = 4_000_000;

/** Null where not even one tile for each op can be found. */
export function rootRelaxation(instance: PlacementInstance): Relaxation | null {
  const { tileCount, opCount, candidates } = instance;
  const matched = matchOps(candidates, tileCount);
  if (!matched.ok) return null;
  const tilesOf = (op: number) => candidates[op]?.length ?? 0;
  const groups = joined(pairCosts(instance));
  const ends = groups.map(({ a, b }) => [a, b] as const);
  const graph = costGraph(opCount, tileCount, ends, tilesOf, TABLE_WORK);
  const root = blankRelaxation(graph);
  root.freeCount = opCount;
  root.residual.fill(Number.POSITIVE_INFINITY);
  candidates.forEach((tiles, op) => {
    root.free[op] = op;
    root.domain.set(tiles, op * tileCount);
    root.domainSize[op] = tiles.length;
    for (const tile of tiles) root.residual[op * tileCount + tile] = 0;
  });
  root.tables = new Float64Array(layTables(root, () => true));
  graph.first.forEach((a, pair) => {
    const b = graph.second[pair] as number;
    const group = groups[pair] ?? { a, b, terms: [] };
    fillTable(root.tables, root.tableAt[pair] as number, group, candidates, tileCount);
  });
  root.tileOf.set(matched.tiling);
  root.holderOf.fill(NOBODY);
  root.tileOf.forEach((tile, op) => {
    root.holderOf[tile] = op;
  });
  return root;
}

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
  candidates: PlacementInstance['candidates'],
  tileCount: number,
): void {
  let at = offset;
  for (const p of candidates[a] as readonly number[]) {
    for (const q of candidates[b] as readonly number[]) {
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
