/**
 * What every end-to-end test stands on: signed-in pages of each role, a guard that fails the test on anything
 * the browser complains of, the accessibility check, and pointer gestures.
 */
import AxeBuilder from '@axe-core/playwright';
import {
  type Browser,
  type BrowserContext,
  type BrowserContextOptions,
  test as base,
  expect,
  type Locator,
  type Page,
} from '@playwright/test';

export { expect };

export const demoWorkspace = 'tarnbrook';
const DEMO_PASSWORD = 'woven on a small frame';

export const demoPeople = {
  owner: 'lead@tarnbrook.example',
  architect: 'architect@tarnbrook.example',
  editor: 'compiler@tarnbrook.example',
  reviewer: 'reviewer@tarnbrook.example',
  viewer: 'student@tarnbrook.example',
} as const;
export type Person = keyof typeof demoPeople;

/** Collects what a browser complains of. What a test provokes on purpose, it announces with `expectFault`. */
export interface FaultGuard {
  watch(context: BrowserContext): void;
  expectFault(pattern: RegExp): void;
  unexpected(): string[];
}

function faultGuard(ownAddress: string): FaultGuard {
  const found: string[] = [];
  const announced: RegExp[] = [];
  const watchPage = (page: Page) => {
    page.on('pageerror', (error) => found.push(`exception: ${error.message}`));
    // A refusal by the content security policy is reported as a console error too.
    page.on('console', (message) => {
      if (message.type() === 'error') found.push(`console: ${message.text()} (${message.location().url})`);
    });
    // The product is self-contained: fonts, scripts and data come from its own address.
    page.on('request', (request) => {
      const url = request.url();
      if (/^https?:/.test(url) && !url.startsWith(ownAddress)) found.push(`request to elsewhere: ${url}`);
    });
    page.on('requestfailed', (request) => {
      const why = request.failure()?.errorText ?? '';
      // The browser itself drops what a page had under way when it is left.
      if (why !== 'net::ERR_ABORTED') found.push(`request: ${request.method()} ${request.url()} ${why}`);
    });
    page.on('response', (response) => {
      if (response.status() >= 500) found.push(`response: ${response.status()} ${response.url()}`);
    });
  };
  return {
    watch(context) {
      for (const page of context.pages()) watchPage(page);
      context.on('page', watchPage);
    },
    expectFault: (pattern) => void announced.push(pattern),
    unexpected: () => found.filter((fault) => !announced.some((pattern) => pattern.test(fault))),
  };
}

/** Signs in on the sign-in page, as a person does. */
export async function signIn(page: Page, person: Person): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel(/e-?mail/i).fill(demoPeople[person]);
  await page.getByLabel('Password', { exact: true }).fill(DEMO_PASSWORD);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.waitForURL(/\/w\//);
}

type Session = Awaited<ReturnType<BrowserContext['storageState']>>;
const sessions = new Map<Person, Promise<Session>>();

/** The person's cookies; signed in once per run, since sign-ins are rate limited. */
export function sessionOf(browser: Browser, person: Person): Promise<Session> {
  const known = sessions.get(person);
  if (known) return known;
  const made = (async () => {
    const context = await browser.newContext();
    await signIn(await context.newPage(), person);
    const session = await context.storageState();
    await context.close();
    return session;
  })();
  sessions.set(person, made);
  return made;
}

interface Fixtures {
  guard: FaultGuard;
  /** A page of a browser of its own, signed in as that person of the demo workspace. */
  pageOf(person: Person, options?: BrowserContextOptions): Promise<Page>;
}

export const test = base.extend<Fixtures>({
  guard: [
    async ({ baseURL }, use) => {
      const guard = faultGuard(baseURL ?? '');
      await use(guard);
      expect(guard.unexpected(), 'the browser complained').toEqual([]);
    },
    { auto: true },
  ],
  context: async ({ context, guard }, use) => {
    guard.watch(context);
    await use(context);
  },
  pageOf: async ({ browser, guard }, use) => {
    const contexts: BrowserContext[] = [];
    await use(async (person, options) => {
      const context = await browser.newContext({
        ...options,
        storageState: await sessionOf(browser, person),
      });
      contexts.push(context);
      guard.watch(context);
      return context.newPage();
    });
    for (const context of contexts) await context.close();
  },
});

const axeTags = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'];

