/** More than one answer to a solve, as a person asks for them at the bench. */
import type { Page } from '@playwright/test';
import { checkAccessible, checkNoSidewaysScroll, expect, openBench, test } from './support';

const ownName = (what: string) => `${what} ${Date.now().toString(36)}`;
const op = (page: Page, name: string) => page.getByRole('option', { name: new RegExp(`^${name},`) });
const tile = (page: Page, row: number, col: number) =>
  page.getByRole('gridcell', { name: new RegExp(`^Row ${row}, column ${col},`) });
const figures = (page: Page) => page.getByRole('region', { name: 'Figures' });
const autoPlace = (page: Page) => page.getByRole('region', { name: 'Auto-place' });
const price = (page: Page) => page.getByRole('region', { name: 'Price of a pin' });
const another = (page: Page) => page.getByRole('button', { name: 'Show another of equal cost' });
const said = (page: Page) => page.getByRole('status').filter({ hasText: /\S/ }).first();
const SOLVED_MS = 40_000;

async function put(page: Page, name: string, row: number, col: number): Promise<void> {
  await op(page, name).click();
  await tile(page, row, col).click();
  await expect(tile(page, row, col)).toHaveAccessibleName(new RegExp(`holds ${name}`));
}

async function pin(page: Page, name: string, row: number, col: number): Promise<void> {
  await put(page, name, row, col);
  await tile(page, row, col).focus();
  await page.keyboard.press('p');
  await expect(tile(page, row, col)).toHaveAccessibleName(/pinned/);
}

const placed = async (page: Page): Promise<string> => {
  const holding = page.getByRole('gridcell', { name: /holds/ });
  return (await holding.evaluateAll((cells) => cells.map((cell) => cell.getAttribute('aria-label')))).join(
    '; ',
  );
};

test('another of equal cost is put on the bench as one step; asked again, there is no other', async ({
  pageOf,
}) => {
  const page = await pageOf('architect');
  await openBench(page, ownName('Others'));
  await expect(another(page)).toHaveCount(0);
  await pin(page, 'raw', 1, 3);
  await pin(page, 'range', 2, 1);
  await page.getByRole('button', { name: 'Auto-place the rest' }).click();
  await expect(autoPlace(page).getByText(/Proved optimal/)).toBeVisible({ timeout: SOLVED_MS });
  const first = await placed(page);

  await another(page).click();
  await expect(said(page)).toHaveText(/^Another mapping, of 4 wire hops, is on the bench/, {
    timeout: SOLVED_MS,
  });
  const second = await placed(page);
  expect(second).not.toBe(first);
  expect(second).toContain('holds raw, pinned');
  await expect(figures(page)).toContainText(/Wire hops\s*4/);
  // What was proved of the first holds for the second.
  await expect(autoPlace(page).getByText(/Proved optimal/)).toBeVisible();
  await page.getByRole('button', { name: /^Undo/ }).click();
  expect(await placed(page)).toBe(first);
  await page.getByRole('button', { name: /^Redo/ }).click();
  expect(await placed(page)).toBe(second);

  await another(page).click();
  const none = 'There is no other, besides mirror images.';
  await expect(autoPlace(page)).toContainText(none, { timeout: SOLVED_MS });
  await expect(said(page)).toHaveText(none);
  expect(await placed(page)).toBe(second);
  await expect(autoPlace(page)).not.toContainText('A solve found');
  await checkAccessible(page, 'the bench without another');
  await page.emulateMedia({ colorScheme: 'dark' });
  await checkAccessible(page, 'the bench without another, dark');
  await page.getByText(/saved \d\d:\d\d/).waitFor();
  await page.reload();
  await expect(autoPlace(page)).toContainText('A solve found 4 wire hops. Another mapping is on the bench.');
});

