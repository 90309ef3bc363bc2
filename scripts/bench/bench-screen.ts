/** How long a person waits for a bench: from asking for its address until its tiles answer. */
import { answersAfterMs, type Visitor, workspacePath as w } from './browser';
import { median, type Take } from './measurement';

const VISITS = 5;

export async function measureBenchScreen(visitor: Visitor, take: Take): Promise<void> {
  const { address, tiles } = await visitor.visit(async (page) => {
    await page.goto(`${w}/mappings`);
    await page
      .getByRole('table')
      .getByRole('link', { name: /loads placed/ })
      .first()
      .click();
    await page.locator('[data-tile]').first().waitFor();
    return { address: new URL(page.url()).pathname, tiles: await page.locator('[data-tile]').count() };
  });
  const timesMs: number[] = [];
  for (let visit = 0; visit < VISITS; visit++) {
    timesMs.push(await visitor.visit((page) => answersAfterMs(page, address, '[data-tile]', tiles)));
  }
  take({
    group: 'bench screen',
    name: 'first load, nothing cached',
    value: median(timesMs),
    unit: 'ms',
    details: { visits: VISITS, tiles, slowestMs: Math.round(Math.max(...timesMs)) },
  });
}
