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

type NamePart = 'op' | 'net' | 'pair' | 'tile' | 'link';

export interface NameFamily {
  /** What the name begins with in exported text. */
  title: string;
  parts: readonly NamePart[];
  meaning: string;
}

/** The columns' and rows' names, by what they begin with in the program: short there, spelt out in exported text. */
export const routedNameFamilies: Record<'columns' | 'rows', Readonly<Record<string, NameFamily>>> = {
  columns: {
    x: { title: 'place', parts: ['op', 'tile'], meaning: '1 if the op stands on the tile (R3, R4)' },
    y: { title: 'use', parts: ['net', 'link'], meaning: "1 if the net's tree uses the link" },
    f: {
      title: 'flow',
      parts: ['net', 'op', 'link'],
      meaning: 'what runs over the link on its way to the op',
    },
  },
  rows: {
    place: { title: 'one_tile', parts: ['op'], meaning: 'R1: the op stands on one tile' },
    tile: { title: 'one_op', parts: ['tile'], meaning: 'R2: at most one op stands on the tile' },
    reach: { title: 'reach', parts: ['pair', 'tile'], meaning: 'R7: from the tile the consumer is in reach' },
    channels: { title: 'channels', parts: ['link'], meaning: 'R6: at most as many nets as channels' },
    on: { title: 'on', parts: ['net', 'op', 'link'], meaning: 'R5: flow only over links that the net uses' },
    flow: {
      title: 'balance',
      parts: ['net', 'op', 'tile'],
      meaning: 'R5: 1 leaves the source, reaches the op',
    },
    hops: {
      title: 'hops',
      parts: ['net', 'op'],
      meaning: 'R7: links of the way, 1 at least, within the clock',
    },
    least: { title: 'least', parts: ['net'], meaning: 'implied: as many links as consumers at least' },
    bound: { title: 'known_bound', parts: [], meaning: 'implied: a proven bound of the objective' },
  },
};

const OP_NAME_LENGTH = 32;

/** An op's id; a longer one is cut off and made unique by a mark that ids cannot have, and the op's index. */
export const exportedOpName = (id: string, index: number): string =>
  id.length <= OP_NAME_LENGTH ? id : `${id.slice(0, OP_NAME_LENGTH - 5)}~${index}`;

/**
 * The program of `routedProgram` with names that say which op, net, tile and link they are about: unique, below 100
 * characters (CBC's limit for LP text), of letters, digits, `_`, `.` and `~`, which LP and MPS both allow.
 * `opIds` are those of the instance's ops, in its order. Throws on a name of no known family.
 */
export function nameRoutedProgram(
  program: IntegerProgram,
  instance: PlacementInstance,
  graph: LinkGraph,
  opIds: readonly string[],
): IntegerProgram {
  const tile = (i: number) => `r${Math.floor(i / instance.cols)}c${i % instance.cols}`;
  const op = (i: number) => exportedOpName(opIds[i] ?? '', i);
  const words: Record<NamePart, (index: number) => string> = {
    op,
    net: (n) => `net_${op(instance.nets[n]?.source ?? -1)}`,
    pair: (p) => `${op(instance.pairs[p]?.from ?? -1)}.${op(instance.pairs[p]?.to ?? -1)}`,
    tile: (i) => `tile_${tile(i)}`,
    link: (l) => `link_${tile(graph.links[l]?.from ?? -1)}_${tile(graph.links[l]?.to ?? -1)}`,
  };
  const rename = (families: Readonly<Record<string, NameFamily>>) => (name: string) => {
    const [head = '', ...parts] = name.split('_');
    const family = families[head];
    if (!family || family.parts.length !== parts.length)
      throw new RangeError(`No family of names has ${name}`);
    // x names its tile as it is; all other parts are indices.
    const spelt = parts.map((part, i) =>
      part.startsWith('r') ? `tile_${part}` : words[family.parts[i] as NamePart](Number(part)),
    );
    return [family.title, ...spelt].join('.');
  };
  return {
    ...program,
    columnNames: program.columnNames.map(rename(routedNameFamilies.columns)),
    rowNames: program.rowNames.map(rename(routedNameFamilies.rows)),
  };
}
