/** How many nets each link carries, kept up to date while nets are taken up and put down. */
import type { FabricGraph } from '../../fabric/compile';

export interface LinkLoads {
  nets: Int32Array;
  add(tree: readonly number[]): void;
  remove(tree: readonly number[]): void;
  /** Nets beyond the channels of a link, 0 where there is room. */
  excess(link: number): number;
  /** Sum of the excess over all links. */
  totalExcess(): number;
}

export function linkLoads(graph: FabricGraph): LinkLoads {
  const nets = new Int32Array(graph.links.length);
  const change = (tree: readonly number[], by: number): void => {
    for (const link of tree) nets[link] = (nets[link] ?? 0) + by;
  };
  const excess = (link: number): number =>
    Math.max(0, (nets[link] ?? 0) - (graph.links[link]?.channels ?? 0));
  return {
    nets,
    add: (tree) => change(tree, 1),
    remove: (tree) => change(tree, -1),
    excess,
    totalExcess: () => graph.links.reduce((sum, _, link) => sum + excess(link), 0),
  };
}
