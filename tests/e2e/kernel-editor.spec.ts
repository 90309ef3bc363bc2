import { readFile } from 'node:fs/promises';
import type { Page } from '@playwright/test';
import { checkAccessible, checkNoSidewaysScroll, demoWorkspace, dragTo, expect, test } from './support';

const base = `/w/${demoWorkspace}/kernels`;
/** Of its own for each run, so that a run finds nothing of an earlier one. */
const ownName = (what: string) => `${what} ${Date.now().toString(36)}`;

const nodes = (page: Page) => page.locator('.react-flow__node');
const node = (page: Page, label: string) => nodes(page).filter({ hasText: label });
const result = (page: Page, label: string) => node(page, label).locator('.react-flow__handle.source');
const operand = (page: Page, label: string, port: string) =>
  node(page, label).locator(`.react-flow__handle[data-handleid="${port}"]`);
const edges = (page: Page) => page.locator('.react-flow__edge');
const saved = (page: Page) => expect(page.getByText(/draft · saved/)).toBeVisible();
/** What the editor last said, at its foot. */
const said = (page: Page, text: string | RegExp) =>
  expect(page.getByRole('status').filter({ hasText: text }).last()).toBeVisible();

async function newKernel(page: Page, name: string): Promise<void> {
  await page.goto(base);
  await page.getByRole('button', { name: 'New kernel' }).click();
  await page.getByLabel('Name', { exact: true }).fill(name);
  await page.getByRole('button', { name: 'Create and draw' }).click();
  await page.waitForURL(/kernels\/kernel_/);
  await expect(page.locator('.kernel-canvas')).toBeVisible();
}

/** Three ops at places that the test knows, not connected. */
const threeOps = (name: string): string => `digraph kernel {
  graph [name="${name}"];
  op_level [kind=load, label="level", "array"="level", positionPx="40,64"];
  op_sum [kind=add, label="sum", positionPx="296,64"];
  op_kept [kind=store, label="kept", "array"="kept", positionPx="552,64"];
}`;

async function importText(page: Page, text: string): Promise<void> {
  await page.goto(base);
  await page.getByRole('button', { name: 'Import' }).click();
  await page.getByLabel('Or paste the text').fill(text);
}

async function openImported(page: Page, text: string): Promise<void> {
  await importText(page, text);
  await page.getByRole('button', { name: 'Import and open' }).click();
  await page.waitForURL(/kernels\/kernel_/);
  await expect(nodes(page).first()).toBeVisible();
}

test('a kernel is drawn with the mouse: ops dragged in, threads drawn, one step undone, all saved', async ({
  pageOf,
}) => {
  const page = await pageOf('editor');
  await newKernel(page, ownName('Mouse'));
  const canvas = page.locator('.kernel-canvas');
  const box = await canvas.boundingBox();
  if (!box) throw new Error('The canvas is not on the screen');
  const palette = page.getByRole('listbox', { name: 'Operations' });
  const dragIn = (label: RegExp, rightPx: number) =>
    palette
      .getByRole('option', { name: label })
      .dragTo(canvas, { targetPosition: { x: rightPx, y: box.height / 2 } });
  await dragIn(/^Load:/, 120);
  await dragIn(/^Absolute value:/, 380);
  await dragIn(/^Store:/, 640);
  await expect(nodes(page)).toHaveCount(3);
  await dragTo(
    page,
    nodes(page).nth(0).locator('.source'),
    nodes(page).nth(1).locator('[data-handleid="a"]'),
  );
  await dragTo(
    page,
    nodes(page).nth(1).locator('.source'),
    nodes(page).nth(2).locator('[data-handleid="value"]'),
  );
  await expect(edges(page)).toHaveCount(2);
  await page.getByRole('button', { name: /^Undo/ }).click();
  await expect(edges(page)).toHaveCount(1);
  await page.getByRole('button', { name: /^Redo/ }).click();
  await expect(edges(page)).toHaveCount(2);
  await saved(page);
  await page.reload();
  await expect(nodes(page)).toHaveCount(3);
  await expect(edges(page)).toHaveCount(2);
});