/** Fails with the rule and the place of everything that axe finds on the page as it stands. */
export async function checkAccessible(page: Page, what: string): Promise<void> {
  const { violations } = await new AxeBuilder({ page }).withTags(axeTags).analyze();
  const faults = violations.map(
    (violation) => `${violation.id}: ${violation.help}\n  ${violation.nodes.map((n) => n.html).join('\n  ')}`,
  );
  expect(faults, `axe on ${what}`).toEqual([]);
}

/** Fails when the page can be scrolled sideways. */
export async function checkNoSidewaysScroll(page: Page, what: string): Promise<void> {
  const overhangPx = await page.evaluate(
    () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
  );
  expect(overhangPx, `sideways scroll of ${what}`).toBeLessThanOrEqual(0);
}

async function middleOf(target: Locator): Promise<{ x: number; y: number }> {
  await target.scrollIntoViewIfNeeded();
  const box = await target.boundingBox();
  if (!box) throw new Error(`${target} is not on the screen`);
  return { x: box.x + box.width / 2, y: box.y + box.height / 2 };
}

/** Presses in the middle of one element and lets go in the middle of another, in steps as a hand does. */
export async function dragTo(page: Page, from: Locator, to: Locator): Promise<void> {
  const start = await middleOf(from);
  await page.mouse.move(start.x, start.y);
  await page.mouse.down();
  const end = await middleOf(to);
  await page.mouse.move((start.x + end.x) / 2, (start.y + end.y) / 2, { steps: 6 });
  await page.mouse.move(end.x, end.y, { steps: 6 });
  await page.mouse.up();
}

export async function dragBy(page: Page, from: Locator, rightPx: number, downPx: number): Promise<void> {
  const start = await middleOf(from);
  await page.mouse.move(start.x, start.y);
  await page.mouse.down();
  await page.mouse.move(start.x + rightPx, start.y + downPx, { steps: 8 });
  await page.mouse.up();
}

export interface FreshWorkspace {
  slug: string;
  email: string;
}

/** Makes an account with a workspace of its own, letter and all, and leaves the page signed in there. */
export async function freshWorkspace(page: Page, name: string): Promise<FreshWorkspace> {
  const email = `${name.toLowerCase().replaceAll(' ', '-')}-${Date.now()}@tarnbrook.example`;
  await page.goto('/sign-up');
  await page.getByLabel('E-mail address').fill(email);
  await page.getByRole('button', { name: 'Send the link' }).click();
  await expect(page.getByText(`We have sent a letter to ${email}`)).toBeVisible();
  const link = page.getByRole('listitem').filter({ hasText: email }).getByRole('link');
  // The letter travels through a mail server and takes a moment.
  await expect(async () => {
    await page.goto('/mail');
    await expect(link.first()).toBeVisible({ timeout: 1000 });
  }).toPass({ timeout: 20_000 });
  const address = await link.first().getAttribute('href');
  await page.goto(new URL(address ?? '/').pathname);
  await page.getByLabel('Your name').fill(name);
  await page.getByLabel('Name of the workspace').fill(name);
  await page.getByLabel('Password', { exact: true }).fill(DEMO_PASSWORD.split(' ').reverse().join(' '));
  await page.getByRole('button', { name: 'Make the account' }).click();
  await page.waitForURL(/\/w\/[^/]+/);
  const slug = new URL(page.url()).pathname.split('/')[2];
  if (!slug) throw new Error(`No workspace in ${page.url()}`);
  return { slug, email };
}

export interface BenchOf {
  /** As the choices of the form read. */
  kernel: string;
  fabric: string;
}

/**
 * "Scale and clamp" has five ops; the 4 × 4 fabric's tiles are M S A M / M A X M / M A A M / M X A M
 * (memory, scratchpad, arithmetic, multiplier).
 */
export const smallBench: BenchOf = {
  kernel: 'Gauge: scale and clamp · 5 ops',
  fabric: 'Gauge node, 4 × 4 · 4×4',
};

/** Makes a bench of that name in the demo workspace and opens it. */
export async function openBench(page: Page, name: string, of = smallBench): Promise<void> {
  await page.goto(`/w/${demoWorkspace}/mappings/new`);
  await page.getByLabel('Kernel').selectOption({ label: of.kernel });
  await page.getByLabel('Fabric').selectOption({ label: of.fabric });
  await page.getByLabel('Name').fill(name);
  await page.getByRole('button', { name: 'Open the bench' }).click();
  await expect(page.getByRole('heading', { level: 1, name })).toBeVisible();
}
