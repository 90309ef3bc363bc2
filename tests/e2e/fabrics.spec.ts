import { readFile } from 'node:fs/promises';
import { checkAccessible, checkNoSidewaysScroll, demoWorkspace, expect, test } from './support';

const base = `/w/${demoWorkspace}/fabrics`;
/** Of its own for each run, so that a run finds nothing of an earlier one. */
const ownName = (what: string) => `${what} ${Date.now().toString(36)}`;

test('an editor makes a fabric from a preset, corrects a wrong field, and finds it in the list', async ({
  pageOf,
}) => {
  const page = await pageOf('editor');
  const name = ownName('Slope');
  await page.goto(base);
  await page.getByRole('link', { name: 'New fabric' }).click();
  await page.getByLabel('Rows').fill('99');
  await page.getByRole('button', { name: 'Create fabric' }).click();
  await expect(page.getByLabel('Name')).toBeFocused();
  await expect(page.getByText('Give the fabric a name.')).toBeVisible();
  await page.getByLabel('Name').fill(name);
  await page.getByRole('button', { name: 'Create fabric' }).click();
  await expect(page.getByLabel('Rows')).toBeFocused();
  await expect(page.getByText('Enter a whole number from 1 to 64.')).toBeVisible();
  await page.getByLabel('Rows').fill('3');
  await page.getByLabel('Columns').fill('5');
  await page.getByLabel('Limit paths by the clock').check();
  await page.getByLabel('Hop delay (ps)').fill('575');
  // floor((5,000 − 400) / 575) = 8.
  await expect(page.getByText('floor((5,000 − 400) / 575) = 8').first()).toBeVisible();
  // A 3 × 5 mesh: 3 · 4 links along rows and 2 · 5 along columns, both ways.
  await expect(page.getByRole('region', { name: 'Links' })).toContainText('44');
  await page.getByRole('button', { name: 'Create fabric' }).click();
  await expect(page.getByRole('heading', { level: 1, name })).toBeVisible();
  await expect(page.getByRole('region', { name: 'Clock' })).toContainText('8 hops');
  await page.getByRole('link', { name: 'Fabrics', exact: true }).first().click();
  const row = page.getByRole('row').filter({ hasText: name });
  await expect(row).toContainText('3 × 5');
  await expect(row.getByRole('cell').nth(4)).toHaveText('44');
});

test('archiving takes a fabric off the list, undo brings it back', async ({ pageOf }) => {
  const page = await pageOf('editor');
  await page.goto(`${base}/new`);
  const name = ownName('Archive');
  await page.getByLabel('Name').fill(name);
  await page.getByRole('button', { name: 'Create fabric' }).click();
  await expect(page.getByRole('heading', { level: 1, name })).toBeVisible();
  await page.goto(base);
  const row = page.getByRole('row').filter({ hasText: name });
  const archive = async () => {
    await page.getByRole('button', { name: `Actions for ${name}` }).click();
    await page.getByRole('menuitem', { name: 'Archive' }).click();
    await expect(row).toHaveCount(0);
  };
  await archive();
  await page.getByRole('button', { name: 'Undo' }).click();
  await expect(row).toBeVisible();
  await archive();
  await page.getByRole('link', { name: 'Archived', exact: true }).click();
  await page.getByRole('button', { name: `Actions for ${name}` }).click();
  await page.getByRole('menuitem', { name: 'Restore' }).click();
  await expect(row).toHaveCount(0);
  await page.goto(base);
  await expect(row).toBeVisible();
});

