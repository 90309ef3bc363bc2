/** What the bench holds and the ways to change it. Pure; the store keeps what these return. */
import type { FabricGraph } from '@/lib/fabric/compile';
import type { TileId } from '@/lib/fabric/fabric';
import { tileLabel } from '@/lib/fabric/tiles';
import { canHost, hostsOf, type UnitLibrary, unitSpec } from '@/lib/fabric/unit-library';
import type { Kernel, Op, OpId } from '@/lib/graph/kernel';
import { opSpec } from '@/lib/graph/op-catalog';
import type { BenchDocument } from '@/lib/mapping/bench-document';
import type { Pins, Placement, Provenance, Routes } from '@/lib/mapping/mapping';
import { shortName } from '@/lib/mapping/picture/op-label';
import { err, ok, type Result } from '@/lib/result';
import { routePlacement } from '@/lib/solver/routing/route-nets';

/** The document with who or what made it: one state of the bench, one step of its history. */
export interface BenchContent extends BenchDocument {
  provenance: Provenance;
}

/** What does not change while a bench is open. */
export interface BenchSetting {
  kernel: Kernel;
  graph: FabricGraph;
  library: UnitLibrary;
  ops: ReadonlyMap<OpId, Op>;
}

export interface Change {
  content: BenchContent;
  /** What was done, for the status line and the undo button. */
  said: string;
}

/** The op on each taken tile, by tile index. */
export function opsByTile(graph: FabricGraph, placement: Placement): Map<number, OpId> {
  const taken = new Map<number, OpId>();
  for (const [op, tile] of placed(placement)) {
    const index = graph.tileIndex(tile);
    if (index >= 0) taken.set(index, op);
  }
  return taken;
}

export const placed = (placement: Placement): [OpId, TileId][] =>
  Object.entries(placement) as [OpId, TileId][];

const nameOf = (setting: BenchSetting, id: OpId): string => {
  const op = setting.ops.get(id);
  return op ? shortName(op) : id;
};

/** Why an op may not go on a tile, naming the rule it would break; null when it may. */
export function tileRefusal(
  setting: BenchSetting,
  content: Pick<BenchContent, 'placement' | 'pins'>,
  id: OpId,
  tile: number,
): string | null {
  const op = setting.ops.get(id);
  const tileId = setting.graph.tiles[tile];
  if (!op || !tileId) return 'There is no such tile.';
  const unit = setting.graph.units[tile] ?? null;
  const place = tileLabel(tileId);
  if (unit === null) return `R1: ${place} has a router but no PE.`;
  if (!canHost(unit, op.kind, setting.library)) {
    const label = unitSpec(unit, setting.library)?.label ?? unit;
    const hosts = hostsOf(op.kind, setting.library).map((host) => host.label);
    const needed = hosts.length === 0 ? 'No unit can.' : `It needs ${hosts.join(' or ')}.`;
    return `R3: the ${label} unit at ${place} cannot do ${opSpec(op.kind).label}. ${needed}`;
  }
  const pin = content.pins[id];
  if (pin !== undefined && pin !== tileId) {
    return `R4: ${shortName(op)} is pinned to ${tileLabel(pin)}. Unpin it first.`;
  }
  const other = opsByTile(setting.graph, content.placement).get(tile);
  if (other !== undefined && other !== id && content.pins[other] !== undefined) {
    return `R4: ${nameOf(setting, other)} is pinned to ${place}. Unpin it first.`;
  }
  return null;
}

/** A change by hand: routes follow, and what the solver proved is marked as changed. */
function byHand(setting: BenchSetting, before: BenchContent, placement: Placement): BenchContent {
  const empty = Object.keys(placement).length === 0;
  return {
    ...before,
    placement,
    routes: routesFor(setting, placement, before.routes),
    provenance:
      empty || before.provenance.by === 'hand'
        ? { by: 'hand' }
        : { ...before.provenance, changedByHand: true },
  };
}

