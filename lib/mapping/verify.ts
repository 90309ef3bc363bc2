/**
 * The verifier: whether a mapping is legal by R1 to R7 of MODEL.md, and if not, every rule that it breaks.
 * It shares no code with the solver and the router: it walks routes by itself and decides by itself which links
 * exist. It takes any document of the right shape, however wrong, and answers with violations, never a throw.
 */
import type { Fabric, TileId, UnitId } from '../fabric/fabric';
import { tileLabel } from '../fabric/tiles';
import { builtInLibrary, canHost, hostsOf, type UnitLibrary } from '../fabric/unit-library';
import type { Kernel, Op, OpId } from '../graph/kernel';
import { opSpec } from '../graph/op-catalog';
import type { Pins, Placement, Routes } from './mapping';
import { tileInFabric } from './verify-links';
import { verifyRoutes } from './verify-routes';
import { opName, type Rule, type Violation } from './violation';

export type { Violation } from './violation';

export interface VerifyOptions {
  /** Unplaced ops are not violations: for work in progress. */
  partial?: boolean;
  /** The workspace's units; without it the built-in ones. */
  library?: UnitLibrary;
}

/** Every broken rule of a mapping, R1 first. Empty exactly when the mapping is legal. */
export function verifyMapping(
  kernel: Kernel,
  fabric: Fabric,
  mapping: { placement: Placement; routes: Routes; pins: Pins },
  options: VerifyOptions = {},
): Violation[] {
  return [
    ...verifyPlacement(kernel, fabric, mapping, options),
    ...verifyRoutes(kernel, fabric, mapping.placement, mapping.routes),
  ];
}

/** R1 to R4: every broken rule of a placement alone. */
export function verifyPlacement(
  kernel: Kernel,
  fabric: Fabric,
  { placement, pins }: { placement: Placement; pins: Pins },
  options: VerifyOptions = {},
): Violation[] {
  const library = options.library ?? builtInLibrary;
  const ops = new Map<string, Op>(kernel.ops.map((op) => [op.id, op]));
  return [
    ...checkOnFabric(kernel, fabric, placement, ops, options.partial ?? false),
    ...checkApart(placement, ops),
    ...checkUnits(kernel, fabric, placement, library),
    ...checkPins(placement, pins, ops, options.partial ?? false),
  ];
}

const violation = (rule: Rule, message: string, opIds: OpId[], tileIds: TileId[] = []): Violation => ({
  rule,
  message,
  opIds,
  tileIds,
  linkIds: [],
});

const entries = (placement: Placement): [OpId, TileId][] => Object.entries(placement) as [OpId, TileId][];
const nameOf = (id: string, ops: ReadonlyMap<string, Op>): string => {
  const op = ops.get(id);
  return op ? opName(op) : id;
};

/** The unit at a tile; null for a router without a PE, undefined for a tile outside the fabric. */
function unitAt(fabric: Fabric, tile: TileId): UnitId | null | undefined {
  const at = tileInFabric(fabric, tile);
  return at ? (fabric.units[at.row * fabric.cols + at.col] ?? null) : undefined;
}

/** R1 */
function checkOnFabric(
  kernel: Kernel,
  fabric: Fabric,
  placement: Placement,
  ops: ReadonlyMap<string, Op>,
  partial: boolean,
): Violation[] {
  const found: Violation[] = [];
  for (const op of kernel.ops) {
    const tile = placement[op.id];
    if (tile === undefined) {
      if (!partial) found.push(violation('R1', `${opName(op)} is not placed`, [op.id]));
      continue;
    }
    const unit = unitAt(fabric, tile);
    if (unit === undefined) {
      const size = `${fabric.rows} rows and ${fabric.cols} columns`;
      const text = `${opName(op)} is placed at ${tileLabel(tile)}, but the fabric has ${size}`;
      found.push(violation('R1', text, [op.id], [tile]));
    } else if (unit === null) {
      const text = `${opName(op)} is placed at ${tileLabel(tile)}, which has a router but no PE`;
      found.push(violation('R1', text, [op.id], [tile]));
    }
  }
  for (const [id, tile] of entries(placement)) {
    if (ops.has(id)) continue;
    found.push(violation('R1', `The placement names ${id}, which the kernel does not have`, [id], [tile]));
  }
  return found;
}

/** R2 */
function checkApart(placement: Placement, ops: ReadonlyMap<string, Op>): Violation[] {
  const byTile = new Map<TileId, OpId[]>();
  for (const [id, tile] of entries(placement)) {
    if (!ops.has(id)) continue;
    const there = byTile.get(tile);
    if (there) there.push(id);
    else byTile.set(tile, [id]);
  }
  return [...byTile]
    .filter(([, ids]) => ids.length > 1)
    .map(([tile, ids]) => {
      const names = ids.map((id) => nameOf(id, ops)).join(', ');
      return violation('R2', `${names} share the PE at ${tileLabel(tile)}`, ids, [tile]);
    });
}

/** R3 */
function checkUnits(kernel: Kernel, fabric: Fabric, placement: Placement, library: UnitLibrary): Violation[] {
  const found: Violation[] = [];
  for (const op of kernel.ops) {
    const tile = placement[op.id];
    if (tile === undefined) continue;
    const unit = unitAt(fabric, tile);
    if (unit === undefined || unit === null || canHost(unit, op.kind, library)) continue;
    const label = library.get(unit)?.label;
    const there = label === undefined ? `${unit}, which the unit library does not have` : `a unit ${label}`;
    const hosts = hostsOf(op.kind, library).map((host) => host.label);
    const needs = hosts.length === 0 ? 'no unit of the library can' : `${hosts.join(' or ')} can`;
    const text = `The PE at ${tileLabel(tile)} is ${there}: it cannot do ${opName(op)} (${opSpec(op.kind).label}); ${needs}`;
    found.push(violation('R3', text, [op.id], [tile]));
  }
  return found;
}

/** R4 */
function checkPins(
  placement: Placement,
  pins: Pins,
  ops: ReadonlyMap<string, Op>,
  partial: boolean,
): Violation[] {
  const found: Violation[] = [];
  for (const [id, pin] of entries(pins)) {
    if (!ops.has(id)) {
      found.push(violation('R4', `A pin names ${id}, which the kernel does not have`, [id], [pin]));
      continue;
    }
    const tile = placement[id];
    if (tile === pin || (tile === undefined && partial)) continue;
    const where = tile === undefined ? 'is not placed' : `is at ${tileLabel(tile)}`;
    const text = `${nameOf(id, ops)} is pinned to ${tileLabel(pin)} but ${where}`;
    found.push(violation('R4', text, [id], tile === undefined ? [pin] : [pin, tile]));
  }
  return found;
}
