/** A Chromium that is signed in as an editor of the demonstration; each visit begins with an empty cache. */
import { type Browser, type BrowserContextOptions, chromium, type Page } from '@playwright/test';

export const workspacePath = '/w/tarnbrook';

export interface Visitor {
  /** Calls `visit` with a page of a fresh browser profile, and closes it afterwards. */
  visit<T>(visit: (page: Page) => Promise<T>, as?: 'editor' | 'nobody'): Promise<T>;
  close(): Promise<void>;
}

async function signedIn(browser: Browser, address: string): Promise<BrowserContextOptions['storageState']> {
  const context = await browser.newContext({ baseURL: address });
  const page = await context.newPage();
  await page.goto('/sign-in');
  await page.getByLabel(/e-?mail/i).fill('compiler@tarnbrook.example');
  await page.getByLabel('Password', { exact: true }).fill('woven on a small frame');
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.waitForURL(/\/w\//);
  const session = await context.storageState();
  await context.close();
  return session;
}

export async function openBrowser(address: string): Promise<Visitor> {
  const browser = await chromium.launch({
    executablePath: process.env.CHROMIUM_PATH ?? '/usr/bin/chromium',
    // No sandbox: Chromium refuses to start as root with one.
    args: ['--no-sandbox', '--disable-dev-shm-usage', '--no-first-run', '--disable-background-networking'],
  });
  const session = await signedIn(browser, address);
  return {
    async visit(visit, as = 'editor') {
      const context = await browser.newContext({
        baseURL: address,
        viewport: { width: 1440, height: 900 },
        locale: 'en-GB',
        reducedMotion: 'reduce',
        ...(as === 'editor' ? { storageState: session } : {}),
      });
      try {
        return await visit(await context.newPage());
      } finally {
        await context.close();
      }
    },
    close: () => browser.close(),
  };
}

/**
 * The time from the beginning of navigation to the first frame in which `count` elements match `selector`, are visible
 * and answer (React marks the elements whose listeners are in place), in ms.
 */
export async function answersAfterMs(
  page: Page,
  path: string,
  selector: string,
  count: number,
): Promise<number> {
  await page.addInitScript(
    ([wanted, wantedCount]) => {
      const look = () => {
        const ready = [...document.querySelectorAll(wanted)].filter(
          (element) =>
            Object.keys(element).some((key) => key.startsWith('__reactProps')) &&
            element.checkVisibility({ visibilityProperty: true }),
        );
        if (ready.length >= wantedCount) performance.mark('pinloom answers');
        else requestAnimationFrame(look);
      };
      requestAnimationFrame(look);
    },
    [selector, count] as const,
  );
  await page.goto(path);
  const mark = await page.waitForFunction(
    () => performance.getEntriesByName('pinloom answers')[0]?.startTime,
  );
  return Number(await mark.jsonValue());
}
