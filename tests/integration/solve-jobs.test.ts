import { eq, sql } from 'drizzle-orm';
import { beforeAll, describe, expect, it } from 'vitest';
import { createSolve, getSolve, noteQueued, requestCancel } from '../../db/queries/solve-jobs';
import {
  beat,
  finishSolve,
  forgetWorker,
  type Hold,
  reportProgress,
  type SolveProgressNote,
  sweepSolves,
  takeSolve,
  thinned,
  workerAgeSeconds,
} from '../../db/queries/solve-work';
import { solveJobs } from '../../db/schema';
import type { Id } from '../../lib/ids';
import { testDatabase } from '../helpers/database';
import { gaugeKernel, newBench, smallFabric, value } from '../helpers/documents';
import { handDocument } from '../helpers/kept-mapping';
import { newWorkspace } from '../helpers/people';

const box = testDatabase();
const settings = { engine: 'auto', objective: 'wire', timeLimitMs: 5000, seed: 1 } as const;
const { placement, routes } = handDocument();
let of: Awaited<ReturnType<typeof newWorkspace>>;
beforeAll(async () => {
  of = await newWorkspace(box.db);
});

async function newSolve(): Promise<Id<'solve'>> {
  const { draftId } = await newBench(box.db, of);
  const made = await createSolve(box.db, { ...of, draftId, settings, pins: {}, startPlacement: null });
  return value(made).id;
}

const note = (over: Partial<SolveProgressNote> = {}): SolveProgressNote => ({
  phase: 'search',
  bound: 1,
  gapRatio: 0.5,
  elapsedMs: 100,
  nodes: 40,
  best: { objectiveValue: 2, placement, routes },
  history: [{ elapsedMs: 100, best: 2, bound: 1 }],
  ...over,
});

const end = (over: { bound?: number } = {}) => ({
  status: 'feasible' as const,
  engine: 'highs',
  elapsedMs: 120,
  nodes: 50,
  objectiveValue: 2,
  bound: 1,
  gapRatio: 0.5,
  stopReason: null,
  reason: null,
  explanation: null,
  ...over,
});

/** The lease ends, as if the worker had been silent for so long. */
const endLease = (id: Id<'solve'>) =>
  box.db.update(solveJobs).set({ leaseUntil: sql`now() - interval '1 second'` }).where(eq(solveJobs.id, id));

describe('asking for a solve', () => {
  it('finds the one that is on its way instead of making a second', async () => {
    const { draftId } = await newBench(box.db, of);
    const ask = () => createSolve(box.db, { ...of, draftId, settings, pins: {}, startPlacement: null });
    const both = (await Promise.all([ask(), ask()])).map(value);
    expect(new Set(both.map((solve) => solve.id)).size).toBe(1);
    expect(both.filter((solve) => solve.created)).toHaveLength(1);
  });

  it('makes a new one when the last is over', async () => {
    const { draftId } = await newBench(box.db, of);
    const ask = () => createSolve(box.db, { ...of, draftId, settings, pins: {}, startPlacement: null });
    const first = value(await ask());
    value(await requestCancel(box.db, { ...of, solveId: first.id }));
    expect(value(await ask())).toMatchObject({ created: true });
  });
});

describe('taking a solve', () => {
  it('gives it to one of two workers, with both documents', async () => {
    const solveId = await newSolve();
    const taken = await Promise.all([
      takeSolve(box.db, { solveId, worker: 'a' }),
      takeSolve(box.db, { solveId, worker: 'b' }),
    ]);
    const got = taken.filter((solve) => solve !== null);
    expect(got).toHaveLength(1);
    expect(got[0]).toMatchObject({ attempt: 1, kernel: gaugeKernel(), fabric: smallFabric(), settings });
  });

  it('does not give away one that was cancelled', async () => {
    const solveId = await newSolve();
    expect(value(await requestCancel(box.db, { ...of, solveId })).state).toBe('cancelled');
    expect(await takeSolve(box.db, { solveId, worker: 'a' })).toBeNull();
  });

  it('begins a second attempt from the best of the first', async () => {
    const solveId = await newSolve();
    const first = await takeSolve(box.db, { solveId, worker: 'a' });
    expect(await reportProgress(box.db, first as Hold, note())).toBe('continue');
    await endLease(solveId);
    const second = await takeSolve(box.db, { solveId, worker: 'b' });
    expect(second).toMatchObject({ attempt: 2, startPlacement: placement });
    expect(second?.history).toHaveLength(1);
  });
});

describe('a worker that was thought lost', () => {
  it('changes nothing when it wakes up', async () => {
    const solveId = await newSolve();
    const late = (await takeSolve(box.db, { solveId, worker: 'a' })) as Hold;
    await endLease(solveId);
    const now = (await takeSolve(box.db, { solveId, worker: 'b' })) as Hold;
    expect(await reportProgress(box.db, late, note({ phase: 'late' }))).toBe('lost');
    expect(await finishSolve(box.db, late, { state: 'done', outcome: end(), best: null })).toBe(false);
    expect(await getSolve(box.db, { ...of, solveId })).toMatchObject({ state: 'running', phase: '' });
    expect(await reportProgress(box.db, now, note({ phase: 'search' }))).toBe('continue');
  });
});

describe('a worker that takes up its own lost solve', () => {
  it('is fenced from its earlier attempt', async () => {
    const solveId = await newSolve();
    const earlier = (await takeSolve(box.db, { solveId, worker: 'a' })) as Hold;
    await endLease(solveId);
    await takeSolve(box.db, { solveId, worker: 'a' });
    expect(await reportProgress(box.db, earlier, note())).toBe('lost');
  });
});

