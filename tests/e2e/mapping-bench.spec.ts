import { readFileSync } from 'node:fs';
import type { Locator, Page } from '@playwright/test';
import {
  checkAccessible,
  checkNoSidewaysScroll,
  demoWorkspace,
  dragTo,
  expect,
  openBench,
  test,
} from './support';

const base = `/w/${demoWorkspace}/mappings`;
const ownName = (what: string) => `${what} ${Date.now().toString(36)}`;

const op = (page: Page, name: string) => page.getByRole('option', { name: new RegExp(`^${name},`) });
const tile = (page: Page, row: number, col: number) =>
  page.getByRole('gridcell', { name: new RegExp(`^Row ${row}, column ${col},`) });
const figures = (page: Page) => page.getByRole('region', { name: 'Figures' });
const said = (page: Page) => page.getByRole('status').filter({ hasText: /\S/ }).first();

async function pickAndPut(page: Page, name: string, row: number, col: number): Promise<void> {
  await op(page, name).click();
  await tile(page, row, col).click();
  await expect(tile(page, row, col)).toHaveAccessibleName(new RegExp(`holds ${name}`));
}

async function saved(page: Page): Promise<void> {
  await expect(page.getByText(/saved \d\d:\d\d/)).toBeVisible();
}

test('an op is placed by mouse, by two clicks and by keys; an illegal tile says why; undo and reload keep it all', async ({
  pageOf,
}) => {
  const page = await pageOf('architect');
  await openBench(page, ownName('Three ways'));

  await dragTo(page, op(page, 'raw'), tile(page, 1, 3));
  await expect(tile(page, 1, 3)).toHaveAccessibleName(/holds raw/);

  await op(page, 'gain').click();
  await tile(page, 0, 0).hover();
  await expect(said(page)).toHaveText(/^R3: the Memory unit at row 0, column 0 cannot do Multiply/);
  await expect(tile(page, 0, 0)).toHaveAttribute('aria-disabled', 'true');
  await tile(page, 1, 2).click();
  // raw at 1,3 and gain at 1,2 are neighbours: 1 hop.
  await expect(figures(page)).toContainText('2 of 5');
  await expect(figures(page)).toContainText(/Wire hops\s*1/);

  await op(page, 'offset').focus();
  await page.keyboard.press('Enter');
  await tile(page, 0, 0).focus();
  for (const key of ['ArrowDown', 'ArrowRight', 'Enter']) await page.keyboard.press(key);
  await expect(tile(page, 1, 1)).toHaveAccessibleName(/holds offset/);

  await dragTo(page, tile(page, 1, 1), tile(page, 2, 1));
  await expect(tile(page, 2, 1)).toHaveAccessibleName(/holds offset/);
  await page.keyboard.press('Control+z');
  await expect(tile(page, 1, 1)).toHaveAccessibleName(/holds offset/);
  await page.keyboard.press('Control+y');
  await expect(tile(page, 2, 1)).toHaveAccessibleName(/holds offset/);

  await saved(page);
  await page.reload();
  await expect(tile(page, 2, 1)).toHaveAccessibleName(/holds offset/);
  await expect(figures(page)).toContainText('3 of 5');
  await checkAccessible(page, 'the bench');
});

