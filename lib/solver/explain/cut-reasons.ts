/** What is said of a cut with too few channels: where it is, what has to cross it, how much is missing. */
import type { FabricGraph } from '../../fabric/compile';
import type { TileId } from '../../fabric/fabric';
import { tileLabel } from '../../fabric/tiles';
import type { EdgeId, OpId } from '../../graph/kernel';
import { type CutProblem, divideOps } from '../cuts/divide-ops';
import { type Crossing, forcedCrossings, INSIDE, OUTSIDE } from '../cuts/forced-crossings';
import type { TileCut } from '../cuts/tile-cut';
import type { PlacementInstance } from '../instance';
import type { InfeasibleReason } from '../outcome';
import { hasTile } from '../presolve/tile-sets';
import { type CheckedProblem, opLabel } from '../problem';

/** Nets touched while the least number of channels that would do is looked for. */
const MISSING_WORK = 200_000;

interface ForcedCut {
  cut: TileCut;
  from: typeof INSIDE | typeof OUTSIDE;
  crossings: Crossing[];
}

export function forcedReason(
  problem: CheckedProblem,
  instance: PlacementInstance,
  { cut, from, crossings }: ForcedCut,
): InfeasibleReason {
  const { kernel, graph } = problem;
  const channels = from === INSIDE ? cut.channelsOut : cut.channelsIn;
  const { name, isInside } = namedSide(cut, graph);
  const way = (from === INSIDE) === isInside ? 'out of' : 'into';
  const sources = crossings.map(({ net }) => kernel.ops[instance.nets[net]?.source as number]?.id as OpId);
  const names = sources.map((id) => opLabel(kernel, id));
  const shown = names.length > 4 ? `${names.slice(0, 4).join(', ')} and others` : names.join(', ');
  const there = channels === 0 ? 'no link leads there' : `the links there have ${count(channels, 'channel')}`;
  const more = count(crossings.length - channels, 'channel');
  const nets = crossings.length === 1 ? '1 net has' : `${crossings.length} nets have`;
  return {
    code: 'too few channels',
    message: `${nets} to lead ${way} ${name} (from ${shown}), but ${there}: add ${more} there, on these links or new ones, or move pins or units to one side.`,
    ...marked(problem, instance, crossings),
    tileIds: tilesAt(cut, graph, from),
  };
}

/** No division of the ops between the two sides gets by with the channels that there are. */
export function divisionReason(problem: CheckedProblem, divided: CutProblem): InfeasibleReason {
  const { kernel, graph } = problem;
  const { cut, instance } = divided;
  const { name, isInside } = namedSide(cut, graph);
  const [own, other] = isInside
    ? [divided.roomInside, divided.roomOutside]
    : [divided.roomOutside, divided.roomInside];
  const [out, into] = isInside ? [cut.channelsOut, cut.channelsIn] : [cut.channelsIn, cut.channelsOut];
  const least = leastMissing(divided);
  const links =
    out + into === 0
      ? 'no link leads from one to the other'
      : `the links between them have ${count(out, 'channel')} out of ${name} and ${into} the other way`;
  const sides = `${name}, with PEs for ${count(own, 'op')}, and the rest of the fabric, with PEs for ${other}`;
  const crossings = least.sides
    ? [INSIDE, OUTSIDE].flatMap((from) => forcedCrossings(instance, least.sides as Int8Array, from as 1 | -1))
    : [];
  const all = kernel.ops.map((op) => op.id);
  return {
    code: 'too few channels',
    message: `However the ${count(all.length, 'op')} are divided between ${sides}, more nets have to cross than there are channels: ${links}, at least ${least.missing} too few. Add channels or links there, add units on one side, or move pins.`,
    ...(crossings.length > 0 ? marked(problem, instance, crossings) : { opIds: all, edgeIds: [] }),
    tileIds: tilesAt(cut, graph, null),
  };
}

