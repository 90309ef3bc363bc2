/** How much JavaScript each screen runs, as it travels: compressed with gzip. */
import { gzipSync } from 'node:zlib';
import type { Page } from '@playwright/test';
import { type Visitor, workspacePath as w } from './browser';
import type { Take } from './measurement';

interface Screen {
  route: string;
  as?: 'nobody';
  open(page: Page): Promise<unknown>;
}

const at = (path: string) => (page: Page) => page.goto(path);

/** The address of the first entry of a list whose name matches, opened as a page of its own. */
const entry = (list: string, name: RegExp) => async (page: Page) => {
  await page.goto(`${w}/${list}`);
  const href = await page.getByRole('table').getByRole('link', { name }).first().getAttribute('href');
  if (!href) throw new Error(`No entry ${name} in the list of ${list}`);
  await page.goto(href);
};

const screens: readonly Screen[] = [
  { route: '/sign-in', as: 'nobody', open: at('/sign-in') },
  { route: '/w/[workspace]/kernels', open: at(`${w}/kernels`) },
  { route: '/w/[workspace]/kernels/[kernel]', open: entry('kernels', /wavelet/) },
  { route: '/w/[workspace]/fabrics', open: at(`${w}/fabrics`) },
  { route: '/w/[workspace]/fabrics/new', open: at(`${w}/fabrics/new`) },
  { route: '/w/[workspace]/fabrics/[fabric]', open: entry('fabrics', /Hive/) },
  { route: '/w/[workspace]/mappings', open: at(`${w}/mappings`) },
  { route: '/w/[workspace]/mappings/new', open: at(`${w}/mappings/new`) },
  { route: '/w/[workspace]/mappings/bench/[draft]', open: entry('mappings', /loads placed/) },
  { route: '/w/[workspace]/mappings/[mapping]', open: entry('mappings', /Wavelet step, first try/) },
  { route: '/w/[workspace]/settings/members', open: at(`${w}/settings/members`) },
];

/** Bytes after gzip of the scripts that the page runs; scripts fetched early for other pages do not count. */
async function scriptBytes(page: Page): Promise<{ gzipBytes: number; scripts: number }> {
  await page.waitForLoadState('networkidle');
  const addresses = await page.evaluate(() => [
    ...new Set([...document.scripts].map((script) => script.src).filter((src) => src !== '')),
  ]);
  const sizes = await Promise.all(
    addresses.map(async (address) => gzipSync(await (await page.request.get(address)).body()).length),
  );
  return { gzipBytes: sizes.reduce((sum, size) => sum + size, 0), scripts: sizes.length };
}

export async function measureClientCode(visitor: Visitor, take: Take): Promise<void> {
  for (const { route, as, open } of screens) {
    const { gzipBytes, scripts } = await visitor.visit(async (page) => {
      await open(page);
      return scriptBytes(page);
    }, as);
    take({ group: 'client code', name: route, value: gzipBytes, unit: 'bytes', details: { scripts } });
  }
}
