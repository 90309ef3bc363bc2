/**
 * What a person sees while parts of the product fail under them. The parts are those of the product under test:
 * PINLOOM_START_PID names the process of `npm start`, PINLOOM_STATE its database.
 */
import { spawnSync } from 'node:child_process';
import { readdirSync, readFileSync } from 'node:fs';
import type { Page } from '@playwright/test';
import { z } from 'zod';
import { demoWorkspace, expect, openBench, test } from './support';

const w = `/w/${demoWorkspace}`;
/** Of its own for each run, so that a run finds nothing of an earlier one. */
const ownName = (what: string) => `${what} ${Date.now().toString(36)}`;

// Both tests wait for a product that comes back by itself: leases run out, pools connect again.
test.describe.configure({ timeout: 180_000 });

interface Process {
  pid: number;
  parentPid: number;
  commandLine: string;
}

/** Every process that Linux tells of; those that end while they are read are left out (proc(5)). */
function processes(): Process[] {
  const pids = readdirSync('/proc').filter((name) => /^\d+$/.test(name));
  return pids.flatMap((pid) => {
    try {
      const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
      // The second field is a name in brackets that may hold blanks; the state and the parent follow it.
      const [, parentPid] = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
      const commandLine = readFileSync(`/proc/${pid}/cmdline`, 'utf8').replaceAll('\0', ' ');
      return [{ pid: Number(pid), parentPid: Number(parentPid), commandLine }];
    } catch {
      return [];
    }
  });
}

/** The worker that `npm start` runs now; null while there is none. */
function workerPid(): number | null {
  const startPid = Number(process.env.PINLOOM_START_PID);
  if (!startPid) throw new Error('PINLOOM_START_PID is not set: whose worker is to be killed?');
  const worker = processes().find(
    (one) => one.parentPid === startPid && one.commandLine.includes('dist/worker.mjs'),
  );
  return worker?.pid ?? null;
}

/** Starts or stops the database of the product under test. */
function database(command: 'start' | 'stop'): void {
  const { status, stderr } = spawnSync(process.execPath, ['scripts/db.mjs', command], { encoding: 'utf8' });
  if (status !== 0) throw new Error(`The database did not ${command}: ${stderr}`);
}

const solveSchema = z.object({
  state: z.string(),
  bestObjective: z.number().nullable(),
  bound: z.number().nullable(),
  elapsedMs: z.number(),
});
type Solve = z.infer<typeof solveSchema>;

/** Everything that the page is told of its solve, in order. */
function solvesToldTo(page: Page): Solve[] {
  const told: Solve[] = [];
  page.on('response', async (response) => {
    if (!/\/solves\/solve_/.test(response.url()) || !response.ok()) return;
    told.push(solveSchema.parse(await response.json()));
  });
  return told;
}

const panel = (page: Page) => page.getByRole('region', { name: 'Auto-place' });
const figures = (page: Page) => page.getByRole('region', { name: 'Figures' });
const nodes = (page: Page) => page.locator('.react-flow__node');
const saved = (page: Page) => expect(page.getByText(/draft · saved/)).toBeVisible();

async function addOp(page: Page, word: string): Promise<void> {
  await page.getByLabel('Search operations').fill(word);
  await page.getByLabel('Search operations').press('Enter');
}

/** Opens a new kernel with one op, "level". */
async function openKernel(page: Page, name: string): Promise<void> {
  await page.goto(`${w}/kernels`);
  await page.getByRole('button', { name: 'Import' }).click();
  await page
    .getByLabel('Or paste the text')
    .fill(
      `digraph kernel { graph [name="${name}"]; op_level [kind=load, label="level", positionPx="40,64"]; }`,
    );
  await page.getByRole('button', { name: 'Import and open' }).click();
  await page.waitForURL(/kernels\/kernel_/);
  await expect(nodes(page)).toHaveCount(1);
}

const kernelSchema = z.object({ ops: z.array(z.object({ kind: z.string() })) });

/** The kinds of the ops that the server holds of the kernel on this page, in the order of the alphabet. */
async function storedKinds(page: Page): Promise<string[]> {
  const path = new URL(page.url()).pathname.replace('/w/', '/api/w/');
  const answer = await page.request.get(`${path}/export?format=json`);
  return kernelSchema
    .parse(await answer.json())
    .ops.map((op) => op.kind)
    .sort();
}

