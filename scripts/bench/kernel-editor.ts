/** A kernel of 200 ops in the editor: how long it takes to open, and how evenly an op follows the pointer. */
import type { Page } from '@playwright/test';
import { answersAfterMs, type Visitor, workspacePath as w } from './browser';
import { largeKernel } from './large-kernel';
import { median, type Take } from './measurement';

const VISITS = 5;
const COLUMNS = 20;
const NODES = '.react-flow__node';
const DRAG_STEPS = 120;

async function importKernel(page: Page): Promise<string> {
  await page.goto(`${w}/kernels`);
  await page.getByRole('button', { name: 'Import' }).click();
  await page.getByLabel('Or paste the text').fill(JSON.stringify(largeKernel('Two hundred ops', COLUMNS)));
  await page.getByRole('button', { name: 'Import and open' }).click();
  await page.waitForURL(/kernels\/kernel_/);
  return new URL(page.url()).pathname;
}

/** The gaps between the frames that the browser drew while an op was dragged, in ms. */
async function frameGapsMs(page: Page): Promise<number[]> {
  const box = await page.locator(NODES).first().boundingBox();
  if (!box) throw new Error('No op is on the screen');
  const [x, y] = [box.x + box.width / 2, box.y + box.height / 2];
  await page.mouse.move(x, y);
  await page.mouse.down();
  await page.mouse.move(x + 10, y + 10, { steps: 4 });
  await page.evaluate(() => {
    const frames: number[] = [];
    const note = (atMs: number) => {
      frames.push(atMs);
      requestAnimationFrame(note);
    };
    requestAnimationFrame(note);
    Object.assign(window, { pinloomFrames: frames });
  });
  await page.mouse.move(x + 300, y + 160, { steps: DRAG_STEPS });
  const frames = await page.evaluate(() => (window as unknown as { pinloomFrames: number[] }).pinloomFrames);
  await page.mouse.up();
  return frames.slice(1).map((atMs, i) => atMs - (frames[i] ?? atMs));
}

export async function measureKernelEditor(visitor: Visitor, take: Take): Promise<void> {
  const address = await visitor.visit(importKernel);
  const timesMs: number[] = [];
  for (let visit = 0; visit < VISITS; visit++) {
    timesMs.push(await visitor.visit((page) => answersAfterMs(page, address, NODES, 10 * COLUMNS)));
  }
  take({
    group: 'kernel editor',
    name: `opening ${10 * COLUMNS} ops, nothing cached`,
    value: median(timesMs),
    unit: 'ms',
    details: { visits: VISITS, slowestMs: Math.round(Math.max(...timesMs)) },
  });
  const gapsMs = await visitor.visit(async (page) => {
    await answersAfterMs(page, address, NODES, 10 * COLUMNS);
    return frameGapsMs(page);
  });
  take({
    group: 'kernel editor',
    name: `frame while one of ${10 * COLUMNS} ops is dragged`,
    value: median(gapsMs),
    unit: 'ms',
    details: { frames: gapsMs.length, longestMs: Math.round(Math.max(...gapsMs)) },
  });
}
