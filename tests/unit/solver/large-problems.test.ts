import { describe, expect, it } from 'vitest';
import { fabricSchema, type LinkId, type UnitId } from '@/lib/fabric/fabric';
import { initialParams } from '@/lib/graph/edits';
import { edgeId, opId } from '@/lib/graph/ids';
import { emptyKernel, type Kernel } from '@/lib/graph/kernel';
import type { OpKind } from '@/lib/graph/op-catalog';
import { solve } from '@/lib/solver/solve';

/** load → add → … → add → store. */
function chain(opCount: number): Kernel {
  const kindAt = (i: number): OpKind => (i === 0 ? 'load' : i === opCount - 1 ? 'store' : 'add');
  const immediatesAt = (i: number): Record<string, number> => (kindAt(i) === 'add' ? { b: 1 } : {});
  const ops = Array.from({ length: opCount }, (_, i) => ({
    id: opId(`op_${i}`),
    kind: kindAt(i),
    label: '',
    widthBits: 32 as const,
    params: initialParams(kindAt(i)),
    immediates: immediatesAt(i),
    positionPx: { x: 0, y: 0 },
  }));
  const edges = ops.slice(1).map((op, i) => ({
    id: edgeId(`edge_${i}`),
    from: opId(`op_${i}`),
    to: op.id,
    port: op.kind === 'store' ? 'value' : 'a',
    distance: 0,
    initialValues: [],
  }));
  return { ...emptyKernel('chain'), ops, edges };
}

/** A mesh with memory units in the first column and arithmetic ones elsewhere. */
function fabric(side: number, removedLinks: readonly string[] = []) {
  const unit = (i: number) => (i % side === 0 ? 'unit_memory' : 'unit_arithmetic') as UnitId;
  return fabricSchema.parse({
    format: 'pinloom.fabric',
    formatVersion: 1,
    name: 'large',
    description: '',
    rows: side,
    cols: side,
    topology: 'mesh',
    units: Array.from({ length: side * side }, (_, i) => unit(i)),
    channels: 1,
    removedLinks: removedLinks as LinkId[],
    addedLinks: [],
    linkChannels: {},
    bufferDepth: 4,
    clock: null,
    memoryBanks: 4,
  });
}

/** Without an engine: what is tested here must not need one. The tests' own timeout is the bound in time. */
function solved(opCount: number, on: ReturnType<typeof fabric>, timeLimitMs: number, stopAtFirst = false) {
  let isFound = false;
  const result = solve(
    { kernel: chain(opCount), fabric: on, pins: {}, objective: 'wire' },
    { engine: 'auto', timeLimitMs, seed: 1, nodeLimit: null, searchTries: null },
    {
      nowMs: () => performance.now(),
      shouldStop: () => stopAtFirst && isFound,
      onProgress: ({ best }) => {
        isFound ||= best !== null;
      },
      engines: [],
    },
  );
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

describe('problems of unusual size', { timeout: 60_000 }, () => {
  it('2000 ops on 20 × 20 tiles: names the ops and units that are too few, at once', () => {
    const outcome = solved(2000, fabric(20), 600_000);
    expect(outcome).toMatchObject({ status: 'infeasible', explanation: { code: 'too few tiles' } });
    expect(outcome.reason).toMatch(/^1998 ops \(Add\) .* only 380 PEs/);
  });

  it('2000 ops on 48 × 48 tiles: ends soon after its time limit, with a legal mapping or none', () => {
    const outcome = solved(2000, fabric(48), 4000);
    expect(['feasible', 'unknown']).toContain(outcome.status);
    expect(outcome.bound).toBe(1999);
  });

  it('100 ops on 20 × 20 tiles: finds a legal mapping', () => {
    const outcome = solved(100, fabric(20), 40_000, true);
    expect(['feasible', 'optimal']).toContain(outcome.status);
    expect(outcome.bound).toBe(99);
  });

  it('says that no part of a fabric cut in two can hold what is connected', () => {
    const cut = [0, 1, 2, 3, 4, 5].flatMap((row) => [`r${row}c2>r${row}c3`, `r${row}c3>r${row}c2`]);
    const outcome = solved(20, fabric(6, cut), 60_000);
    expect(outcome).toMatchObject({ status: 'infeasible', explanation: { code: 'out of reach' } });
    expect(outcome.reason).toMatch(/in 2 parts that no link joins.* 20 ops/);
    expect(solved(12, fabric(6, cut), 20_000)).toMatchObject({ status: 'optimal', bound: 11 });
  });
});
