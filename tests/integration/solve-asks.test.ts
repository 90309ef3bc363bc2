import { beforeAll, describe, expect, it } from 'vitest';
import { askedSolve } from '../../app/w/[workspace]/mappings/solve-ask';
import { getMappingDraft, type MappingDraftView, saveMappingDraft } from '../../db/queries/mapping-drafts';
import { createSolve, getSolve, lastSolves, listSolves, requestCancel } from '../../db/queries/solve-jobs';
import { finishSolve, type Hold, takeSolve } from '../../db/queries/solve-work';
import type { SolveAsk, SolveEnd } from '../../db/schema/solve-jobs';
import type { TileId } from '../../lib/fabric/fabric';
import { opId } from '../../lib/graph/ids';
import type { Id } from '../../lib/ids';
import type { Pins, Placement } from '../../lib/mapping/mapping';
import type { Ask } from '../../lib/solver/solve-ask';
import { testDatabase } from '../helpers/database';
import { newBench, value } from '../helpers/documents';
import { figures, handDocument } from '../helpers/kept-mapping';
import { newWorkspace } from '../helpers/people';

const box = testDatabase();
const settings = { engine: 'auto', objective: 'wire', timeLimitMs: 5000, seed: 1 } as const;
const { placement, routes } = handDocument();
const load = opId('op_load');
const tile = (id: string) => id as TileId;
const another: SolveAsk = { kind: 'another', objectiveValue: 1, than: [placement], provenBound: 1 };

let of: Awaited<ReturnType<typeof newWorkspace>>;
let elsewhere: Awaited<ReturnType<typeof newWorkspace>>;
beforeAll(async () => {
  of = await newWorkspace(box.db);
  elsewhere = await newWorkspace(box.db);
});

const create = (draftId: Id<'draft'>, ask?: SolveAsk, pins: Pins = {}) =>
  createSolve(box.db, {
    ...of,
    draftId,
    settings: ask ? { ...settings, ask } : settings,
    pins,
    startPlacement: null,
  });

/** A solve that has ended so. */
async function ended(
  draftId: Id<'draft'>,
  over: Partial<SolveEnd>,
  best: Placement | null,
  pins: Pins = {},
): Promise<Id<'solve'>> {
  const { id } = value(await create(draftId, undefined, pins));
  const hold = (await takeSolve(box.db, { solveId: id, worker: 'a' })) as Hold;
  const outcome: SolveEnd = {
    status: 'feasible',
    engine: 'search',
    elapsedMs: 1,
    nodes: 0,
    objectiveValue: null,
    bound: null,
    gapRatio: null,
    stopReason: null,
    reason: null,
    explanation: null,
    ...over,
  };
  await finishSolve(box.db, hold, {
    state: 'done',
    outcome,
    best: best && { objectiveValue: outcome.objectiveValue ?? 0, placement: best, routes },
  });
  return id;
}

async function asked(draftId: Id<'draft'>, ask: Ask, pins: Pins = {}) {
  const bench = (await getMappingDraft(box.db, { ...of, draftId })) as MappingDraftView;
  const solves = await listSolves(box.db, { ...of, draftId });
  return askedSolve(bench, solves, { ask, objective: 'wire', pins, startPlacement: null });
}

describe('a solve with a question', () => {
  it('keeps what is to be avoided for the worker, and leaves it out where it is read again and again', async () => {
    const { draftId } = await newBench(box.db, of);
    const { id, asks } = value(await create(draftId, another));
    expect(asks).toBe('another');
    const view = await getSolve(box.db, { ...of, solveId: id });
    expect(view?.settings).toEqual({
      ...settings,
      ask: { kind: 'another', objectiveValue: 1, provenBound: 1 },
    });
    const taken = await takeSolve(box.db, { solveId: id, worker: 'a' });
    expect(taken?.settings.ask).toEqual(another);
  });

  it('is the answer to an ordinary request while it runs, and says what it was asked', async () => {
    const { draftId } = await newBench(box.db, of);
    const first = value(await create(draftId, another));
    expect(value(await create(draftId))).toEqual({ id: first.id, created: false, asks: 'another' });
    value(await requestCancel(box.db, { ...of, solveId: first.id }));
    const second = value(await create(draftId));
    expect(second).toMatchObject({ created: true, asks: null });
    expect(value(await create(draftId, another))).toEqual({ id: second.id, created: false, asks: null });
  });
});

