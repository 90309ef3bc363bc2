import { describe, expect, it } from 'vitest';
import { demoFabrics } from '@/db/seed/fabrics';
import { compileFabric } from '@/lib/fabric/compile';
import { fabricSchema } from '@/lib/fabric/fabric';
import { countUnits, unitMixPatterns, unitsOfPattern } from '@/lib/fabric/presets';
import { fabricStatistics } from '@/lib/fabric/statistics';
import { builtInUnits, canHost, unitSpecSchema } from '@/lib/fabric/unit-library';
import { validateFabric } from '@/lib/fabric/validate-fabric';
import { opKinds } from '@/lib/graph/op-catalog';
import { plainFabric } from './plain-fabric';

describe('patterns of units', () => {
  it.each(unitMixPatterns)('$label gives a whole fabric at small, odd and the largest sizes', (pattern) => {
    for (const rows of [1, 2, 3, 5, 6, 64]) {
      for (const cols of [1, 2, 3, 5, 7, 64]) {
        const fabric = plainFabric(rows, cols, 'mesh', { pattern: pattern.id });
        expect(fabricSchema.safeParse(fabric).success).toBe(true);
        expect(validateFabric(fabric)).toEqual([]);
      }
    }
  });

  it.each(unitMixPatterns.filter((pattern) => pattern.id !== 'arithmeticOnly'))(
    '$label has memory, multipliers and arithmetic from 4 × 4 on, and arithmetic most of all from 6 × 6 on',
    (pattern) => {
      for (const side of [4, 5, 6, 7, 8, 12, 16, 64]) {
        const counts = countUnits(unitsOfPattern(pattern, side, side));
        const units = [...counts.keys()];
        expect(units).toEqual(expect.arrayContaining(['unit_memory', 'unit_multiplier', 'unit_arithmetic']));
      }
      for (const side of [6, 8, 16, 64]) {
        const counts = countUnits(unitsOfPattern(pattern, side, side));
        const most = Math.max(...counts.values());
        expect([...counts].find(([, count]) => count === most)?.[0]).toBe('unit_arithmetic');
      }
    },
  );

  it('memory on the sides, 6 × 6: 12 memory, 4 multipliers, 4 scratchpads, 16 arithmetic', () => {
    const fabric = plainFabric(6, 6, 'mesh', { pattern: 'memoryEdges' });
    expect(Object.fromEntries(countUnits(fabric.units))).toEqual({
      unit_memory: 12,
      unit_multiplier: 4,
      unit_scratchpad: 4,
      unit_arithmetic: 16,
    });
  });
});

describe('the demonstration fabrics', () => {
  it('are legal, connected and clocked to 5, 7 and 9 hops', () => {
    expect(demoFabrics.map(({ fabric }) => [fabric.rows, compileFabric(fabric).maxHops])).toEqual([
      [4, 5],
      [6, 7],
      [8, 9],
    ]);
    for (const { fabric } of demoFabrics) {
      expect(fabricSchema.parse(fabric)).toEqual(fabric);
      expect(validateFabric(fabric)).toEqual([]);
      expect(fabricStatistics(compileFabric(fabric)).connectedParts).toBe(1);
    }
  });
});

describe('the unit library', () => {
  it('every op kind has exactly one built-in unit', () => {
    for (const kind of opKinds) {
      expect(builtInUnits.filter((unit) => canHost(unit.id, kind))).toHaveLength(1);
    }
  });
  it.each([
    ['memory', 'load', true],
    ['memory', 'add', false],
    ['scratchpad', 'scratchWrite', true],
    ['multiplier', 'multiplyAccumulate', true],
    ['arithmetic', 'multiply', false],
    ['arithmetic', 'reduceMax', true],
  ] as const)('%s hosts %s: %s', (name, kind, expected) => {
    const unit = builtInUnits.find((each) => each.id === `unit_${name}`);
    expect(canHost(unit?.id ?? null, kind)).toBe(expected);
  });
  it('a tile without a PE hosts nothing', () => {
    expect(canHost(null, 'add')).toBe(false);
  });
  it('built-in units fit the schema for custom ones', () => {
    for (const unit of builtInUnits) expect(unitSpecSchema.parse(unit)).toEqual(unit);
  });
});