test('a kernel is drawn with keys alone, a loop-carried connection included', async ({ pageOf }) => {
  const page = await pageOf('editor');
  await newKernel(page, ownName('Keys'));
  await page.locator('.kernel-canvas').focus();
  await page.keyboard.press('/');
  const search = page.getByLabel('Search operations');
  await expect(search).toBeFocused();
  for (const word of ['load', 'add', 'store']) {
    await search.fill(word);
    await page.keyboard.press('Enter');
  }
  await expect(nodes(page)).toHaveCount(3);
  await page.keyboard.press('Escape');
  await page.keyboard.press('Escape');
  await expect(nodes(page).nth(2)).toBeFocused();
  await page.keyboard.press('l');

  const connect = async (from: number, to: string) => {
    await nodes(page).nth(from).focus();
    await page.keyboard.press('c');
    await expect(page.getByLabel('Search operands')).toBeFocused();
    await page.keyboard.type(to);
    await page.keyboard.press('Enter');
  };
  await connect(0, 'add a');
  await expect(edges(page)).toHaveCount(1);
  await connect(1, 'store value');
  await expect(edges(page)).toHaveCount(2);
  // Its own result as the other operand: only a later iteration can read it.
  await connect(1, 'add b');
  const loop = page.getByRole('dialog', { name: 'This connection closes a loop' });
  await expect(loop).toBeVisible();
  await loop.getByLabel('Distance, in iterations').fill('2');
  await page.keyboard.press('Enter');
  await expect(edges(page)).toHaveCount(3);
  await expect(page.getByText('↻ 2').first()).toBeVisible();
  await expect(page.getByText('No problems: the kernel can be placed.')).toBeVisible();
  await page.keyboard.press('Control+z');
  await expect(edges(page)).toHaveCount(2);
});

test('a connection that cannot be is refused, and the reason is given by drag, by click and in the list', async ({
  pageOf,
}) => {
  const page = await pageOf('editor');
  await openImported(page, threeOps(ownName('Refused')));
  // A word where a flag is asked for.
  await node(page, 'sum').click();
  await dragTo(page, result(page, 'level'), operand(page, 'sum', 'predicate'));
  await said(page, /Not connected\. .*flag/);
  await expect(edges(page)).toHaveCount(0);

  await result(page, 'level').click();
  await operand(page, 'sum', 'a').click();
  await expect(edges(page)).toHaveCount(1);
  await said(page, 'Connected “level” to “a” of “sum”');
  // The operand is taken now.
  await result(page, 'sum').click();
  await operand(page, 'sum', 'a').click();
  await said(page, /Not connected\. .*already driven by “level”/);
  await expect(edges(page)).toHaveCount(1);

  await node(page, 'level').focus();
  await page.keyboard.press('c');
  await page.getByLabel('Show operands that refuse, with the reason').check();
  await expect(page.getByRole('option', { name: /“sum”, a/ })).toContainText('already driven by “level”');
});