describe('the last solves of a bench', () => {
  it('are its last ordinary one, and a question only where that came later', async () => {
    const { draftId } = await newBench(box.db, of);
    const last = () => lastSolves(box.db, { ...of, draftId });
    expect(await last()).toEqual({ ordinary: null, asked: null });
    const end = async (made: ReturnType<typeof create>) => {
      const { id } = value(await made);
      value(await requestCancel(box.db, { ...of, solveId: id }));
      return id;
    };
    const early = await end(create(draftId, another));
    expect(await last()).toEqual({ ordinary: null, asked: early });
    const ordinary = await end(create(draftId));
    expect(await last()).toEqual({ ordinary, asked: null });
    await end(create(draftId, another));
    const late = await end(create(draftId, another));
    expect(await last()).toEqual({ ordinary, asked: late });
  });

  it('are none of another workspace’s', async () => {
    const { draftId } = await newBench(box.db, of);
    value(await create(draftId, another));
    expect(await lastSolves(box.db, { ...elsewhere, draftId })).toEqual({ ordinary: null, asked: null });
  });
});

describe('what a question takes from earlier solves of the bench', () => {
  it('another of equal cost takes the bound that was proved for these pins or fewer', async () => {
    const { draftId } = await newBench(box.db, of);
    await ended(draftId, { objectiveValue: 1, bound: 1 }, placement);
    await ended(draftId, { bound: 3 }, null, { [load]: tile('r1c0') });
    const ask: Ask = { kind: 'another', objectiveValue: 1, than: [placement] };
    expect((await asked(draftId, ask)).ask.provenBound).toBe(1);
    expect((await asked(draftId, ask, { [load]: tile('r1c0') })).ask.provenBound).toBe(3);
  });

  it('that there is no other is no proof that there is no mapping', async () => {
    const { draftId } = await newBench(box.db, of);
    const none = { code: 'no other' as const, message: '', opIds: [], tileIds: [], edgeIds: [] };
    await ended(draftId, { status: 'infeasible', explanation: none }, null);
    const ask: Ask = { kind: 'pin price', op: load, tile: tile('r0c0'), side: 'with pin' };
    expect((await asked(draftId, ask)).ask).toMatchObject({ other: { status: 'unknown', solveId: null } });
    await ended(draftId, { status: 'infeasible' }, null);
    expect((await asked(draftId, ask)).ask).toMatchObject({ other: { status: 'infeasible' } });
  });

  it('the price of a pin knows both sides, and its own solve starts from the best that keeps its pins', async () => {
    const { draftId } = await newBench(box.db, of);
    const pins: Pins = { [load]: tile('r0c0') };
    const withPin = await ended(draftId, { objectiveValue: 2, bound: 2 }, placement, pins);
    const free = { op_load: 'r1c0', op_store: 'r0c0' } as Placement;
    await ended(draftId, { objectiveValue: 1, bound: 0 }, free);
    const without = await asked(
      draftId,
      { kind: 'pin price', op: load, tile: tile('r0c0'), side: 'without pin' },
      pins,
    );
    expect(without).toMatchObject({
      pins: {},
      startPlacement: free,
      ask: {
        isPinned: true,
        provenBound: 0,
        other: { status: 'optimal', objectiveValue: 2, bound: 2, solveId: withPin },
      },
    });
    const supposed = await asked(draftId, {
      kind: 'pin price',
      op: load,
      tile: tile('r0c0'),
      side: 'with pin',
    });
    expect(supposed).toMatchObject({
      pins,
      startPlacement: placement,
      ask: { isPinned: false, provenBound: 2, other: { status: 'feasible', objectiveValue: 1 } },
    });
  });

  it('a legal mapping made by hand counts, one with a broken rule does not', async () => {
    const { draftId } = await newBench(box.db, of);
    const ask: Ask = { kind: 'pin price', op: load, tile: tile('r0c0'), side: 'without pin' };
    const save = async (revision: number, document: { placement: Placement; routes: typeof routes }) =>
      value(
        await saveMappingDraft(box.db, {
          ...of,
          draftId,
          revision,
          document: { ...document, pins: {} },
          provenance: { by: 'hand' },
          figures: { ...figures, placedOps: 2 },
        }),
      );
    await save(1, { placement, routes: {} });
    expect((await asked(draftId, ask)).ask).toMatchObject({ other: { status: 'unknown' } });
    await save(2, { placement, routes });
    expect((await asked(draftId, ask)).ask).toMatchObject({
      other: { status: 'feasible', objectiveValue: 1, bound: 0, solveId: null },
    });
  });
});
