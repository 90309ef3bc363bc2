/** From a solve by the worker to the bench, the kept mapping and its file; only Next's access to the request is stood in for. */
import pino from 'pino';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { signInAs } from '../../app/_server/session';
import { GET as certificateFile } from '../../app/api/w/[workspace]/mappings/[mapping]/certificate.json/route';
import { GET as mappingFile } from '../../app/api/w/[workspace]/mappings/[mapping]/mapping.json/route';
import { keepAsMapping, saveBench } from '../../app/w/[workspace]/mappings/actions';
import { solveResult, solveSchema } from '../../components/mapping-bench/solve/solve-state';
import { closeDatabase } from '../../db/client';
import { getMapping } from '../../db/queries/mappings';
import { createSolve, getSolve } from '../../db/queries/solve-jobs';
import { writeFabricJson } from '../../lib/formats/fabric-json';
import { writeKernelJson } from '../../lib/formats/kernel-json';
import type { Id } from '../../lib/ids';
import { type Certificate, certificateSchema } from '../../lib/mapping/certificate';
import type { Pins } from '../../lib/mapping/mapping';
import { problemDigest } from '../../lib/solver/problem-digest';
import { runSolveJob } from '../../scripts/worker/run-solve-job';
import { commandLine } from '../helpers/command-line';
import { testDatabase } from '../helpers/database';
import { gaugeKernel, newBench, smallFabric, value } from '../helpers/documents';
import { newWorkspace } from '../helpers/people';

const jar = vi.hoisted(() => new Map<string, { value: string }>());
vi.mock('next/headers', () => ({
  headers: async () => new Headers({ 'user-agent': 'Test browser' }),
  cookies: async () => ({
    get: (name: string) => jar.get(name),
    set: (name: string, text: string) => jar.set(name, { value: text }),
  }),
}));
vi.mock('next/cache', () => ({ revalidatePath: () => undefined }));

const { run, scratch, clear } = commandLine();
afterAll(clear);

const box = testDatabase();
let of: Awaited<ReturnType<typeof newWorkspace>>;
beforeAll(() => {
  process.env.DATABASE_URL = box.url;
  process.env.LOG_LEVEL = 'silent';
  return closeDatabase;
});
beforeEach(async () => {
  jar.clear();
  of = await newWorkspace(box.db);
  await signInAs(of.userId);
});

/** What the bench reads of a solve that the worker has run. */
async function solved(draftId: Id<'draft'>, pins: Pins = {}) {
  const settings = { engine: 'auto', objective: 'wire', timeLimitMs: 5000, seed: 1 } as const;
  const made = await createSolve(box.db, { ...of, draftId, settings, pins, startPlacement: null });
  const { id } = value(made);
  const log = pino({ level: 'silent' });
  await runSolveJob({ solveId: id, worker: 'a', log, stopping: new AbortController().signal });
  const view = await getSolve(box.db, { ...of, solveId: id });
  return solveSchema.parse(JSON.parse(JSON.stringify(view)));
}

/** Saves the solve's result on the bench as a browser does, with what it claims of it, and keeps it. */
async function kept(draftId: Id<'draft'>, revision: number, change: (claimed: Certificate) => Certificate) {
  const result = solveResult(await solved(draftId));
  if (result?.provenance.by !== 'solver' || !result.provenance.certificate) throw new Error('Not proved');
  const { placement, routes, provenance } = result;
  const saved = await saveBench({
    workspace: of.slug,
    draftId,
    revision,
    document: { placement, routes, pins: {} },
    provenance: { ...provenance, certificate: change(result.provenance.certificate) },
  });
  expect(saved).toMatchObject({ ok: true, value: { type: 'saved' } });
  const { mappingId } = value(
    await keepAsMapping({ workspace: of.slug, draftId, revision: revision + 1, name: 'Proved' }),
  );
  return mappingId;
}

const digest = (pins: Pins = {}) =>
  problemDigest({ kernel: gaugeKernel(), fabric: smallFabric(), pins, objective: 'wire' });

async function fileOf(mapping: string, from: typeof certificateFile, workspace = of.slug) {
  const request = new Request(`https://pinloom.example/api/w/${workspace}/mappings/${mapping}/file`);
  return from(request, { params: Promise.resolve({ workspace, mapping }) });
}