test('the second of two tabs is told of the other state, and both can be kept', async ({ pageOf }) => {
  const first = await pageOf('editor');
  const name = ownName('Two tabs');
  await openImported(first, threeOps(name));
  const second = await first.context().newPage();
  await second.goto(first.url());
  await expect(nodes(second)).toHaveCount(3);
  const add = async (page: Page, word: string) => {
    await page.getByLabel('Search operations').fill(word);
    await page.getByLabel('Search operations').press('Enter');
  };
  await add(first, 'multiply');
  await saved(first);
  await expect(nodes(first)).toHaveCount(4);
  await add(second, 'minimum');
  await add(second, 'maximum');
  await expect(second.getByText('not saved: another state was saved meanwhile')).toBeVisible();
  await expect(second.getByText(/saved another state of this kernel \(4 ops/)).toBeVisible();
  // Nothing was written over, nothing is gone from the screen.
  await expect(nodes(second)).toHaveCount(5);
  await second.getByRole('button', { name: 'Keep mine as a new kernel' }).click();
  await expect(second).toHaveTitle(new RegExp(`${name} \\(my state\\)`));
  await expect(nodes(second)).toHaveCount(5);
  await second.reload();
  await expect(nodes(second)).toHaveCount(5);
  await first.reload();
  await expect(nodes(first)).toHaveCount(4);
});

test('edits that never reached the server are back after a reload', async ({ pageOf, guard }) => {
  const page = await pageOf('editor');
  await openImported(page, threeOps(ownName('Offline')));
  await saved(page);
  guard.expectFault(/ERR_INTERNET_DISCONNECTED|Failed to fetch/);
  await page.context().setOffline(true);
  await page.getByLabel('Search operations').fill('multiply');
  await page.getByLabel('Search operations').press('Enter');
  await expect(page.getByText(/not saved: .*trying again/)).toBeVisible();
  // The tab dies without a word to the server; another one opens the kernel.
  const address = page.url();
  const context = page.context();
  await page.close();
  await context.setOffline(false);
  const again = await context.newPage();
  await again.goto(address);
  await expect(nodes(again)).toHaveCount(4);
  await expect(again.getByText('Edits that had not reached the server are back')).toBeVisible();
  await saved(again);
  await again.getByRole('button', { name: /^Undo/ }).click();
  await expect(nodes(again)).toHaveCount(3);
});

test('Back opens the state that was saved last, not the one that was read first', async ({ pageOf }) => {
  const page = await pageOf('editor');
  await openImported(page, threeOps(ownName('Back')));
  await page.getByLabel('Search operations').fill('multiply');
  await page.getByLabel('Search operations').press('Enter');
  await saved(page);
  await page.getByRole('link', { name: 'Kernels' }).first().click();
  await expect(page.getByRole('table', { name: 'Kernels' })).toBeVisible();
  await page.goBack();
  await expect(nodes(page)).toHaveCount(4);
});

test('a DOT text with a mistake is not imported: line and column are told', async ({ pageOf }) => {
  const page = await pageOf('editor');
  const name = ownName('Mistaken');
  // Line 3 ends without its bracket; line 4 begins where a bracket was due.
  await importText(
    page,
    `digraph kernel {\n  graph [name="${name}"];\n  op_a [kind=load\n  op_b [kind=add];\n}\n`,
  );
  await expect(page.getByText(/Line 4, column \d+/)).toBeVisible();
  await expect(page.getByText('Nothing is imported until the text is right.')).toBeVisible();
  await expect(page.getByRole('button', { name: 'Import and open' })).toBeDisabled();
  await page
    .getByLabel('Or paste the text')
    .fill(`digraph kernel {\n  graph [name="${name}"];\n  op_b [kind=weave, positionPx="0,0"];\n}\n`);
  await expect(page.getByText(/Line 3, column 14/)).toBeVisible();
  await page.getByRole('button', { name: 'Cancel' }).click();
  await expect(page.getByRole('row').filter({ hasText: name })).toHaveCount(0);
});

test('a kernel is exported as JSON and as DOT, and either text imports as the same kernel', async ({
  pageOf,
}) => {
  const page = await pageOf('viewer');
  await page.goto(base);
  await page.getByRole('link', { name: /wavelet/ }).click();
  const exported = async (item: string): Promise<string> => {
    await page.getByRole('button', { name: 'File' }).click();
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('menuitem', { name: item }).click(),
    ]);
    return readFile(await download.path(), 'utf8');
  };
  const texts = [await exported('Export as JSON'), await exported('Export as DOT')];
  const editor = await pageOf('editor');
  for (const text of texts) {
    await importText(editor, text);
    await expect(editor.getByText(/: 13 ops, 14 connections, no problems\./)).toBeVisible();
  }
});

