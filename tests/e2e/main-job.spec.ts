/** The main job from end to end, as a person does it: draw, import, place by hand, auto-place, keep, look again. */
import type { Locator, Page } from '@playwright/test';
import { demoWorkspace, dragTo, expect, test } from './support';

const w = `/w/${demoWorkspace}`;
const unique = Date.now().toString(36);

const canvas = (page: Page) => page.locator('.react-flow');
const node = (page: Page, index: number) => page.locator('.react-flow__node').nth(index);
const result = (of: Locator) => of.locator('.react-flow__handle.source');
const operand = (of: Locator, port: string) =>
  of.locator(`.react-flow__handle.target[data-handleid="${port}"]`);
const tile = (page: Page, row: number, col: number) =>
  page.getByRole('gridcell', { name: new RegExp(`^Row ${row}, column ${col},`) });
const figures = (page: Page) => page.getByRole('region', { name: 'Figures' });

/** Operation and where it is dropped: column and row of a loose grid on the canvas. */
const drawn: readonly (readonly [name: string, col: number, row: number])[] = [
  ['Load', 0, 0],
  ['Load', 0, 1],
  ['Multiply', 1, 0],
  ['Subtract', 1, 1],
  ['Absolute value', 2, 1],
  ['Add', 2, 0],
  ['Shift right, arithmetic', 3, 0],
  ['Clamp', 3, 1],
  ['Maximum', 2, 2],
  ['Store', 3, 2],
];

/** From op, to op, operand. */
const connected: readonly (readonly [from: number, to: number, port: string])[] = [
  [0, 2, 'a'],
  [1, 2, 'b'],
  [0, 3, 'a'],
  [1, 3, 'b'],
  [3, 4, 'a'],
  [2, 5, 'a'],
  [4, 5, 'b'],
  [5, 6, 'a'],
  [6, 7, 'value'],
  [7, 8, 'a'],
  [4, 8, 'b'],
  [8, 9, 'value'],
];

const constants: readonly (readonly [op: number, operand: string, value: string])[] = [
  [6, 'amount', '4'],
  [7, 'low', '0'],
  [7, 'high', '255'],
];

const secondKernel = `digraph drift {
  // Drawn by hand in a text editor.
  now  [kind=load, label="tilt now"];
  then [kind=load, label="tilt before"];
  drift [kind=subtract];
  size [kind=absolute];
  log  [kind=store];
  now -> drift [port=a];
  then -> drift [port=b];
  drift -> size -> log;
}`;

async function drawKernel(page: Page, name: string): Promise<void> {
  await page.goto(`${w}/kernels`);
  await page.getByRole('button', { name: 'New kernel' }).click();
  await page.getByRole('dialog').getByLabel('Name').fill(name);
  await page.getByRole('button', { name: 'Create and draw' }).click();
  await expect(page.getByRole('heading', { level: 1, name })).toBeVisible();
  for (const [index, [operation, col, row]] of drawn.entries()) {
    await page
      .getByRole('option', { name: new RegExp(`^${operation}:`) })
      .dragTo(canvas(page), { targetPosition: { x: 110 + 185 * col, y: 90 + 170 * row } });
    await expect(page.locator('.react-flow__node')).toHaveCount(index + 1);
  }
  for (const [index, [from, to, port]] of connected.entries()) {
    await dragTo(page, result(node(page, from)), operand(node(page, to), port));
    await expect(page.locator('.react-flow__edge')).toHaveCount(index + 1);
  }
  for (const [op, name, value] of constants) {
    await node(page, op).click();
    const field = page.getByRole('region', { name: 'Inspector' }).getByLabel(`Constant for ${name}`);
    await field.fill(value);
    await field.press('Enter');
  }
  await expect(page.getByText('No problems: the kernel can be placed.')).toBeVisible();
  await expect(page.getByText(/saved \d\d:\d\d/)).toBeVisible();
}

async function importKernel(page: Page): Promise<void> {
  await page.goto(`${w}/kernels`);
  await page.getByRole('button', { name: 'Import' }).click();
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel('A file').setInputFiles({
    name: 'drift.dot',
    mimeType: 'text/vnd.graphviz',
    buffer: Buffer.from(secondKernel),
  });
  await expect(dialog).toContainText('5 ops');
  await dialog.getByRole('button', { name: 'Import and open' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'drift' })).toBeVisible();
  await expect(page.locator('.react-flow__node')).toHaveCount(5);
}