test('a worker that is killed in the middle of a solve is replaced; the solve goes on from its best to an answer', async ({
  pageOf,
}) => {
  const page = await pageOf('architect');
  const told = solvesToldTo(page);
  const last = () => told.at(-1);
  await openBench(page, ownName('Worker lost'), {
    kernel: 'Tiltmeter: size and direction · 30 ops',
    fabric: 'Slope tiltmeter, 8 × 8 · 8×8',
  });
  await page.getByRole('button', { name: 'Auto-place the rest' }).click();
  await expect(panel(page)).toContainText(/Best\s*\d+/, { timeout: 60_000 });

  const killed = workerPid();
  if (killed === null) throw new Error('No worker runs');
  process.kill(killed, 'SIGKILL');
  await expect.poll(() => processes().some(({ pid }) => pid === killed)).toBe(false);
  // The first answer that was asked for after the end of the worker: nobody writes any more.
  const toldBefore = told.length;
  await expect.poll(() => told.length).toBeGreaterThan(toldBefore + 1);
  const left = last();
  expect(left).toMatchObject({ state: 'running', bestObjective: expect.any(Number) });

  await expect.poll(workerPid, { timeout: 30_000 }).not.toBeNull();
  expect(workerPid()).not.toBe(killed);
  // Progress is on the screen again: only a worker moves the time used.
  await expect
    .poll(() => last()?.elapsedMs ?? 0, { timeout: 60_000 })
    .toBeGreaterThan(left?.elapsedMs ?? Number.POSITIVE_INFINITY);
  await expect(panel(page).getByRole('progressbar', { name: 'Time used' })).toBeVisible();
  await expect(panel(page)).toContainText(/Best\s*\d+/);

  await expect(panel(page)).toContainText(/Feasible, gap at most|Proved optimal/, { timeout: 90_000 });
  await expect(figures(page)).toContainText('30 of 30');
  expect(last()?.state).toBe('done');
  const bests = told.flatMap(({ bestObjective }) => (bestObjective === null ? [] : [bestObjective]));
  expect(bests, 'the best never gets worse').toEqual([...bests].sort((a, b) => b - a));
  const firstBest = told.findIndex(({ bestObjective }) => bestObjective !== null);
  expect(
    told.slice(firstBest).map(({ bestObjective }) => bestObjective),
    'a best never disappears',
  ).not.toContain(null);
  const bounds = told.flatMap(({ bound }) => (bound === null ? [] : [bound]));
  expect(bounds, 'the bound never falls').toEqual([...bounds].sort((a, b) => a - b));
  await expect(figures(page)).toContainText(`Wire hops${bests.at(-1)}Path hops`);
});

test('the database is restarted under the editor: what was acknowledged stays, the rest is kept and saved afterwards', async ({
  pageOf,
  guard,
}) => {
  const page = await pageOf('architect');
  await openKernel(page, ownName('Database lost'));
  await addOp(page, 'multiply');
  await expect(nodes(page)).toHaveCount(2);
  await saved(page);
  expect(await storedKinds(page)).toEqual(['load', 'multiply']);

  // Whatever is asked of the server while it has no database.
  guard.expectFault(/status of 50[03]|response: 50[03]/);
  database('stop');
  try {
    await addOp(page, 'minimum');
    await expect(page.getByText(/not saved: .*trying again/)).toBeVisible({ timeout: 60_000 });
    // Drawing goes on, and the words stay true.
    await addOp(page, 'maximum');
    await expect(nodes(page)).toHaveCount(4);
    await expect(page.getByText(/draft · saved/)).toHaveCount(0);
    const health = await page.request.get('/api/health');
    expect(health.status()).toBe(503);
    expect(await health.json()).toMatchObject({ status: 'unavailable' });
  } finally {
    database('start');
  }
  await expect(page.getByText(/draft · saved/)).toBeVisible({ timeout: 90_000 });
  expect(await storedKinds(page)).toEqual(['load', 'max', 'min', 'multiply']);
  await page.reload();
  await expect(nodes(page)).toHaveCount(4);
  await saved(page);

  // Queue and worker have found the database again too.
  await openBench(page, ownName('Database back'));
  await page.getByRole('button', { name: 'Auto-place the rest' }).click();
  await expect(page.getByText(/Proved optimal/)).toBeVisible({ timeout: 60_000 });
});

test('of two tabs the second is refused, looks at the other state first and keeps its own beside it', async ({
  pageOf,
}) => {
  const first = await pageOf('architect');
  const name = ownName('Both kept');
  await openKernel(first, name);
  const second = await first.context().newPage();
  await second.goto(first.url());
  await expect(nodes(second)).toHaveCount(1);
  await addOp(first, 'multiply');
  await saved(first);
  await expect.poll(() => storedKinds(first)).toEqual(['load', 'multiply']);

  await addOp(second, 'minimum');
  await addOp(second, 'maximum');
  await expect(second.getByText(/saved another state of this kernel \(2 ops/)).toBeVisible();
  expect(await storedKinds(first)).toEqual(['load', 'multiply']);
  await second.getByRole('button', { name: 'Load theirs' }).click();
  await expect(nodes(second)).toHaveCount(2);
  await expect(second.getByText(/Yours \(3 ops\) can still become a kernel of its own/)).toBeVisible();
  await second.getByRole('button', { name: 'Keep mine as a new kernel' }).click();
  await expect(second).toHaveTitle(new RegExp(`${name} \\(my state\\)`));

  await expect(nodes(second)).toHaveCount(3);
  expect(second.url()).not.toBe(first.url());
  expect(await storedKinds(second)).toEqual(['load', 'max', 'min']);
  expect(await storedKinds(first)).toEqual(['load', 'multiply']);
});