test('a fabric is renamed, kept as a version, exported and imported again; a broken file is refused by line', async ({
  pageOf,
}, testInfo) => {
  const page = await pageOf('editor');
  await page.goto(`${base}/new`);
  const name = ownName('Export');
  await page.getByLabel('Name').fill('Before');
  await page.getByRole('button', { name: 'Create fabric' }).click();
  await page.getByRole('button', { name: 'More' }).click();
  await page.getByRole('menuitem', { name: 'Rename…' }).click();
  await page.getByRole('dialog').getByLabel('Name').fill(name);
  await page.getByRole('dialog').getByRole('button', { name: 'Rename' }).click();
  await expect(page.getByRole('heading', { level: 1, name })).toBeVisible();
  await page.getByRole('button', { name: 'Keep version' }).click();
  await page.getByRole('dialog').getByLabel('Note (optional)').fill('renamed');
  await page.getByRole('dialog').getByRole('button', { name: 'Keep version' }).click();
  await expect(page.getByText('Kept as version 2.')).toBeVisible();
  await expect(page.getByRole('region', { name: 'Versions' })).toContainText('renamed');

  const download = page.waitForEvent('download');
  await page.getByRole('button', { name: 'More' }).click();
  await page.getByRole('menuitem', { name: 'Export JSON' }).click();
  const file = testInfo.outputPath('fabric.json');
  await (await download).saveAs(file);
  const text = await readFile(file, 'utf8');

  await page.goto(base);
  await page.getByRole('button', { name: 'Import JSON' }).click();
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel('or its text').fill(text.replace('"torus"', '"ring"').replace('"mesh"', '"ring"'));
  const line = text.split('\n').findIndex((row) => row.includes('"topology"')) + 1;
  await expect(dialog.getByText(`Line ${line}, column`)).toBeVisible();
  await expect(dialog.getByRole('button', { name: 'Import this fabric' })).toBeDisabled();
  await checkAccessible(page, 'a refused import');
  await dialog.getByLabel('Fabric file').setInputFiles(file);
  await expect(dialog.getByRole('heading', { name })).toBeVisible();
  await checkAccessible(page, 'an import with its preview');
  await dialog.getByRole('button', { name: 'Import this fabric' }).click();
  await expect(page.getByRole('heading', { level: 1, name })).toBeVisible();
  await expect(page.getByRole('region', { name: 'Versions' })).toContainText('1');
});

test('a viewer looks at tiles by keyboard and is offered nothing that changes', async ({ pageOf }) => {
  const page = await pageOf('viewer');
  await page.goto(base);
  await expect(page.getByRole('link', { name: 'New fabric' })).toHaveCount(0);
  await expect(page.getByRole('button', { name: 'Import JSON' })).toHaveCount(0);
  await expect(page.getByRole('button', { name: /^Actions for/ })).toHaveCount(0);
  await page.getByRole('link', { name: /6 × 6/ }).click();
  await expect(page.getByRole('link', { name: 'Export JSON' })).toBeVisible();
  await expect(page.getByRole('link', { name: 'Place a kernel here' })).toHaveCount(0);
  await expect(page.getByRole('button', { name: 'Keep version' })).toHaveCount(0);
  await page.getByRole('gridcell', { name: /^Row 0, column 0,/ }).focus();
  await page.keyboard.press('ArrowDown');
  await page.keyboard.press('ArrowRight');
  await expect(page.getByRole('gridcell', { name: /^Row 1, column 1,/ })).toBeFocused();
  const tile = page.getByRole('region', { name: 'Tile' });
  await expect(tile).toContainText('Row 1, column 1');
  // An inner tile of a mesh has four neighbours.
  await expect(tile.getByText('both ways, 1 channel')).toHaveCount(4);
  await page.keyboard.press('+');
  await expect(page.getByRole('toolbar', { name: 'View' }).getByRole('status')).toContainText('%');
});

test('the largest grid, 64 × 64, is drawn, moved through and measured on demand', async ({ pageOf }) => {
  const page = await pageOf('editor');
  await page.goto(`${base}/new`);
  await page.getByLabel('Name').fill(ownName('Large'));
  await page.getByLabel('Rows').fill('64');
  await page.getByLabel('Columns').fill('64');
  await page.getByRole('button', { name: 'Create fabric' }).click();
  await page.waitForURL(/fabrics\/fabric_/);
  await page.getByRole('gridcell', { name: /^Row 0, column 0,/ }).focus();
  await page.keyboard.press('Control+End');
  await expect(page.getByRole('region', { name: 'Tile' })).toContainText('Row 63, column 63');
  await page.getByRole('button', { name: 'Work out the distances' }).click();
  // From corner to corner: 63 + 63 hops.
  await expect(page.getByRole('region', { name: 'Distances' })).toContainText('126 hops', {
    timeout: 30_000,
  });
});

for (const colorScheme of ['light', 'dark'] as const) {
  test(`the fabrics screens are accessible in ${colorScheme} and fit a narrow screen`, async ({ pageOf }) => {
    const page = await pageOf('editor', { colorScheme });
    await page.goto(base);
    const fabric = await page.getByRole('link', { name: /4 × 4/ }).first().getAttribute('href');
    for (const address of [base, `${base}?show=archived`, `${base}/new`, fabric ?? base]) {
      await page.setViewportSize({ width: 1440, height: 900 });
      await page.goto(address);
      await checkAccessible(page, `${address} in ${colorScheme}`);
      await page.setViewportSize({ width: 390, height: 844 });
      await checkNoSidewaysScroll(page, address);
      await checkAccessible(page, `${address} in ${colorScheme}, narrow`);
    }
  });
}