test('draw a kernel, import another, place by hand, auto-place with two pins, keep, and look again as a viewer', async ({
  pageOf,
}) => {
  test.setTimeout(180_000);
  const page = await pageOf('editor');
  const name = `Rise and noise ${unique}`;
  await drawKernel(page, name);
  await importKernel(page);

  await page.goto(`${w}/kernels`);
  await page.getByLabel('Search kernels').fill(name);
  await page.getByRole('link', { name }).click();
  await page.getByRole('button', { name: 'Place on a fabric' }).click();
  await page.getByLabel('Fabric').selectOption({ label: 'Hive microphone, 6 × 6 · 6×6' });
  await page.getByRole('button', { name: 'Open the bench' }).click();
  await expect(page.getByRole('heading', { level: 1, name: new RegExp(name) })).toBeVisible();

  // By hand: a load in the left memory column, the store in the right one; memory stands at both sides.
  const loads = page.getByRole('option', { name: /, Load, not placed/ });
  await dragTo(page, loads.first(), tile(page, 2, 0));
  await expect(tile(page, 2, 0)).toHaveAccessibleName(/holds/);
  await page.getByRole('option', { name: /, Store, not placed/ }).click();
  await tile(page, 3, 5).click();
  await expect(tile(page, 3, 5)).toHaveAccessibleName(/holds/);
  for (const place of [tile(page, 2, 0), tile(page, 3, 5)]) {
    await place.focus();
    await page.keyboard.press('p');
    await expect(place).toHaveAccessibleName(/pinned/);
  }
  await expect(figures(page)).toContainText('2 of 10');

  await page.getByLabel('Time limit').selectOption('5');
  await page.getByRole('button', { name: 'Auto-place the rest' }).click();
  await expect(page.getByText(/Proved optimal|Feasible, gap at most/).first()).toBeVisible({
    timeout: 60_000,
  });
  await expect(page.getByLabel('Time limit'), 'the settings stay').toHaveValue('5');
  await expect(figures(page)).toContainText('10 of 10');
  await expect(tile(page, 2, 0)).toHaveAccessibleName(/pinned/);
  await expect(tile(page, 3, 5)).toHaveAccessibleName(/pinned/);
  await expect(page.getByText('Legal: every rule from R1 to R7 holds.')).toBeVisible();
  const hops = /Wire hops\s*(\d+)/.exec((await figures(page).textContent()) ?? '')?.[1];
  // Twelve connections between ten ops take at least nine hops: a tree over ten different tiles.
  expect(Number(hops)).toBeGreaterThanOrEqual(9);
  await expect(page.getByText(/saved \d\d:\d\d/)).toBeVisible();

  await page.getByRole('button', { name: 'Keep as mapping' }).click();
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel('Name').fill(`Kept ${unique}`);
  await dialog.getByRole('button', { name: 'Keep', exact: true }).click();
  await page.waitForURL(/\/mappings\/mapping_/);
  const holding = async (of: Page) =>
    of
      .getByRole('gridcell', { name: /holds/ })
      .evaluateAll((cells) => cells.map((cell) => cell.getAttribute('aria-label')));
  const before = await holding(page);
  expect(before).toHaveLength(10);
  await page.reload();
  await expect(figures(page)).toContainText(new RegExp(`Wire hops\\s*${hops}`));
  expect(await holding(page)).toEqual(before);

  const viewer = await pageOf('viewer');
  await viewer.goto(`${w}/mappings`);
  await viewer.getByLabel('Search mappings').fill(`Kept ${unique}`);
  await viewer.getByRole('link', { name: `Kept ${unique}` }).click();
  await expect(figures(viewer)).toContainText(new RegExp(`Wire hops\\s*${hops}`));
  expect(await holding(viewer)).toEqual(before);
  for (const offered of [
    'Continue from this',
    'Rename',
    'Archive',
    'Keep as mapping',
    'Auto-place the rest',
  ]) {
    await expect(viewer.getByRole('button', { name: offered })).toHaveCount(0);
  }
  // Nor do the keys of the bench change anything.
  await tile(viewer, 2, 0).focus();
  await viewer.keyboard.press('Delete');
  await viewer.keyboard.press('p');
  expect(await holding(viewer)).toEqual(before);
});
