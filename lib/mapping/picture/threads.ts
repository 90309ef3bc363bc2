/**
 * Threads: each routed net as lines in the channels, with its knots and ends.
 *
 * At a router a net has one point, where its row lane and its column lane meet; the tile's stub goes to the same
 * point. The tree of a net is cut into chains that share no stretch, so a dash rhythm is never drawn over itself.
 */
import type { FabricGraph } from '../../fabric/compile';
import type { Fabric, LinkId } from '../../fabric/fabric';
import type { Kernel, OpId } from '../../graph/kernel';
import { netsOf } from '../../graph/nets';
import type { Placement, Routes } from '../mapping';
import { type Chain, weaveChains } from './crossings';
import { type Point, positionOf, routerPoint, tileBox } from './fabric-geometry';
import { laneOffsets, type NetPiece } from './lanes';
import { type LinkWay, linkWay } from './link-pieces';

export interface Thread {
  source: OpId;
  /** Number of the net in the kernel's order: chooses colour and rhythm. */
  net: number;
  /** What is drawn, with gaps where the thread passes under another. */
  chains: readonly Chain[];
  /** The same lines without gaps. */
  wholeChains: readonly Chain[];
  /** One for each router that the net passes or reaches, besides its source's. */
  knots: readonly Point[];
  /** Where the thread leaves the picture over a wrap link or comes in again. */
  wrapEnds: readonly Point[];
  links: readonly LinkId[];
}

interface NetTree {
  net: number;
  source: OpId;
  links: readonly number[];
  /** Tile indices where a stub goes to the router: the source first. */
  taps: readonly number[];
}

const STUB_GAP_PX = 6;

/** The threads of a mapping, whole or partial: nets without a route are left out. */
export function weaveThreads(
  kernel: Kernel,
  fabric: Pick<Fabric, 'rows' | 'cols' | 'topology'>,
  graph: FabricGraph,
  { placement, routes }: { placement: Placement; routes: Routes },
): Thread[] {
  const trees = netTrees(kernel, graph, placement, routes);
  const ways = new Map<number, LinkWay>();
  for (const tree of trees) {
    for (const link of tree.links) {
      const ends = graph.links[link];
      if (ends && !ways.has(link)) ways.set(link, linkWay(fabric, ends));
    }
  }
  const pieces: NetPiece[] = trees.flatMap((tree) =>
    tree.links.flatMap((link) =>
      (ways.get(link)?.pieces ?? []).map((piece, i) => ({
        ...piece,
        net: tree.net,
        key: pieceKey(tree.net, link, i),
      })),
    ),
  );
  const offsets = laneOffsets(pieces);
  const threads = trees.map((tree) => threadOf(tree, fabric, graph, ways, offsets));
  const stubbed = addStubs(trees, threads, fabric);
  const woven = weaveChains(stubbed.map((thread) => thread.chains));
  return stubbed.map((thread, i) => ({
    source: thread.source,
    net: thread.net,
    wholeChains: thread.chains,
    chains: woven[i] ?? thread.chains,
    knots: thread.knots,
    wrapEnds: thread.wrapEnds,
    links: thread.links,
  }));
}

const pieceKey = (net: number, link: number, piece: number) => `${net}:${link}:${piece}`;

function netTrees(kernel: Kernel, graph: FabricGraph, placement: Placement, routes: Routes): NetTree[] {
  const tileOf = (op: OpId): number => {
    const tile = placement[op];
    return tile === undefined ? -1 : graph.tileIndex(tile);
  };
  return netsOf(kernel).flatMap(({ source, consumers }, net) => {
    const at = tileOf(source);
    const links = [...new Set(routes[source] ?? [])].flatMap((id) => graph.linkIndex.get(id) ?? []);
    if (at < 0 || links.length === 0) return [];
    const reached = new Set(links.map((link) => graph.links[link]?.to));
    const ends = [...new Set(consumers.map(tileOf))].filter((tile) => tile !== at && reached.has(tile));
    return [{ net, source, links, taps: [at, ...ends] }];
  });
}

interface RawThread {
  source: OpId;
  net: number;
  chains: Point[][];
  knots: Point[];
  wrapEnds: Point[];
  links: LinkId[];
  points: ReadonlyMap<number, Point>;
}

function threadOf(
  tree: NetTree,
  size: Pick<Fabric, 'rows' | 'cols'>,
  graph: FabricGraph,
  ways: ReadonlyMap<number, LinkWay>,
  offsets: ReadonlyMap<string, number>,
): RawThread {
  const points = netPoints(tree, size, graph, ways, offsets);
  const outgoing = new Map<number, number[]>();
  for (const link of tree.links) {
    const from = graph.links[link]?.from ?? -1;
    const there = outgoing.get(from);
    if (there) there.push(link);
    else outgoing.set(from, [link]);
  }
  const thread: RawThread = {
    source: tree.source,
    net: tree.net,
    chains: [],
    knots: [],
    wrapEnds: [],
    links: tree.links.flatMap((link) => graph.links[link]?.id ?? []),
    points,
  };
  const done = new Set<number>();
  const start = tree.taps[0] ?? -1;
  // Links that do not hang together with the source (a broken route) are drawn as well, each from its own start.
  const starts = [start, ...tree.links.map((link) => graph.links[link]?.from ?? -1)];
  for (const from of starts) {
    const waiting: { tile: number; chain: Point[] | null }[] = [{ tile: from, chain: null }];
    for (let next = waiting.pop(); next; next = waiting.pop()) {
      let chain = next.chain;
      for (const link of outgoing.get(next.tile) ?? []) {
        if (done.has(link)) continue;
        done.add(link);
        const to = graph.links[link]?.to ?? -1;
        const parts = linkLines(tree.net, link, ways, offsets, points.get(next.tile), points.get(to));
        if (!chain) {
          chain = [];
          thread.chains.push(chain);
        }
        parts.forEach((part, i) => {
          if (i > 0) {
            chain = [];
            thread.chains.push(chain);
          }
          append(chain ?? [], part);
        });
        if (parts.length > 1) thread.wrapEnds.push(...wrapEnds(parts));
        const reached = points.get(to);
        if (reached) thread.knots.push(reached);
        waiting.push({ tile: to, chain });
        // The next branch starts a chain of its own.
        chain = null;
      }
    }
  }
  return thread;
}

