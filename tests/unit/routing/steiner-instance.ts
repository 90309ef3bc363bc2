/** The published instances as link graphs: an undirected edge becomes a link each way. */
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { z } from 'zod';
import type { LinkGraph } from '@/lib/fabric/link-graph';
import { linkId, tileId } from '@/lib/fabric/tiles';

const ROOT = join(import.meta.dirname, '../../reference/steiner');

const instanceSchema = z.object({
  name: z.string(),
  nodes: z.number(),
  optimum: z.number(),
  /** 1-based. */
  terminals: z.array(z.number()),
  edges: z.array(z.tuple([z.number(), z.number(), z.number()])),
});

export interface SteinerInstance {
  name: string;
  optimum: number;
  graph: LinkGraph;
  /** 0-based. */
  terminals: number[];
  linkCost: Float64Array;
}

type InstanceData = z.infer<typeof instanceSchema>;
const readJson = (path: string): unknown => JSON.parse(readFileSync(join(ROOT, path), 'utf8'));

function instanceOf(data: InstanceData): SteinerInstance {
  const name = linkId(tileId(0, 0), tileId(0, 1));
  const links = data.edges.flatMap(([u, v]) => [
    { id: name, from: u - 1, to: v - 1, channels: 1 },
    { id: name, from: v - 1, to: u - 1, channels: 1 },
  ]);
  const lists = (end: 'from' | 'to'): number[][] => {
    const byTile: number[][] = Array.from({ length: data.nodes }, () => []);
    links.forEach((link, i) => {
      byTile[link[end]]?.push(i);
    });
    return byTile;
  };
  return {
    name: data.name,
    optimum: data.optimum,
    graph: { tileCount: data.nodes, links, outLinks: lists('from'), inLinks: lists('to') },
    terminals: data.terminals.map((terminal) => terminal - 1),
    linkCost: Float64Array.from(data.edges.flatMap(([, , cost]) => [cost, cost])),
  };
}

/** All instances of a folder of tests/reference/steiner. */
export const steinerInstances = (folder: 'or-library-b' | 'lin' | 'vlsi-grid'): SteinerInstance[] =>
  readdirSync(join(ROOT, folder))
    .sort()
    .map((file) => instanceOf(instanceSchema.parse(readJson(join(folder, file)))));

const pointsSchema = z.object({
  name: z.string(),
  optimum: z.number(),
  points: z.array(z.tuple([z.number(), z.number()])),
});

/** A net of points on the lattice of their rows and columns, which holds a shortest tree (M. Hanan, 1966). */
export function hananInstance(name: string): SteinerInstance {
  const { points, optimum } = pointsSchema.parse(readJson(join('rectilinear', `${name}.json`)));
  const distinct = (axis: 0 | 1): number[] =>
    [...new Set(points.map((point) => point[axis]))].sort((a, b) => a - b);
  const [xs, ys] = [distinct(0), distinct(1)];
  const node = (x: number, y: number): number => y * xs.length + x + 1;
  const edges: InstanceData['edges'] = [];
  ys.forEach((yValue, y) => {
    xs.forEach((xValue, x) => {
      const [right, below] = [xs[x + 1], ys[y + 1]];
      if (right !== undefined) edges.push([node(x, y), node(x + 1, y), right - xValue]);
      if (below !== undefined) edges.push([node(x, y), node(x, y + 1), below - yValue]);
    });
  });
  const terminals = points.map(([x, y]) => node(xs.indexOf(x), ys.indexOf(y)));
  return instanceOf({ name, optimum, nodes: xs.length * ys.length, terminals, edges });
}