describe('a solve that proves its answer', () => {
  it('stores the certificate with its outcome', async () => {
    const { draftId } = await newBench(box.db, of);
    const { outcome } = await solved(draftId);
    expect(outcome?.certificate).toMatchObject({
      status: 'optimal',
      objectiveValue: 1,
      problemDigest: digest(),
      start: null,
    });
  });

  it('ends with a history whose last point is where best and bound have met', async () => {
    const { draftId } = await newBench(box.db, of);
    const { outcome, history } = await solved(draftId);
    expect(outcome?.status).toBe('optimal');
    expect(history.at(-1)).toMatchObject({ best: outcome?.objectiveValue, bound: outcome?.bound });
  });

  it('does so where it proves that nothing fits', async () => {
    const { draftId } = await newBench(box.db, of);
    const pins = { op_load: 'r0c0', op_store: 'r0c0' } as Pins;
    const { outcome } = await solved(draftId, pins);
    expect(outcome?.certificate).toMatchObject({ status: 'infeasible', pins, problemDigest: digest(pins) });
  });
});

describe('a mapping that was kept from it', () => {
  it('carries the certificate, in its document and as a file', async () => {
    const { draftId } = await newBench(box.db, of);
    const mappingId = await kept(draftId, 1, (claimed) => claimed);
    const mapping = await getMapping(box.db, { ...of, mappingId });
    const provenance = mapping?.document.provenance;
    const certificate = certificateSchema.parse(provenance?.by === 'solver' && provenance.certificate);
    expect(certificate.problemDigest).toBe(digest());
    const file = await fileOf(mappingId, certificateFile);
    expect(file.headers.get('content-disposition')).toBe('attachment; filename="proved.certificate.json"');
    expect(await file.json()).toEqual(certificate);
    expect(await (await fileOf(mappingId, mappingFile)).json()).toMatchObject({
      provenance: { certificate: { problemDigest: digest() } },
    });
  });

  it('is proved again by the command line from the files', async () => {
    const { draftId } = await newBench(box.db, of);
    const mappingId = await kept(draftId, 1, (claimed) => claimed);
    const text = async (from: typeof certificateFile) => (await fileOf(mappingId, from)).text();
    const files = [
      '--kernel',
      scratch('gauge.kernel.json', writeKernelJson(gaugeKernel('Renamed since'))),
      '--fabric',
      scratch('small.fabric.json', writeFabricJson(smallFabric())),
      '--certificate',
      scratch('proved.certificate.json', await text(certificateFile)),
      '--mapping',
      scratch('proved.json', await text(mappingFile)),
    ];
    const { code, stdout, stderr } = run('prove', ...files);
    expect({ code, stderr }).toEqual({ code: 0, stderr: '' });
    expect(JSON.parse(stdout)).toMatchObject({ agrees: true, differences: [] });
  });

  it('carries what the solver said, whatever a browser claims', async () => {
    const { draftId } = await newBench(box.db, of);
    const mappingId = await kept(draftId, 1, (claimed) => ({ ...claimed, seed: 4711, searchTries: 99 }));
    const file = await fileOf(mappingId, certificateFile);
    expect(await file.json()).toMatchObject({ seed: 1, problemDigest: digest() });
  });

  it('has no certificate where nothing was proved, and shows none to another workspace', async () => {
    const { draftId } = await newBench(box.db, of);
    const proved = await kept(draftId, 1, (claimed) => claimed);
    const byHand = await newBench(box.db, of);
    const saved = await saveBench({
      workspace: of.slug,
      draftId: byHand.draftId,
      revision: 1,
      document: {
        placement: { op_load: 'r0c0', op_store: 'r1c0' } as Pins,
        routes: { op_load: ['r0c0>r1c0'] } as never,
        pins: {},
      },
      provenance: { by: 'hand' },
    });
    expect(saved.ok).toBe(true);
    const keep = { workspace: of.slug, draftId: byHand.draftId, revision: 2, name: 'By hand' };
    const { mappingId } = value(await keepAsMapping(keep));
    expect((await fileOf(mappingId, certificateFile)).status).toBe(404);
    const other = await newWorkspace(box.db);
    await signInAs(other.userId);
    expect((await fileOf(proved, certificateFile)).status).toBe(404);
    expect((await fileOf(proved, certificateFile, other.slug)).status).toBe(404);
  });
});