test('versions are kept by name, looked at, restored and made into a new kernel', async ({ pageOf }) => {
  const page = await pageOf('editor');
  const name = ownName('Versions');
  await openImported(page, threeOps(name));
  await page.getByRole('button', { name: 'Keep version' }).click();
  await page.getByLabel('Name, optional').fill('three ops');
  await page.getByRole('dialog').getByRole('button', { name: 'Keep version' }).click();
  await expect(page.getByText('Kept as version 1.')).toBeVisible();
  await page.locator('.kernel-canvas').focus();
  await page.keyboard.press('Control+a');
  await page.keyboard.press('Delete');
  await expect(nodes(page)).toHaveCount(0);
  const openVersions = async () => {
    await page.getByRole('button', { name: 'File' }).click();
    await page.getByRole('menuitem', { name: 'Versions…' }).click();
  };
  await openVersions();
  await page.getByRole('button', { name: 'Restore into draft' }).click();
  await expect(nodes(page)).toHaveCount(3);
  await saved(page);
  await openVersions();
  await page.getByRole('link', { name: '1 · three ops' }).click();
  await expect(page.getByText('Read only').first()).toBeVisible();
  await expect(nodes(page)).toHaveCount(3);
  await page.goBack();
  await openVersions();
  await page.getByRole('button', { name: 'New kernel from it' }).click();
  await expect(page.getByText(`${name} (from version 1)`).first()).toBeVisible();
});

test('a problem in the list leads to the op at fault', async ({ pageOf }) => {
  const page = await pageOf('editor');
  await openImported(page, threeOps(ownName('Problems')));
  await page
    .getByRole('list', { name: 'Problems' })
    .getByRole('button')
    .filter({ hasText: 'kept' })
    .first()
    .click();
  await expect(node(page, 'kept')).toBeFocused();
  await expect(page.getByRole('region', { name: 'Inspector' }).getByRole('heading', { level: 2 })).toHaveText(
    'kept',
  );
});

test('a viewer reads a kernel and changes nothing', async ({ pageOf }) => {
  const page = await pageOf('viewer');
  await page.goto(base);
  await expect(page.getByRole('button', { name: 'New kernel' })).toHaveCount(0);
  await page.getByRole('link', { name: /wavelet/ }).click();
  await expect(page.getByText('read only: your role here is viewer')).toBeVisible();
  await expect(nodes(page)).toHaveCount(13);
  await expect(page.getByLabel('Search operations')).toHaveCount(0);
  await nodes(page).first().click();
  await page.keyboard.press('Delete');
  await expect(nodes(page)).toHaveCount(13);
  await expect(page.getByLabel('Label')).toBeDisabled();
});

test('the whole of a wide kernel is in view when it opens', async ({ pageOf }) => {
  const page = await pageOf('viewer');
  await page.goto(base);
  await page.getByRole('link', { name: /wavelet/ }).click();
  await expect(nodes(page)).toHaveCount(13);
  const outside = await page.evaluate(() => {
    const frame = document.querySelector('.kernel-canvas')?.getBoundingClientRect();
    return [...document.querySelectorAll('.react-flow__node')].filter((element) => {
      const box = element.getBoundingClientRect();
      return (
        !frame ||
        box.left < frame.left ||
        box.right > frame.right ||
        box.top < frame.top ||
        box.bottom > frame.bottom
      );
    }).length;
  });
  expect(outside).toBe(0);
});

for (const colorScheme of ['light', 'dark'] as const) {
  test(`on a phone in ${colorScheme} the panels are a sheet, taps connect, and axe finds nothing`, async ({
    pageOf,
  }) => {
    const page = await pageOf('editor', {
      viewport: { width: 390, height: 844 },
      hasTouch: true,
      isMobile: true,
      colorScheme,
    });
    await openImported(page, threeOps(ownName('Phone')));
    await checkNoSidewaysScroll(page, 'the editor on a phone');
    await checkAccessible(page, 'the editor on a phone');
    await result(page, 'level').tap();
    await operand(page, 'sum', 'a').tap();
    await expect(edges(page)).toHaveCount(1);
    await page.getByRole('button', { name: 'Operations' }).tap();
    await page.getByRole('option', { name: /^Multiply:/ }).tap();
    await expect(nodes(page)).toHaveCount(4);
    await checkAccessible(page, 'the palette on a phone');
    await page.getByRole('button', { name: 'Inspector' }).tap();
    await expect(page.getByRole('region', { name: 'Inspector' })).toBeVisible();
    await checkAccessible(page, 'the inspector on a phone');
  });
}