test('with two ops pinned the rest is placed, proved, undone, redone, kept, and read by a viewer', async ({
  pageOf,
}) => {
  const page = await pageOf('architect');
  const name = ownName('Pinned');
  await openBench(page, name);
  await pickAndPut(page, 'raw', 1, 3);
  await pickAndPut(page, 'level', 2, 0);
  for (const [row, col] of [
    [1, 3],
    [2, 0],
  ] as const) {
    await tile(page, row, col).focus();
    await page.keyboard.press('p');
    await expect(tile(page, row, col)).toHaveAccessibleName(/pinned/);
  }
  await page.getByRole('button', { name: 'Keep as mapping' }).click({ force: true });
  await expect(said(page)).toHaveText('3 ops are not placed yet, first gain.');

  await page.getByRole('button', { name: 'Auto-place the rest' }).click();
  // raw 1,3 and level 2,0 are 4 hops apart, and the chain of four connections can be no shorter.
  await expect(page.getByText(/Proved optimal/)).toBeVisible({ timeout: 40_000 });
  await expect(figures(page)).toContainText(/Wire hops\s*4/);
  await expect(tile(page, 1, 3)).toHaveAccessibleName(/holds raw, pinned/);
  await expect(tile(page, 2, 0)).toHaveAccessibleName(/holds level, pinned/);

  await page.getByRole('button', { name: /^Undo/ }).click();
  await expect(figures(page)).toContainText('2 of 5');
  await page.getByRole('button', { name: /^Redo/ }).click();
  await expect(figures(page)).toContainText('5 of 5');
  await saved(page);

  await page.getByRole('button', { name: 'Keep as mapping' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Keep', exact: true }).click();
  await page.waitForURL(/\/mappings\/mapping_/);
  await expect(page.getByRole('region', { name: 'How it was made' })).toContainText('Proved optimal');
  await checkAccessible(page, 'a kept mapping');
  const address = page.url();

  const viewer = await pageOf('viewer');
  await viewer.goto(address);
  await expect(viewer.getByRole('heading', { level: 1, name })).toBeVisible();
  await expect(figures(viewer)).toContainText(/Wire hops\s*4/);
  await expect(tile(viewer, 1, 3)).toHaveAccessibleName(/holds raw/);
  await expect(
    viewer.getByText('Estimates; sign-off figures come from the implementation flow.'),
  ).toBeVisible();
  await expect(viewer.getByRole('button', { name: 'Continue from this' })).toHaveCount(0);
  await expect(viewer.getByRole('button', { name: 'Rename' })).toHaveCount(0);
  await viewer.goto(base);
  await expect(viewer.getByRole('link', { name: 'New mapping' })).toHaveCount(0);
  await viewer.getByLabel('Search mappings').fill(name);
  await expect(viewer.getByRole('row').filter({ hasText: 'proved optimal' })).toHaveCount(1);

  const mapping = await page.request.get(address.replace('/w/', '/api/w/').concat('/mapping.json'));
  expect(await mapping.json()).toMatchObject({ name, provenance: { by: 'solver', status: 'optimal' } });
  const svg = await page.request.get(address.replace('/w/', '/api/w/').concat('/picture.svg'));
  expect(await svg.text()).toContain('wire hops 4');
  const png = await page.request.get(address.replace('/w/', '/api/w/').concat('/picture.png'));
  // The eight bytes that every PNG begins with (PNG specification, section 5.2).
  expect([...(await png.body()).subarray(0, 8)]).toEqual([137, 80, 78, 71, 13, 10, 26, 10]);

  await page.getByRole('button', { name: 'Continue from this' }).click();
  await expect(page.getByRole('heading', { level: 1, name: `${name}, continued` })).toBeVisible();
  await expect(figures(page)).toContainText('5 of 5');
});

test('how an optimum was proved is told on the bench and on the kept mapping, as a file and as a command to prove it again', async ({
  pageOf,
}) => {
  const page = await pageOf('architect', { permissions: ['clipboard-read', 'clipboard-write'] });
  const name = ownName('Certified');
  await openBench(page, name, {
    kernel: 'Gauge: surge detector · 9 ops',
    fabric: 'Hive microphone, 6 × 6 · 6×6',
  });
  await page.getByRole('button', { name: 'Auto-place the rest' }).click();
  const panel = page.getByRole('region', { name: 'Auto-place' });
  await expect(panel.getByText(/Proved optimal/)).toBeVisible({ timeout: 40_000 });
  await panel.getByText('How it was proved').click();
  await expect(panel).toContainText('The exact search has looked for a cheaper mapping level by level');
  // 14 wire hops are the optimum, so the last level has its cutoff at 13.
  await expect(panel.getByRole('row', { name: /^13 / })).toBeVisible();
  await expect(panel.locator('code')).toHaveText(
    /^npm run -s pinloom -- prove --kernel \S+-v1\.kernel\.json --fabric \S+-v1\.fabric\.json --certificate certified-\w+\.certificate\.json$/,
  );
  const fromBench = await saveCertificate(page, panel);
  await checkAccessible(page, 'the proof on the bench');
  await saved(page);
  await page.getByRole('button', { name: 'Keep as mapping' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Keep', exact: true }).click();
  await page.waitForURL(/\/mappings\/mapping_/);

  const making = page.getByRole('region', { name: 'How it was made' });
  const summary = making.getByText('How it was proved');
  await summary.focus();
  await page.keyboard.press('Enter');
  await expect(making).toContainText(/Engine version\s*\d/);
  await expect(making).toContainText(/sha256:[0-9a-f]{64}/);
  const command = (await making.locator('code').textContent()) ?? '';
  expect(command).toMatch(/ --certificate certified-\w+\.certificate\.json --mapping certified-\w+\.json$/);
  await making.getByRole('button', { name: 'Copy the command' }).click();
  await expect(said(page)).toHaveText(/The command is copied\./);
  expect(await page.evaluate(() => navigator.clipboard.readText())).toBe(command);
  const kept = await saveCertificate(page, making);
  expect(kept).toEqual(fromBench);
  expect(JSON.parse(kept.text)).toMatchObject({
    format: 'pinloom.certificate',
    objectiveValue: 14,
    bound: 14,
  });
  await page.setViewportSize({ width: 390, height: 844 });
  await page.getByRole('button', { name: 'Figures', exact: true }).click();
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    await checkAccessible(page, `the proof of a kept mapping in ${colorScheme}`);
  }
  await checkNoSidewaysScroll(page, 'the proof of a kept mapping at 390 px');
});

async function saveCertificate(page: Page, within: Locator): Promise<{ name: string; text: string }> {
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    within.getByRole('link', { name: 'Certificate, JSON' }).click(),
  ]);
  return { name: download.suggestedFilename(), text: readFileSync(await download.path(), 'utf8') };
}

test('a net is made to count more by keys alone: values are weighted, the settings stay, the kept mapping tells the weights', async ({
  pageOf,
}) => {
  const page = await pageOf('architect');
  const name = ownName('Weighted');
  await openBench(page, name);
  const panel = page.getByRole('region', { name: 'Auto-place' });
  const weights = panel.getByText(/^Weights ·/);
  await expect(weights).toHaveText('Weights · all 1');
  await expect(panel.getByRole('table')).toHaveCount(0);
  await weights.focus();
  await page.keyboard.press('Enter');
  const gain = panel.getByLabel('raw → gain', { exact: true });
  // The fields come up once the browser has told of the opening: a Tab before that has nothing to go to.
  await expect(gain).toBeVisible();
  await page.keyboard.press('Tab');
  await expect(gain).toBeFocused();
  await page.keyboard.press('Control+a');
  await page.keyboard.type('2.5');
  await page.keyboard.press('Enter');
  // Five ops in a chain: one link at 2.5 and three at 1.
  await expect(panel).toContainText('No legal mapping has fewer than 5.5 weighted wire hops.', {
    timeout: 40_000,
  });
  await expect(figures(page)).toContainText(/Wire hops\s*4/);
  await expect(figures(page)).toContainText(/Weighted wire hops\s*5\.5/);
  await saved(page);
  await page.reload();
  await expect(weights).toHaveText('Weights · 1 not 1');
  await weights.click();
  await expect(panel.getByLabel('raw → gain', { exact: true })).toHaveValue('2.5');
  await checkAccessible(page, 'the bench with weights');

  const phone = await pageOf('architect', { viewport: { width: 390, height: 844 }, hasTouch: true });
  await phone.goto(page.url());
  await phone.getByRole('button', { name: 'Figures', exact: true }).tap();
  await phone.getByText(/^Weights ·/).tap();
  await expect(phone.getByLabel('raw → gain', { exact: true })).toHaveValue('2.5');
  await checkNoSidewaysScroll(phone, 'the weights on a phone');
  await checkAccessible(phone, 'the weights on a phone');

  await page.getByRole('button', { name: 'Keep as mapping' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Keep', exact: true }).click();
  await page.waitForURL(/\/mappings\/mapping_/);
  await expect(page.getByRole('region', { name: 'How it was made' })).toContainText('Weighted wire hops');
  await expect(page.getByRole('row', { name: 'raw → gain 2.5' })).toBeVisible();
  const mapping = await page.request.get(page.url().replace('/w/', '/api/w/').concat('/mapping.json'));
  expect(await mapping.json()).toMatchObject({ provenance: { weights: { nets: { op_raw: 2.5 } } } });
});

test('two people at one bench: the second is told and keeps both', async ({ pageOf }) => {
  const first = await pageOf('architect');
  const name = ownName('Shared');
  await openBench(first, name);
  const second = await pageOf('editor');
  await second.goto(first.url());
  await expect(figures(second)).toContainText('0 of 5');
  await pickAndPut(first, 'raw', 1, 3);
  await saved(first);
  await pickAndPut(second, 'level', 2, 0);
  await expect(
    second.getByRole('alert').filter({ hasText: 'saved this bench in the meantime' }),
  ).toBeVisible();
  await second.getByRole('button', { name: /Keep both/ }).click();
  await expect(second.getByRole('heading', { level: 1, name: `${name}, mine` })).toBeVisible();
  await expect(tile(second, 2, 0)).toHaveAccessibleName(/holds level/);
  await first.reload();
  await expect(tile(first, 1, 3)).toHaveAccessibleName(/holds raw/);
  await expect(tile(first, 2, 0)).toHaveAccessibleName(/free/);
});

test('what could not be sent is kept in the browser and saved when the server is back', async ({
  pageOf,
  guard,
}) => {
  const page = await pageOf('architect');
  guard.expectFault(/ERR_INTERNET_DISCONNECTED/);
  await openBench(page, ownName('Offline'));
  await page.context().setOffline(true);
  await pickAndPut(page, 'raw', 1, 3);
  await expect(page.getByText(/not saved/)).toBeVisible();
  await page.context().setOffline(false);
  await saved(page);
  await page.reload();
  await expect(tile(page, 1, 3)).toHaveAccessibleName(/holds raw/);
});

test('on a phone the fabric comes first, the kernel and the figures as tabs under it', async ({ pageOf }) => {
  const page = await pageOf('architect', { viewport: { width: 390, height: 844 }, hasTouch: true });
  await openBench(page, ownName('Phone'));
  await page.getByRole('button', { name: 'List' }).tap();
  await page.getByRole('button', { name: /^raw/ }).tap();
  await tile(page, 1, 3).tap();
  await expect(tile(page, 1, 3)).toHaveAccessibleName(/holds raw/);
  await page.getByRole('button', { name: 'Figures', exact: true }).tap();
  await expect(figures(page)).toContainText('1 of 5');
  await checkNoSidewaysScroll(page, 'the bench on a phone');
  await checkAccessible(page, 'the bench on a phone');
});

test('a solve is found again after a reload, leaves changes by hand alone, and its best is put on the bench as one step', async ({
  pageOf,
}) => {
  const page = await pageOf('architect');
  await openBench(page, ownName('Long'), {
    kernel: 'Tiltmeter: size and direction · 30 ops',
    fabric: 'Slope tiltmeter, 8 × 8 · 8×8',
  });
  await page.getByLabel('Time limit').selectOption({ label: '60 s' });
  await page.getByRole('button', { name: 'Auto-place the rest' }).click();
  const panel = page.getByRole('region', { name: 'Auto-place' });
  await expect(panel).toContainText(/Best\s*\d+/, { timeout: 40_000 });
  await page.reload();
  await expect(panel.getByRole('button', { name: 'Stop and keep the best' })).toBeVisible();
  await op(page, 'tilt x').click();
  await tile(page, 0, 0).click();
  await expect(figures(page)).toContainText('1 of 30');
  await panel.getByRole('button', { name: 'Stop and keep the best' }).click();
  await expect(panel).toContainText(/A solve found \d+ wire hops/, { timeout: 40_000 });
  await expect(figures(page)).toContainText('1 of 30');
  await panel.getByRole('button', { name: 'Look at it' }).click();
  await expect(figures(page)).toContainText('30 of 30');
  await panel.getByRole('button', { name: 'Put on the bench' }).click();
  await expect(figures(page)).toContainText('30 of 30');
  await page.getByRole('button', { name: /^Undo/ }).click();
  await expect(figures(page)).toContainText('1 of 30');
});

test('what cannot fit is said with its reason', async ({ pageOf }) => {
  const page = await pageOf('architect');
  await openBench(page, ownName('Too large'), {
    kernel: 'Hive: radix-2 butterfly · 20 ops',
    fabric: 'Gauge node, 4 × 4 · 4×4',
  });
  await page.getByRole('button', { name: 'Auto-place the rest' }).click();
  const panel = page.getByRole('region', { name: 'Auto-place' });
  await expect(panel).toContainText('No mapping is possible', { timeout: 40_000 });
  await panel.getByText('How it was proved').click();
  await expect(panel).toContainText('Counting is enough: what is named above cannot go together.');
  await checkAccessible(page, 'the proof that nothing fits');
  await panel.getByRole('button', { name: 'Show where' }).click();
  await expect(figures(page)).toContainText('0 of 20');
});
