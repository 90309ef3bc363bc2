import type { UnitId } from '@/lib/fabric/fabric';
import { type UnitForm, type UnitLibrary, unitSpec } from '@/lib/fabric/unit-library';

const tints: Record<UnitForm, string> = {
  plain: 'var(--tile-arithmetic)',
  cornerTicks: 'var(--tile-multiplier)',
  footBar: 'var(--tile-memory)',
  notch: 'var(--tile-scratchpad)',
  stitched: 'var(--tile-arithmetic)',
};

/** Form and tint of a tile; a unit that the library does not have looks like a custom one. */
export function unitLook(unit: UnitId | null, library: UnitLibrary): { form: UnitForm; tint: string } | null {
  if (unit === null) return null;
  const form = unitSpec(unit, library)?.form ?? 'stitched';
  return { form, tint: tints[form] };
}