const wrapEnds = (parts: readonly Chain[]): Point[] => {
  const [out, back] = [parts[0]?.at(-1), parts[1]?.[0]];
  return out && back ? [out, back] : [];
};

/** Where a net stands at each of its routers. */
function netPoints(
  tree: NetTree,
  size: Pick<Fabric, 'rows' | 'cols'>,
  graph: FabricGraph,
  ways: ReadonlyMap<number, LinkWay>,
  offsets: ReadonlyMap<string, number>,
): Map<number, Point> {
  const shift = new Map<number, Partial<Point>>();
  for (const link of tree.links) {
    const ends = graph.links[link];
    const pieces = ways.get(link)?.pieces ?? [];
    if (!ends) continue;
    const last = pieces.length - 1;
    pieces.forEach((piece, i) => {
      const offset = offsets.get(pieceKey(tree.net, link, i)) ?? 0;
      const side = piece.axis === 'row' ? 'y' : 'x';
      for (const tile of [...(i === 0 ? [ends.from] : []), ...(i === last ? [ends.to] : [])]) {
        shift.set(tile, { [side]: offset, ...shift.get(tile) });
      }
    });
  }
  const points = new Map<number, Point>();
  for (const [tile, by] of shift) {
    const { row, col } = positionOf(size, tile);
    const router = routerPoint(row, col);
    points.set(tile, { x: router.x + (by.x ?? 0), y: router.y + (by.y ?? 0) });
  }
  return points;
}

/** The lines of one link from the net's point at its start to the one at its end; two where it wraps. */
function linkLines(
  net: number,
  link: number,
  ways: ReadonlyMap<number, LinkWay>,
  offsets: ReadonlyMap<string, number>,
  from: Point | undefined,
  to: Point | undefined,
): Point[][] {
  const way = ways.get(link);
  if (!way || !from || !to) return [];
  const lines: Point[][] = [[from]];
  way.pieces.forEach((piece, i) => {
    const line = lines.at(-1);
    const before = line?.at(-1);
    if (!line || !before) return;
    const offset = offsets.get(pieceKey(net, link, i)) ?? 0;
    const across = channelMiddle(piece.axis, piece.line) + offset;
    const last = i === way.pieces.length - 1;
    const next = way.pieces[i + 1];
    const nextAcross =
      next && !way.wraps
        ? channelMiddle(next.axis, next.line) + (offsets.get(pieceKey(net, link, i + 1)) ?? 0)
        : piece.end;
    if (piece.axis === 'row') {
      const end = last ? to.x : nextAcross;
      append(line, [
        { x: before.x, y: across },
        { x: end, y: across },
      ]);
    } else {
      const end = last ? to.y : nextAcross;
      append(line, [
        { x: across, y: before.y },
        { x: across, y: end },
      ]);
    }
    if (!last && way.wraps) {
      const again = next?.start ?? 0;
      lines.push([piece.axis === 'row' ? { x: again, y: across } : { x: across, y: again }]);
    }
  });
  append(lines.at(-1) ?? [], [to]);
  return lines;
}

const channelMiddle = (axis: 'row' | 'column', line: number): number =>
  axis === 'row' ? routerPoint(line, 0).y : routerPoint(0, line).x;

function append(line: Point[], more: readonly Point[]): void {
  for (const point of more) {
    const last = line.at(-1);
    if (last && last.x === point.x && last.y === point.y) continue;
    line.push(point);
  }
}

/** Adds the stubs between tiles and routers; several at one tile are spread along its lower right corner. */
function addStubs(
  trees: readonly NetTree[],
  threads: readonly RawThread[],
  size: Pick<Fabric, 'rows' | 'cols'>,
): RawThread[] {
  const atTile = new Map<number, { thread: number; point: Point }[]>();
  trees.forEach((tree, thread) => {
    for (const tile of tree.taps) {
      const point = threads[thread]?.points.get(tile);
      if (!point) continue;
      const there = atTile.get(tile) ?? [];
      there.push({ thread, point });
      atTile.set(tile, there);
    }
  });
  const chains = threads.map((thread) => thread.chains.map((chain) => [...chain]));
  for (const [tile, stubs] of atTile) {
    const { row, col } = positionOf(size, tile);
    const box = tileBox(row, col);
    stubs.sort((a, b) => a.point.x - a.point.y - (b.point.x - b.point.y) || a.thread - b.thread);
    stubs.forEach(({ thread, point }, i) => {
      const along = (i - (stubs.length - 1) / 2) * STUB_GAP_PX;
      const port: Point = {
        x: box.x + box.width + Math.min(0, along),
        y: box.y + box.height - Math.max(0, along),
      };
      const own = chains[thread] ?? [];
      const first = own[0];
      const source = trees[thread]?.taps[0] === tile;
      if (source && first) first.unshift(port);
      else {
        const ending = own.find((chain) => {
          const end = chain.at(-1);
          return end?.x === point.x && end.y === point.y;
        });
        if (ending) ending.push(port);
        else own.push([point, port]);
      }
    });
  }
  return threads.map((thread, i) => ({ ...thread, chains: chains[i] ?? [] }));
}