export const routesFor = (setting: BenchSetting, placement: Placement, previous: Routes): Routes =>
  routePlacement(setting.kernel, setting.graph, placement, { previous }).routes;

/** Puts an op on a tile. The op that is there takes the tile left behind, where it can, and is taken off otherwise. */
export function place(
  setting: BenchSetting,
  content: BenchContent,
  id: OpId,
  tile: number,
): Result<Change, string> {
  const refusal = tileRefusal(setting, content, id, tile);
  const target = setting.graph.tiles[tile];
  if (refusal !== null || target === undefined) return err(refusal ?? 'There is no such tile.');
  const from = content.placement[id];
  if (from === target) return ok({ content, said: `${nameOf(setting, id)} stays.` });
  const other = opsByTile(setting.graph, content.placement).get(tile);
  const placement: Placement = { ...content.placement, [id]: target };
  let said = `${nameOf(setting, id)} on ${tileLabel(target)}.`;
  if (other !== undefined) {
    const otherOp = setting.ops.get(other);
    const back = from === undefined ? -1 : setting.graph.tileIndex(from);
    const fits =
      otherOp && back >= 0 && canHost(setting.graph.units[back] ?? null, otherOp.kind, setting.library);
    if (fits && from !== undefined) {
      placement[other] = from;
      said = `${nameOf(setting, id)} and ${nameOf(setting, other)} swapped.`;
    } else {
      delete placement[other];
      said = `${nameOf(setting, id)} on ${tileLabel(target)}; ${nameOf(setting, other)} taken off.`;
    }
  }
  return ok({ content: byHand(setting, content, placement), said });
}

/** Takes an op off the fabric. A pinned one stays until it is unpinned. */
export function unplace(setting: BenchSetting, content: BenchContent, id: OpId): Result<Change, string> {
  if (content.placement[id] === undefined) return err(`${nameOf(setting, id)} is not placed.`);
  if (content.pins[id] !== undefined) return err(`R4: ${nameOf(setting, id)} is pinned. Unpin it first.`);
  const { [id]: _, ...placement } = content.placement;
  return ok({ content: byHand(setting, content, placement), said: `${nameOf(setting, id)} taken off.` });
}

/** Takes off every op that is not pinned. */
export function clear(setting: BenchSetting, content: BenchContent): Result<Change, string> {
  const kept = placed(content.placement).filter(([id]) => content.pins[id] !== undefined);
  if (kept.length === Object.keys(content.placement).length) return err('There is nothing to take off.');
  const placement = Object.fromEntries(kept) as Placement;
  return ok({
    content: byHand(setting, content, placement),
    said: kept.length === 0 ? 'All ops taken off.' : 'All ops that are not pinned taken off.',
  });
}

/** Pins a placed op where it is, or unpins it. */
export function togglePin(setting: BenchSetting, content: BenchContent, id: OpId): Result<Change, string> {
  const name = nameOf(setting, id);
  if (content.pins[id] !== undefined) {
    const { [id]: _, ...pins } = content.pins;
    return ok({ content: { ...content, pins: pins as Pins }, said: `${name} unpinned.` });
  }
  const tile = content.placement[id];
  if (tile === undefined) return err(`Place ${name} before pinning it.`);
  return ok({
    content: { ...content, pins: { ...content.pins, [id]: tile } },
    said: `${name} pinned to ${tileLabel(tile)}.`,
  });
}

/** Takes over a solve's placement and routes as they are. Pins stay as the person has them now, unless others go with it. */
export function takeResult(
  content: BenchContent,
  result: { placement: Placement; routes: Routes; provenance: Provenance },
  how: { said?: string; pins?: Pins } = {},
): Change {
  return {
    content: { ...result, pins: how.pins ?? content.pins },
    said: how.said ?? 'The auto-placed mapping is on the bench. Undo brings back what was there.',
  };
}
