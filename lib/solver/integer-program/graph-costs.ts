/**
 * Costs on any fabric, from the hop table alone (torus, diagonal links, missing and express links).
 *
 * Cone rows. For every tile r, hops(r, q) ≤ hops(r, p) + hops(p, q), so hops(p, q) ≥ f(q) − f(p) with
 * f = hops(r, ·), capped at the largest finite entry: Σ f · x[to] − Σ f · x[from] bounds the pair's hops, and is
 * equal to them for r = p. Such f are the 1-Lipschitz functions of Kantorovich's dual of transport (1942).
 */
import { undirectedDistance } from '../bounds/pair-costs';
import { type PlacementInstance, UNREACHABLE_HOPS } from '../instance';
import type { AssignmentColumns } from './assignment-columns';
import type { FillColumns, ProgramBuilder } from './integer-program';
import { addStarRows, leastTreeRow } from './star-rows';

const AT_LEAST = Number.POSITIVE_INFINITY;

type Hops = (p: number, q: number) => number;

function cappedHops(distance: ArrayLike<number>, tileCount: number): Hops {
  let cap = 0;
  for (let i = 0; i < tileCount * tileCount; i++) {
    const hops = distance[i] as number;
    if (hops < UNREACHABLE_HOPS && hops > cap) cap = hops;
  }
  return (p, q) => Math.min(cap, distance[p * tileCount + q] as number);
}

/** Rows that make the column at least hops(tile of from, tile of to). */
function addConeRows(
  builder: ProgramBuilder,
  instance: PlacementInstance,
  x: AssignmentColumns,
  hops: Hops,
  name: string,
  column: number,
  from: number,
  to: number,
): void {
  for (const r of instance.candidates[from] ?? []) {
    builder.row(`${name}_${r}`, 0, AT_LEAST, [
      [column, 1],
      ...x.weigh(to, (q) => hops(r, q), -1),
      ...x.weigh(from, (p) => hops(r, p)),
    ]);
  }
}

export function addGraphPath(
  builder: ProgramBuilder,
  instance: PlacementInstance,
  x: AssignmentColumns,
  star: Float64Array | null,
): FillColumns {
  const hops = cappedHops(instance.distance, instance.tileCount);
  const pairs = instance.pairs.map(({ from, to, weight }, k) => {
    const column = builder.column(`hops_${k}`, { lower: 1, cost: weight, integer: true });
    addConeRows(builder, instance, x, hops, `cone_${k}`, column, from, to);
    return { from, to, weight, hops: column };
  });
  addStarRows(builder, instance, x, star, pairs);
  return (tiling, values) => {
    for (const { from, to, hops: column } of pairs) {
      values[column] = Math.max(1, hops(tiling[from] as number, tiling[to] as number));
    }
  };
}

/**
 * A net's links: at least the consumers' number, at least the way to each consumer, and at least the sum of all
 * undirected distances between its terminals over ⌊t/2⌋·⌈t/2⌉ (each tree link parts at most so many pairs).
 */
export function addGraphWire(
  builder: ProgramBuilder,
  instance: PlacementInstance,
  x: AssignmentColumns,
): FillColumns {
  const hops = cappedHops(instance.distance, instance.tileCount);
  const both = cappedHops(undirectedDistance(instance), instance.tileCount);
  const symmetric = sameBothWays(hops, both, instance.tileCount);
  const nets = instance.nets.map(({ source, consumers, weight }, k) => {
    const terminals = [source, ...consumers];
    const links = builder.column(`wire_${k}`, {
      lower: consumers.length,
      cost: weight,
      integer: true,
    });
    const pairColumns = terminals.flatMap((a, i) =>
      terminals.slice(i + 1).map((b, j) => {
        const isWay = i === 0;
        const name = `span_${k}_${i}_${i + 1 + j}`;
        const column = builder.column(name, { lower: 1 });
        addConeRows(builder, instance, x, both, name, column, a, b);
        if (isWay && symmetric)
          builder.row(`way_${k}_${b}`, 0, AT_LEAST, [
            [links, 1],
            [column, -1],
          ]);
        if (isWay && !symmetric) addConeRows(builder, instance, x, hops, `way_${k}_${b}`, links, a, b);
        return { a, b, column };
      }),
    );
    const parted = Math.floor(terminals.length / 2) * Math.ceil(terminals.length / 2);
    builder.row(`wire_${k}`, 0, AT_LEAST, [
      [links, parted],
      ...pairColumns.map(({ column }) => [column, -1] as const),
    ]);
    leastTreeRow(builder, instance, x, k, links);
    return { source, consumers, links, parted, pairColumns };
  });
  return (tiling, values) => {
    for (const { source, consumers, links, parted, pairColumns } of nets) {
      let sum = 0;
      for (const { a, b, column } of pairColumns) {
        values[column] = Math.max(1, both(tiling[a] as number, tiling[b] as number));
        sum += values[column] as number;
      }
      const ways = consumers.map((c) => hops(tiling[source] as number, tiling[c] as number));
      values[links] = Math.ceil(Math.max(consumers.length, sum / parted - 1e-9, ...ways));
    }
  };
}

function sameBothWays(a: Hops, b: Hops, tileCount: number): boolean {
  for (let p = 0; p < tileCount; p++) {
    for (let q = 0; q < tileCount; q++) if (a(p, q) !== b(p, q)) return false;
  }
  return true;
}
