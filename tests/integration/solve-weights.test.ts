/** Weights from the request for a solve to the kept mapping. Only Next's access to the request is stood in for. */
import { beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { signInAs } from '../../app/_server/session';
import { keepAsMapping, saveBench } from '../../app/w/[workspace]/mappings/actions';
import { startSolve } from '../../app/w/[workspace]/mappings/solve-actions';
import { closeDatabase } from '../../db/client';
import { getMapping } from '../../db/queries/mappings';
import { getSolve } from '../../db/queries/solve-jobs';
import { finishSolve, takeSolve } from '../../db/queries/solve-work';
import type { Provenance } from '../../lib/mapping/mapping';
import { type Weights, weightsSchema } from '../../lib/mapping/weights';
import { testDatabase } from '../helpers/database';
import { newBench, value } from '../helpers/documents';
import { handDocument } from '../helpers/kept-mapping';
import { newMember, newWorkspace } from '../helpers/people';

const request = vi.hoisted(() => ({ jar: new Map<string, { value: string }>() }));
vi.mock('next/headers', () => ({
  headers: async () => new Headers({ 'user-agent': 'Test browser', 'x-forwarded-for': '192.0.2.7' }),
  cookies: async () => ({
    get: (name: string) => request.jar.get(name),
    set: (name: string, text: string) => request.jar.set(name, { value: text }),
  }),
}));
vi.mock('next/cache', () => ({ revalidatePath: () => undefined }));
// The queue is another process's; what it is given is the solve's id alone.
vi.mock('../../app/_server/jobs', () => ({ enqueueSolve: async () => 'sent' }));

const box = testDatabase();
let of: Awaited<ReturnType<typeof newWorkspace>>;
let draftId: `draft_${string}`;
beforeAll(() => {
  process.env.DATABASE_URL = box.url;
  process.env.LOG_LEVEL = 'silent';
  return closeDatabase;
});
beforeEach(async () => {
  request.jar.clear();
  of = await newWorkspace(box.db);
  draftId = (await newBench(box.db, of)).draftId;
  await signInAs((await newMember(box.db, of, 'editor')).id);
});

const { placement, pins, routes } = handDocument();
const tripled = weightsSchema.parse({ nets: { op_load: 3 }, edges: { edge_1: 7 } });
const plain = { engine: 'auto', objective: 'wire', timeLimitMs: 5000, seed: 1 } as const;
const start = (weights?: object) =>
  startSolve({
    workspace: of.slug,
    draftId,
    settings: { ...plain, ...(weights && { weights: weights as Weights }) },
    pins: {},
    startPlacement: null,
  });

describe('asking for a solve with weights', () => {
  it('stores them with its settings, where the worker and the bench find them', async () => {
    const { solveId } = value(await start(tripled));
    expect((await getSolve(box.db, { ...of, solveId }))?.settings).toEqual({ ...plain, weights: tripled });
    expect((await takeSolve(box.db, { solveId, worker: 'a' }))?.settings.weights).toEqual(tripled);
  });

  it('stores none where none are given', async () => {
    const { solveId } = value(await start());
    expect((await getSolve(box.db, { ...of, solveId }))?.settings).toEqual(plain);
  });

  it.each([
    ['below 0', { nets: { op_load: -1 } }],
    ['above a thousand million', { edges: { edge_1: 1e9 + 1 } }],
    ['that are no number', { nets: { op_load: Number.NaN } }],
    ['without end', { nets: { op_load: Number.POSITIVE_INFINITY } }],
    ['of something else', { ops: { op_load: 1 } }],
  ])('refuses weights %s', async (_, weights) => {
    expect(await start(weights)).toMatchObject({ error: { code: 'invalid' } });
  });

  it.each([
    ['an op that the kernel does not have', { nets: { op_ghost: 2 } }, /names the net of op_ghost/],
    ['an op that feeds nothing', { nets: { op_store: 2 } }, /op_store, but that op feeds no other op/],
    ['a connection that the kernel does not have', { edges: { edge_9: 2 } }, /the connection edge_9/],
  ])('says what is wrong with the weight of %s', async (_, weights, sentence) => {
    expect(await start(weights)).toMatchObject({
      error: { code: 'invalid', message: expect.stringMatching(sentence) },
    });
  });
});

describe('a mapping that was made with weights', () => {
  const provenance = (weights?: Weights): Provenance => ({
    by: 'solver',
    engine: 'search + exact',
    objective: 'wire',
    ...(weights && { weights }),
    timeLimitMs: 5000,
    seed: 1,
    status: 'optimal',
    objectiveValue: 3,
    bound: 3,
    elapsedMs: 9,
    changedByHand: false,
  });
  const counted = weightsSchema.parse({ nets: { op_load: 3 } });
  /** The solve has ended, and the bench claims its result as made so. */
  async function kept(claimed: Provenance) {
    const { solveId } = value(await start(tripled));
    const taken = await takeSolve(box.db, { solveId, worker: 'a' });
    if (!taken) throw new Error('not taken');
    await finishSolve(box.db, taken, {
      state: 'done',
      best: { objectiveValue: 3, placement, routes },
      outcome: {
        status: 'optimal',
        engine: 'search + exact',
        elapsedMs: 9,
        nodes: 0,
        objectiveValue: 3,
        bound: 3,
        gapRatio: 0,
        stopReason: null,
        reason: null,
        explanation: null,
      },
    });
    const document = { placement, pins, routes };
    const save = { workspace: of.slug, draftId, revision: 1, document, provenance: claimed };
    value(await saveBench(save));
    const made = value(await keepAsMapping({ workspace: of.slug, draftId, name: 'Weighted', revision: 2 }));
    return (await getMapping(box.db, { ...of, mappingId: made.mappingId }))?.document.provenance;
  }

  it('keeps those that counted in its objective', async () => {
    expect(await kept(provenance(counted))).toEqual(provenance(counted));
  });

  it('is by hand where other weights are claimed than the solve had', async () => {
    expect(await kept(provenance())).toEqual({ by: 'hand' });
  });
});
