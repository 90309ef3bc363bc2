/** Ways to come by instances and integer programs in tests. */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import loadHighs from 'highs';
import type { EngineLimits } from '@/lib/solver/engines/engine';
import { joinPairs, type PlacementInstance } from '@/lib/solver/instance';
import type { IntegerProgram } from '@/lib/solver/integer-program/integer-program';

export const limits = (timeLimitMs: number, more: Partial<EngineLimits> = {}): EngineLimits => ({
  timeLimitMs,
  seed: 1,
  nowMs: () => performance.now(),
  shouldStop: () => false,
  warmStart: null,
  ...more,
});

export interface QapInstance {
  name: string;
  n: number;
  optimumCountingEachPairOnce: number;
  gilmoreLawlerRootBound: number;
  distanceMatrix: 'A' | 'B';
  locationOfFacility: number[];
  A: number[][];
  B: number[][];
}

export const readQap = (name: string): QapInstance =>
  JSON.parse(readFileSync(join('tests/reference/qaplib', `${name}.json`), 'utf8'));

/** Facilities are ops, locations are tiles in one row; each unordered pair counts once. */
export function qapAsInstance(qap: QapInstance): PlacementInstance {
  const [distance, flow] = qap.distanceMatrix === 'A' ? [qap.A, qap.B] : [qap.B, qap.A];
  const all = Array.from({ length: qap.n }, (_, i) => i);
  const pairs = joinPairs(
    all.flatMap((i) => all.slice(i + 1).map((j) => ({ from: i, to: j, weight: flow[i]?.[j] ?? 0 }))),
  ).filter((pair) => pair.weight > 0);
  return {
    tileCount: qap.n,
    rows: 1,
    cols: qap.n,
    distance: Uint16Array.from(distance.flat()),
    maxHops: null,
    objective: 'path',
    opCount: qap.n,
    candidates: all.map(() => all),
    pairs,
    nets: [],
    isPlainMesh: false,
  };
}

/** Reads LP text by HiGHS and gives it in our neutral form. */
export async function readLpText(text: string, hasIntegerObjective: boolean): Promise<IntegerProgram> {
  const highs = await loadHighs();
  return highs.withModel({ format: 'lp', data: text }, (model) => {
    const data = model.getModel('csr');
    return {
      columnNames: Array.from({ length: data.numCols }, (_, i) => `c${i}`),
      lower: data.colLower,
      upper: data.colUpper,
      cost: data.colCost,
      isInteger: Uint8Array.from(data.integrality, (kind) => (kind === 0 ? 0 : 1)),
      offset: data.offset,
      rowNames: Array.from({ length: data.numRows }, (_, i) => `r${i}`),
      rowLower: data.rowLower,
      rowUpper: data.rowUpper,
      rowStart: data.matrix.starts,
      entryColumn: data.matrix.indices,
      entryValue: data.matrix.values,
      hasIntegerObjective,
    };
  });
}
