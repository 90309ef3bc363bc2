/** Things of one workspace, made by its owner when a case asks for them; each made once per scene. */
import type { APIRequestContext } from '@playwright/test';
import { solveResult, solveSchema } from '../../../components/mapping-bench/solve/solve-state';
import { gaugeKernel, smallFabric } from '../../helpers/documents';
import { type ActionResult, callAction, type ServerAction } from './server-calls';
import type { Stored } from './stored';

/** A person who calls the server: the cookies of one browser. */
export interface Caller {
  request: APIRequestContext;
  email: string;
}

export interface Ground {
  /** The address of the product, without a path. */
  origin: string;
  /** The slug of the workspace that things are made in. */
  workspace: string;
  owner: Caller;
  /** Somebody of another workspace. */
  outsider: Caller;
  /** Somebody who joins the workspace and leaves it again. */
  guest: Caller;
  actions: readonly ServerAction[];
  stored: Stored;
}

export const byHand = { by: 'hand' } as const;
export const nothingPlaced = { placement: {}, pins: {}, routes: {} };
/** The load and the store of the gauge kernel on the two memory units of the small fabric, one above the other. */
const placed = {
  placement: { op_load: 'r0c0', op_store: 'r1c0' },
  pins: {},
  routes: { op_load: ['r0c0>r1c0'] },
};

function once<T>(make: () => Promise<T>): () => Promise<T> {
  let made: Promise<T> | null = null;
  return () => {
    made ??= make();
    return made;
  };
}

export type Scene = ReturnType<typeof newScene>;

export function newScene(ground: Ground) {
  const { workspace } = ground;

  async function made<T>(name: string, input: object): Promise<T> {
    const result = await call(ground, ground.owner, name, { workspace, ...input });
    if (!result.ok) throw new Error(`${name}: ${result.error.message}`);
    return result.value as T;
  }

  const kernelId = once(
    async () => (await made<{ id: string }>('createKernelAction', { document: gaugeKernel() })).id,
  );
  const fabricId = once(
    async () =>
      (await made<{ fabricId: string }>('importFabricAction', { text: JSON.stringify(smallFabric()) }))
        .fabricId,
  );
  const draftId = once(async () => {
    const parts = { kernelId: await kernelId(), fabricId: await fabricId() };
    return (await made<{ draftId: string }>('createBench', { name: 'Bench', ...parts })).draftId;
  });
  const mappingId = once(async () => {
    const draft = { draftId: await draftId() };
    await made('saveBench', { ...draft, revision: 1, document: placed, provenance: byHand });
    return (await made<{ mappingId: string }>('keepAsMapping', { ...draft, name: 'Kept', revision: 2 }))
      .mappingId;
  });
  const solveId = once(async () => {
    const settings = { engine: 'search', objective: 'wire', timeLimitMs: 1000, seed: 1 };
    const asked = { draftId: await draftId(), settings, pins: {}, startPlacement: null };
    const { solveId: id } = await made<{ solveId: string }>('startSolve', asked);
    await ended(ground, id);
    return id;
  });
  /** A mapping of the bench that a solve has made and proved, as the bench takes it over. */
  const provedMappingId = once(async () => {
    const draft = { draftId: await draftId() };
    const settings = { engine: 'auto', objective: 'wire', timeLimitMs: 5000, seed: 1 };
    const asked = { ...draft, settings, pins: {}, startPlacement: null };
    const { solveId: id } = await made<{ solveId: string }>('startSolve', asked);
    await ended(ground, id);
    const answer = await ground.owner.request.get(`/api/w/${workspace}/solves/${id}`);
    const result = solveResult(solveSchema.parse(await answer.json()));
    if (!result) throw new Error(`The solve ${id} has no result`);
    const { provenance, ...document } = result;
    await made('saveBench', { ...draft, revision: 1, document: { ...document, pins: {} }, provenance });
    return (await made<{ mappingId: string }>('keepAsMapping', { ...draft, name: 'Proved', revision: 2 }))
      .mappingId;
  });
  const invitationId = once(async () => {
    const email = `invited-${Math.random().toString(36).slice(2)}@tarnbrook.example`;
    const { id } = await made<{ id: string }>('inviteAction', { email, role: 'viewer' });
    await ground.stored.tokenFor(email);
    return id;
  });
  /** The guest as a viewer of the workspace. */
  const guestId = once(async () => {
    const { email } = ground.guest;
    if (!(await ground.stored.isMember(email, workspace))) {
      await made('inviteAction', { email, role: 'viewer' });
      const token = await ground.stored.tokenFor(email);
      const joined = await call(ground, ground.guest, 'acceptAction', { token });
      if (!joined.ok) throw new Error(joined.error.message);
    }
    return ground.stored.userId(email);
  });
  return { kernelId, fabricId, draftId, mappingId, provedMappingId, solveId, invitationId, guestId };
}

/** Waits until the worker has ended the solve. */
async function ended({ owner, workspace }: Ground, solveId: string): Promise<void> {
  for (let attempt = 0; attempt < 100; attempt++) {
    const answer = await owner.request.get(`/api/w/${workspace}/solves/${solveId}`);
    const { state } = (await answer.json()) as { state: string };
    if (!['queued', 'running'].includes(state)) return;
    await new Promise((done) => setTimeout(done, 200));
  }
  throw new Error(`The solve ${solveId} does not end`);
}

/** Calls an action by its name, on the first page that has it; `[names]` in the address stand for anything. */
export function call(ground: Ground, caller: Caller, name: string, input: unknown): Promise<ActionResult> {
  const action = ground.actions.find((one) => one.name === name);
  if (!action) throw new Error(`The product has no action ${name}`);
  const path = action.route.replace('[workspace]', ground.workspace).replace(/\[\w+\]/g, 'any');
  return callAction(caller.request, { action, path, input }, ground.origin);
}
