/** New fabrics from a short form: grid, links and one of the named patterns of units. */
import type { Fabric, Topology, UnitId } from './fabric';
import { type UnitMixPattern, unitMixPatterns } from './unit-mix-patterns';

export { type UnitMixPattern, unitMixPatterns };

export interface NewFabricForm {
  name: string;
  rows: number;
  cols: number;
  topology: Topology;
  mix: UnitMixPattern;
  /** Channels of every link. */
  channels: number;
  bufferDepth: number;
  clock: Fabric['clock'];
  memoryBanks: number;
}

/** The pattern with an id, or null. */
export const unitMixPattern = (id: string): UnitMixPattern | null =>
  unitMixPatterns.find((pattern) => pattern.id === id) ?? null;

/** Units row by row, as a fabric holds them. */
export function unitsOfPattern(mix: UnitMixPattern, rows: number, cols: number): (UnitId | null)[] {
  return Array.from({ length: rows * cols }, (_, i) =>
    mix.unitAt({ row: Math.floor(i / cols), col: i % cols, rows, cols }),
  );
}

/** A fabric with every preset link present and equally wide. The numbers of the form must be within the schema's. */
export function newFabric(form: NewFabricForm): Fabric {
  return {
    format: 'pinloom.fabric',
    formatVersion: 1,
    name: form.name,
    description: '',
    rows: form.rows,
    cols: form.cols,
    topology: form.topology,
    units: unitsOfPattern(form.mix, form.rows, form.cols),
    channels: form.channels,
    removedLinks: [],
    addedLinks: [],
    linkChannels: {},
    bufferDepth: form.bufferDepth,
    clock: form.clock,
    memoryBanks: form.memoryBanks,
  };
}

/** How many PEs of each unit a list of units has, in order of first appearance. */
export function countUnits(units: readonly (UnitId | null)[]): Map<UnitId, number> {
  const counts = new Map<UnitId, number>();
  for (const unit of units) if (unit !== null) counts.set(unit, (counts.get(unit) ?? 0) + 1);
  return counts;
}
