/**
 * The full model: placement and routes at once, exact on every fabric with R5, R6 and R7.
 *
 * y[net, link] says that the net's tree uses the link; each pair sends one unit of flow from producer to consumer
 * over links of the net. With x and y whole, a pair's least flow is a shortest way within the net's links, so
 * Σ flow ≤ maxHops says that such a way of at most maxHops links exists, and the tree of shortest ways from the
 * source is a legal route (multi-commodity fixed-charge network design: Magnanti and Wong 1984).
 */
import type { LinkGraph } from '../../fabric/link-graph';
import type { PlacementInstance } from '../instance';
import { type AssignmentColumns, addAssignment } from './assignment-columns';
import { type IntegerProgram, type ProgramBuilder, programBuilder } from './integer-program';

export interface RoutedMappingPoint {
  tiling: Int32Array;
  /** Links of each net of the instance, by index, in its order. */
  netLinks: number[][];
}

export interface RoutedProgram {
  program: IntegerProgram;
  encode(point: RoutedMappingPoint): Float64Array;
  decode(values: ArrayLike<number>): RoutedMappingPoint | null;
}

export const routedColumnCount = (instance: PlacementInstance, links: number): number =>
  instance.candidates.reduce((sum, list) => sum + list.length, 0) +
  links * (instance.nets.length + instance.nets.reduce((sum, net) => sum + net.consumers.length, 0));

/** `knownBound` is a proven bound of the objective, kept as a row. */
export function routedProgram(
  instance: PlacementInstance,
  graph: LinkGraph,
  knownBound: number,
): RoutedProgram {
  const builder = programBuilder();
  const x = addAssignment(builder, instance);
  const use = instance.nets.map((net, n) =>
    graph.links.map((_, link) =>
      builder.column(`y_${n}_${link}`, {
        lower: 0,
        upper: 1,
        integer: true,
        cost: instance.objective === 'wire' ? net.weight : 0,
      }),
    ),
  );
  addCapacityRows(builder, graph, use);
  const weightOf = new Map(instance.pairs.map((pair) => [`${pair.from},${pair.to}`, pair.weight]));
  const flows = instance.nets.flatMap((net, n) =>
    net.consumers.map((consumer) => {
      const weight = instance.objective === 'path' ? (weightOf.get(`${net.source},${consumer}`) ?? 0) : 0;
      return addFlow(builder, instance, graph, x, use[n] as number[], {
        net: n,
        from: net.source,
        to: consumer,
        weight,
      });
    }),
  );
  instance.nets.forEach((net, n) => {
    const links = (use[n] as number[]).map((column) => [column, 1] as const);
    builder.row(`least_${n}`, net.consumers.length, Number.POSITIVE_INFINITY, links);
  });
  addBoundRow(builder, instance, use, flows, knownBound);
  const weights = (instance.objective === 'path' ? instance.pairs : instance.nets).map((one) => one.weight);
  const program = builder.finish({ hasIntegerObjective: weights.every(Number.isInteger) });
  return {
    program,
    decode: (values) => {
      const tiling = x.decode(values);
      if (!tiling) return null;
      const netLinks = instance.nets.map((net, n) => {
        const used = (use[n] as number[]).flatMap((column, link) =>
          (values[column] as number) > 0.5 ? [link] : [],
        );
        const targets = net.consumers.map((consumer) => tiling[consumer] as number);
        return shortestTree(graph, used, tiling[net.source] as number, targets);
      });
      return { tiling, netLinks };
    },
    encode: ({ tiling, netLinks }) => {
      const values = new Float64Array(program.columnNames.length);
      x.encode(tiling, values);
      netLinks.forEach((links, n) => {
        for (const link of links) values[use[n]?.[link] as number] = 1;
      });
      for (const flow of flows) {
        const links = netLinks[flow.net] ?? [];
        const way = shortestTree(graph, links, tiling[flow.from] as number, [tiling[flow.to] as number]);
        for (const link of way) values[flow.columns[link] as number] = 1;
      }
      return values;
    },
  };
}

function addCapacityRows(builder: ProgramBuilder, graph: LinkGraph, use: readonly number[][]): void {
  graph.links.forEach((link, index) => {
    if (link.channels >= use.length) return;
    const nets = use.map((columns) => [columns[index] as number, 1] as const);
    builder.row(`channels_${index}`, Number.NEGATIVE_INFINITY, link.channels, nets);
  });
}

interface Flow {
  net: number;
  from: number;
  to: number;
  columns: number[];
  weight: number;
}

function addFlow(
  builder: ProgramBuilder,
  instance: PlacementInstance,
  graph: LinkGraph,
  x: AssignmentColumns,
  use: readonly number[],
  pair: Omit<Flow, 'columns'>,
): Flow {
  const { net, from, to, weight } = pair;
  const columns = graph.links.map((_, link) =>
    builder.column(`f_${net}_${to}_${link}`, { lower: 0, cost: weight }),
  );
  columns.forEach((column, link) => {
    builder.row(`on_${net}_${to}_${link}`, 0, Number.POSITIVE_INFINITY, [
      [use[link] as number, 1],
      [column, -1],
    ]);
  });
  for (let tile = 0; tile < graph.tileCount; tile++) {
    const entries: [number, number][] = [];
    for (const link of graph.outLinks[tile] ?? []) entries.push([columns[link] as number, 1]);
    for (const link of graph.inLinks[tile] ?? []) entries.push([columns[link] as number, -1]);
    if (x.at(from, tile) >= 0) entries.push([x.at(from, tile), -1]);
    if (x.at(to, tile) >= 0) entries.push([x.at(to, tile), 1]);
    if (entries.length > 0) builder.row(`flow_${net}_${to}_${tile}`, 0, 0, entries);
  }
  const all = columns.map((column) => [column, 1] as const);
  builder.row(`hops_${net}_${to}`, 1, instance.maxHops ?? Number.POSITIVE_INFINITY, all);
  return { ...pair, columns };
}

function addBoundRow(
  builder: ProgramBuilder,
  instance: PlacementInstance,
  use: readonly number[][],
  flows: readonly Flow[],
  knownBound: number,
): void {
  const entries =
    instance.objective === 'wire'
      ? use.flatMap((columns, n) => columns.map((c) => [c, instance.nets[n]?.weight ?? 1] as const))
      : flows.flatMap((flow) => flow.columns.map((c) => [c, flow.weight] as const));
  if (entries.length > 0 && knownBound > 0) {
    builder.row('bound', knownBound, Number.POSITIVE_INFINITY, entries);
  }
}

/** Links of the tree of shortest ways from a tile to the targets, within the given links. Breadth-first. */
export function shortestTree(
  graph: LinkGraph,
  within: readonly number[],
  source: number,
  targets: readonly number[],
): number[] {
  const allowed = new Set(within);
  const arrivedBy = new Map<number, number>();
  const queue = [source];
  for (let next = 0; next < queue.length; next++) {
    for (const link of graph.outLinks[queue[next] as number] ?? []) {
      const to = graph.links[link]?.to as number;
      if (!allowed.has(link) || to === source || arrivedBy.has(to)) continue;
      arrivedBy.set(to, link);
      queue.push(to);
    }
  }
  const tree = new Set<number>();
  for (const target of targets) {
    let at = target;
    while (at !== source) {
      const link = arrivedBy.get(at);
      if (link === undefined || tree.has(link)) break;
      tree.add(link);
      at = graph.links[link]?.from as number;
    }
  }
  return [...tree];
}