/** How many channels are missing at the best division, and that division, if it is found in time. */
function leastMissing(divided: CutProblem): { missing: number; sides: Int8Array | null } {
  const work = { left: MISSING_WORK };
  for (let missing = 1; missing <= divided.instance.nets.length; missing++) {
    const division = divideOps(divided, missing, work);
    if (division.kind === 'found') return { missing, sides: division.sides };
    if (division.kind === 'unknown') return { missing, sides: null };
  }
  return { missing: 1, sides: null };
}

/** The ops at the ends of the crossing connections, and these. */
function marked(
  { kernel }: CheckedProblem,
  { nets }: PlacementInstance,
  crossings: readonly Crossing[],
): { opIds: OpId[]; edgeIds: EdgeId[] } {
  const id = (op: number) => kernel.ops[op]?.id as OpId;
  const ends = crossings.map(({ net, consumers }) => ({
    source: id(nets[net]?.source as number),
    consumers: consumers.map(id),
  }));
  return {
    opIds: [...new Set(ends.flatMap(({ source, consumers }) => [source, ...consumers]))],
    edgeIds: kernel.edges
      .filter((edge) =>
        ends.some(({ source, consumers }) => edge.from === source && consumers.includes(edge.to)),
      )
      .map((edge) => edge.id),
  };
}

/** The tiles at the ends of the cut's links, of one direction or both; the smaller side where no link crosses. */
function tilesAt(cut: TileCut, graph: FabricGraph, from: typeof INSIDE | typeof OUTSIDE | null): TileId[] {
  const atCut = new Set<number>();
  for (const link of graph.links) {
    const leaves = hasTile(cut.inside, link.from);
    if (leaves === hasTile(cut.inside, link.to)) continue;
    if (from !== null && leaves !== (from === INSIDE)) continue;
    for (const tile of [link.from, link.to]) atCut.add(tile);
  }
  const tiles = atCut.size > 0 ? [...atCut] : smallerSide(cut, graph).tiles;
  return tiles
    .sort((a, b) => a - b)
    .slice(0, 64)
    .map((tile) => graph.tiles[tile] as TileId);
}

function smallerSide(cut: TileCut, { tileCount }: FabricGraph): { tiles: number[]; isInside: boolean } {
  const all = Array.from({ length: tileCount }, (_, tile) => tile);
  const inside = all.filter((tile) => hasTile(cut.inside, tile));
  return inside.length * 2 <= tileCount
    ? { tiles: inside, isInside: true }
    : { tiles: all.filter((tile) => !hasTile(cut.inside, tile)), isInside: false };
}

/** The smaller side in words: "row 0, column 3", "columns 0 to 2", "the 5 tiles within rows 1 to 3, columns 0 to 2". */
function namedSide(cut: TileCut, graph: FabricGraph): { name: string; isInside: boolean } {
  const { tiles, isInside } = smallerSide(cut, graph);
  if (tiles.length === 1) return { name: tileLabel(graph.tiles[tiles[0] as number] as TileId), isInside };
  const rows = tiles.map((tile) => Math.floor(tile / graph.cols));
  const cols = tiles.map((tile) => tile % graph.cols);
  const [height, width] = [span(rows), span(cols)];
  const box =
    width.size === graph.cols
      ? named('row', height)
      : height.size === graph.rows
        ? named('column', width)
        : `${named('row', height)}, ${named('column', width)}`;
  const isWhole = tiles.length === height.size * width.size;
  return { name: isWhole ? box : `the ${tiles.length} tiles within ${box}`, isInside };
}

const span = (values: readonly number[]) => {
  const [first, last] = [Math.min(...values), Math.max(...values)];
  return { first, last, size: last - first + 1 };
};

const named = (what: string, { first, last, size }: ReturnType<typeof span>): string =>
  size === 1 ? `${what} ${first}` : `${what}s ${first} to ${last}`;

const count = (number: number, what: string): string => `${number} ${what}${number === 1 ? '' : 's'}`;