test('what a pin costs is told, not put on the bench by itself, found again after a reload, and taken as one step', async ({
  pageOf,
}) => {
  const page = await pageOf('architect');
  await openBench(page, ownName('Price'));
  await pin(page, 'raw', 1, 3);
  await pin(page, 'level', 3, 0);
  await page.getByRole('button', { name: 'Auto-place the rest' }).click();
  // raw 1,3 and level 3,0 are 5 hops apart.
  await expect(autoPlace(page).getByText(/Proved optimal/)).toBeVisible({ timeout: SOLVED_MS });
  await expect(figures(page)).toContainText(/Wire hops\s*5/);
  await expect(price(page)).toContainText('Pick up a placed op');

  await tile(page, 3, 0).click();
  await expect(price(page)).toContainText('level is pinned to row 3, column 0.');
  await price(page).getByRole('button', { name: 'What does this pin cost?' }).click();
  // A chain of four connections needs 4 hops: 5 − 4 = 1.
  const sentence = 'Without this pin: 4 wire hops, proved. With it: 5 wire hops, proved. The pin costs 1.';
  await expect(price(page)).toContainText(sentence, { timeout: SOLVED_MS });
  await expect(said(page)).toHaveText(sentence);
  await expect(figures(page)).toContainText(/Wire hops\s*5/);
  await checkAccessible(page, 'the price of a pin');

  await page.reload();
  await expect(price(page)).toContainText(sentence);
  await expect(figures(page)).toContainText(/Wire hops\s*5/);
  await expect(autoPlace(page)).not.toContainText('A solve found');
  await price(page).getByRole('button', { name: 'Look at it' }).click();
  await expect(figures(page)).toContainText(/Wire hops\s*4/);
  await price(page).getByRole('button', { name: 'Back to mine' }).click();
  await expect(figures(page)).toContainText(/Wire hops\s*5/);
  await price(page).getByRole('button', { name: 'Put it on the bench without the pin' }).click();
  await expect(figures(page)).toContainText(/Wire hops\s*4/);
  await expect(page.getByRole('gridcell', { name: /holds level, pinned/ })).toHaveCount(0);
  await expect(page.getByRole('gridcell', { name: /holds raw, pinned/ })).toHaveCount(1);
  await expect(price(page)).toContainText('The pins were changed since.');
  await page.getByRole('button', { name: /^Undo/ }).click();
  await expect(figures(page)).toContainText(/Wire hops\s*5/);
  await expect(tile(page, 3, 0)).toHaveAccessibleName(/holds level, pinned/);
  await page.setViewportSize({ width: 390, height: 844 });
  await page.getByRole('button', { name: 'Figures', exact: true }).click();
  await expect(price(page)).toContainText('The pin costs 1.');
  await checkNoSidewaysScroll(page, 'the price of a pin on a phone');
});

test('what a pin would cost is worked out by two solves where nothing was solved before; a viewer only reads it', async ({
  pageOf,
}) => {
  const page = await pageOf('architect');
  await openBench(page, ownName('Supposed'));
  await put(page, 'raw', 1, 3);
  await pin(page, 'level', 2, 0);
  await tile(page, 1, 3).focus();
  await page.keyboard.press('Enter');
  await price(page).getByRole('button', { name: 'What if it were pinned here?' }).click();
  // raw 1,3 and level 2,0 are 4 hops apart: no more than the chain needs anyway.
  const sentence =
    'Pinned here: 4 wire hops, proved. Not pinned: 4 wire hops, proved. The pin would cost nothing.';
  await expect(price(page)).toContainText(sentence, { timeout: SOLVED_MS });
  await expect(figures(page)).toContainText('2 of 5');
  await page.getByText(/saved \d\d:\d\d/).waitFor();

  const viewer = await pageOf('viewer');
  await viewer.goto(page.url());
  await expect(price(viewer)).toContainText(sentence);
  await expect(price(viewer).getByRole('button', { name: 'Look at it' })).toBeVisible();
  await expect(price(viewer).getByRole('button', { name: /Put it on the bench/ })).toHaveCount(0);
  await expect(viewer.getByRole('button', { name: /cost|pinned here/ })).toHaveCount(0);
  await checkAccessible(viewer, 'the price of a pin for a viewer');

  await price(page).getByRole('button', { name: 'Put it on the bench with the pin' }).click();
  await expect(figures(page)).toContainText('5 of 5');
  await expect(tile(page, 1, 3)).toHaveAccessibleName(/holds raw, pinned/);
});

test('a question can be stopped, and is no ordinary solve after a reload while it runs', async ({
  pageOf,
}) => {
  const page = await pageOf('architect');
  await openBench(page, ownName('Stopped'), {
    kernel: 'Tiltmeter: size and direction · 30 ops',
    fabric: 'Slope tiltmeter, 8 × 8 · 8×8',
  });
  await page.getByLabel('Time limit').selectOption({ label: '60 s' });
  await pin(page, 'tilt x', 0, 0);
  await tile(page, 0, 0).click();
  await price(page).getByRole('button', { name: 'What does this pin cost?' }).click();
  await expect(price(page)).toContainText('Without the pin: tilt x', { timeout: SOLVED_MS });
  await expect(price(page)).toContainText(/Best\s*\d+/, { timeout: SOLVED_MS });
  await expect(page.getByRole('button', { name: /Auto-place/ })).toHaveCount(0);
  await page.reload();
  await expect(price(page).getByRole('button', { name: 'Stop' })).toBeVisible();
  await expect(autoPlace(page).getByRole('progressbar')).toHaveCount(0);
  await checkAccessible(page, 'a question that runs');
  await price(page).getByRole('button', { name: 'Stop' }).click();
  await expect(price(page)).toContainText(/Without this pin: \d+ wire hops found, at least \d+/, {
    timeout: SOLVED_MS,
  });
  await expect(price(page).getByRole('button', { name: 'Solve it with the pin too' })).toBeVisible();
  await expect(page.getByRole('button', { name: 'Auto-place the rest' })).toBeVisible();
  await expect(figures(page)).toContainText('1 of 30');
});
