/** Every screen, in light and dark and on a narrow one: axe finds nothing and nothing scrolls sideways. */
import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import type { Page } from '@playwright/test';
import { checkAccessible, checkNoSidewaysScroll, demoWorkspace, expect, type Person, test } from './support';

interface Screen {
  /** The file below app/ that makes it. */
  file: string;
  person: Person | 'nobody';
  open(page: Page): Promise<unknown>;
}

const w = `/w/${demoWorkspace}`;
const at = (path: string) => (page: Page) => page.goto(path);

/** Opens the first entry of a list whose name matches. */
const entry = (list: string, name: RegExp) => async (page: Page) => {
  await page.goto(`${w}/${list}`);
  await page.getByRole('table').getByRole('link', { name }).first().click();
  await page.waitForURL(new RegExp(`/${list}/.+`));
};

const screens: readonly Screen[] = [
  { file: '(auth)/sign-in/page.tsx', person: 'nobody', open: at('/sign-in') },
  { file: '(auth)/sign-up/page.tsx', person: 'nobody', open: at('/sign-up') },
  { file: '(auth)/sign-up/[token]/page.tsx', person: 'nobody', open: at(`/sign-up/${'a'.repeat(43)}`) },
  { file: '(auth)/forgotten/page.tsx', person: 'nobody', open: at('/forgotten') },
  { file: '(auth)/reset/[token]/page.tsx', person: 'nobody', open: at(`/reset/${'a'.repeat(43)}`) },
  { file: '(auth)/invite/[token]/page.tsx', person: 'nobody', open: at(`/invite/${'a'.repeat(43)}`) },
  { file: '(auth)/welcome/page.tsx', person: 'editor', open: at('/welcome') },
  { file: 'page.tsx', person: 'editor', open: at('/') },
  { file: 'mail/page.tsx', person: 'nobody', open: at('/mail') },
  { file: 'w/[workspace]/page.tsx', person: 'editor', open: at(w) },
  { file: 'w/[workspace]/kernels/page.tsx', person: 'editor', open: at(`${w}/kernels`) },
  { file: 'w/[workspace]/kernels/[kernel]/page.tsx', person: 'editor', open: entry('kernels', /wavelet/) },
  {
    file: 'w/[workspace]/kernels/[kernel]/versions/[number]/page.tsx',
    person: 'viewer',
    open: async (page) => {
      await entry('kernels', /wavelet/)(page);
      await page.goto(`${page.url()}/versions/1`);
    },
  },
  { file: 'w/[workspace]/fabrics/page.tsx', person: 'editor', open: at(`${w}/fabrics`) },
  { file: 'w/[workspace]/fabrics/new/page.tsx', person: 'editor', open: at(`${w}/fabrics/new`) },
  { file: 'w/[workspace]/fabrics/[fabric]/page.tsx', person: 'editor', open: entry('fabrics', /Hive/) },
  { file: 'w/[workspace]/mappings/page.tsx', person: 'editor', open: at(`${w}/mappings`) },
  { file: 'w/[workspace]/mappings/new/page.tsx', person: 'editor', open: at(`${w}/mappings/new`) },
  {
    file: 'w/[workspace]/mappings/bench/[draft]/page.tsx',
    person: 'editor',
    open: entry('mappings', /loads placed/),
  },
  {
    file: 'w/[workspace]/mappings/[mapping]/page.tsx',
    person: 'viewer',
    open: entry('mappings', /Wavelet step, first try/),
  },
  { file: 'w/[workspace]/settings/page.tsx', person: 'owner', open: at(`${w}/settings`) },
  { file: 'w/[workspace]/settings/account/page.tsx', person: 'owner', open: at(`${w}/settings/account`) },
  { file: 'w/[workspace]/settings/members/page.tsx', person: 'owner', open: at(`${w}/settings/members`) },
  { file: 'w/[workspace]/settings/workspace/page.tsx', person: 'owner', open: at(`${w}/settings/workspace`) },
  { file: 'w/[workspace]/settings/activity/page.tsx', person: 'owner', open: at(`${w}/settings/activity`) },
];

function pageFiles(folder: string, below = ''): string[] {
  return readdirSync(join(folder, below), { withFileTypes: true }).flatMap((found) => {
    const path = join(below, found.name);
    if (found.isDirectory()) return pageFiles(folder, path);
    return found.name === 'page.tsx' ? [path] : [];
  });
}

test('every page of the application is in this table', () => {
  expect(screens.map((screen) => screen.file).sort()).toEqual(pageFiles('app').sort());
});

for (const { file, person, open } of screens) {
  test(`${file.replace(/\/?page\.tsx$/, '') || 'home'}`, async ({ pageOf, page: nobodysPage }) => {
    const page = person === 'nobody' ? nobodysPage : await pageOf(person);
    await open(page);
    await page.getByRole('heading', { level: 1 }).first().waitFor();
    for (const scheme of ['light', 'dark'] as const) {
      await page.emulateMedia({ colorScheme: scheme, reducedMotion: 'reduce' });
      await checkAccessible(page, `${file} in ${scheme}`);
    }
    await page.setViewportSize({ width: 390, height: 844 });
    await checkNoSidewaysScroll(page, `${file} at 390 px`);
  });
}