describe('a solve that is over', () => {
  it('takes no progress and no second end', async () => {
    const solveId = await newSolve();
    const hold = (await takeSolve(box.db, { solveId, worker: 'a' })) as Hold;
    expect(await finishSolve(box.db, hold, { state: 'done', outcome: end(), best: null })).toBe(true);
    expect(await reportProgress(box.db, hold, note())).toBe('lost');
    expect(await finishSolve(box.db, hold, { state: 'failed', outcome: end(), best: null })).toBe(false);
    expect((await getSolve(box.db, { ...of, solveId }))?.state).toBe('done');
  });
});

describe('a running solve', () => {
  it('is not taken by another worker while its lease lasts', async () => {
    const solveId = await newSolve();
    await takeSolve(box.db, { solveId, worker: 'a' });
    expect(await takeSolve(box.db, { solveId, worker: 'b' })).toBeNull();
  });

  it('shows progress, is asked to stop and ends with its best', async () => {
    const solveId = await newSolve();
    const hold = (await takeSolve(box.db, { solveId, worker: 'a' })) as Hold;
    await reportProgress(box.db, hold, note());
    expect(await getSolve(box.db, { ...of, solveId })).toMatchObject({
      state: 'running',
      bestObjective: 2,
      bound: 1,
      gapRatio: 0.5,
      best: { placement, routes },
    });
    expect(value(await requestCancel(box.db, { ...of, solveId })).state).toBe('running');
    expect(await reportProgress(box.db, hold, note({ best: null, elapsedMs: 200 }))).toBe('stop');
    expect(await finishSolve(box.db, hold, { state: 'cancelled', outcome: end(), best: null })).toBe(true);
    expect(await getSolve(box.db, { ...of, solveId })).toMatchObject({
      state: 'cancelled',
      bestObjective: 2,
      best: { objectiveValue: 2 },
      outcome: { status: 'feasible' },
    });
  });

  it('stores a bound that is not finite as none', async () => {
    const solveId = await newSolve();
    const hold = (await takeSolve(box.db, { solveId, worker: 'a' })) as Hold;
    await reportProgress(box.db, hold, note({ bound: Number.NEGATIVE_INFINITY, gapRatio: Number.NaN }));
    expect(await getSolve(box.db, { ...of, solveId })).toMatchObject({ bound: null, gapRatio: null });
  });
});

describe('the sweep', () => {
  it('puts a lost solve back, and gives up after three attempts', async () => {
    const solveId = await newSolve();
    await noteQueued(box.db, { ...of, solveId, bossJobId: 'sent' });
    for (const attempt of [1, 2, 3]) {
      const hold = await takeSolve(box.db, { solveId, worker: 'a' });
      expect(hold?.attempt).toBe(attempt);
      await endLease(solveId);
      const sweep = await sweepSolves(box.db);
      const expected =
        attempt < 3
          ? { resend: [{ id: solveId, timeLimitMs: 5000 }], ended: [] }
          : { resend: [], ended: [solveId] };
      expect(sweep).toEqual(expected);
    }
    const over = await getSolve(box.db, { ...of, solveId });
    expect(over).toMatchObject({
      state: 'failed',
      outcome: { status: 'unknown', stopReason: 'worker lost' },
    });
    expect(over?.outcome?.reason).toMatch(/interrupted 3 times/);
  });

  it('ends a lost solve that was to stop as cancelled', async () => {
    const solveId = await newSolve();
    await takeSolve(box.db, { solveId, worker: 'a' });
    value(await requestCancel(box.db, { ...of, solveId }));
    await endLease(solveId);
    expect((await sweepSolves(box.db)).ended).toEqual([solveId]);
    expect((await getSolve(box.db, { ...of, solveId }))?.state).toBe('cancelled');
  });

  it('sends what never reached the queue, once, after half a minute', async () => {
    const solveId = await newSolve();
    expect((await sweepSolves(box.db)).resend).toEqual([]);
    await box.db
      .update(solveJobs)
      .set({ createdAt: sql`now() - interval '31 seconds'` })
      .where(eq(solveJobs.id, solveId));
    expect((await sweepSolves(box.db)).resend).toEqual([{ id: solveId, timeLimitMs: 5000 }]);
    expect((await sweepSolves(box.db)).resend).toEqual([]);
  });

  it('leaves alone what is running in time', async () => {
    const solveId = await newSolve();
    await takeSolve(box.db, { solveId, worker: 'a' });
    expect(await sweepSolves(box.db)).toEqual({ resend: [], ended: [] });
  });
});

describe('the history', () => {
  it('of 1000 points keeps at most 400, with first and last', () => {
    const points = Array.from({ length: 1000 }, (_, i) => ({ elapsedMs: i, best: null, bound: i }));
    const kept = thinned(points);
    expect(kept.length).toBeLessThanOrEqual(400);
    expect([kept[0]?.elapsedMs, kept.at(-1)?.elapsedMs]).toEqual([0, 999]);
  });
});

describe('the heartbeat', () => {
  it('is null before the first beat, young after it, and gone with its worker', async () => {
    expect(await workerAgeSeconds(box.db)).toBeNull();
    await beat(box.db, 'a');
    await beat(box.db, 'a');
    expect(await workerAgeSeconds(box.db)).toBeLessThan(5);
    await forgetWorker(box.db, 'a');
    expect(await workerAgeSeconds(box.db)).toBeNull();
  });
});
