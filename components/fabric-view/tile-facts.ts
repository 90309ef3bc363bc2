/** What there is to say about one tile of a fabric. */
import type { FabricGraph } from '@/lib/fabric/compile';
import { tileLabel } from '@/lib/fabric/tiles';
import { type UnitLibrary, type UnitSpec, unitSpec } from '@/lib/fabric/unit-library';
import { type OpKind, opSpec } from '@/lib/graph/op-catalog';

export interface Neighbour {
  tile: number;
  place: string;
  /** Channels of the link to the neighbour and back; null where there is none. */
  channelsTo: number | null;
  channelsFrom: number | null;
}

export interface TileFacts {
  place: string;
  unit: UnitSpec | null;
  /** Null: the tile has a router only. */
  unitLabel: string | null;
  operations: { label: string; latencyCycles: number; intervalCycles: number }[];
  neighbours: Neighbour[];
}

/** Facts of the tile with that index. Neighbours are the ends of its links, in the order of the grid. */
export function tileFacts(graph: FabricGraph, library: UnitLibrary, tile: number): TileFacts {
  const id = graph.units[tile] ?? null;
  const unit = id === null ? null : unitSpec(id, library);
  return {
    place: tileLabel(graph.tiles[tile] ?? ''),
    unit,
    unitLabel: unit?.label ?? id,
    operations: Object.entries(unit?.operations ?? {}).map(([kind, operation]) => ({
      label: opSpec(kind as OpKind).label,
      latencyCycles: operation.latencyCycles,
      intervalCycles: operation.intervalCycles,
    })),
    neighbours: neighboursOf(graph, tile),
  };
}

function neighboursOf(graph: FabricGraph, tile: number): Neighbour[] {
  const found = new Map<number, Neighbour>();
  const at = (other: number): Neighbour => {
    const known = found.get(other) ?? {
      tile: other,
      place: tileLabel(graph.tiles[other] ?? ''),
      channelsTo: null,
      channelsFrom: null,
    };
    found.set(other, known);
    return known;
  };
  for (const index of graph.outLinks[tile] ?? []) {
    const link = graph.links[index];
    if (link) at(link.to).channelsTo = link.channels;
  }
  for (const index of graph.inLinks[tile] ?? []) {
    const link = graph.links[index];
    if (link) at(link.from).channelsFrom = link.channels;
  }
  return [...found.values()].sort((a, b) => a.tile - b.tile);
}
