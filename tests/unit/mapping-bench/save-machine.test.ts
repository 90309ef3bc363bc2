import { describe, expect, test } from 'vitest';
import {
  backupText,
  createSaver,
  parseBackup,
  type SaveAnswer,
  type SaveState,
} from '@/components/mapping-bench/save/save-machine';
import type { BenchContent } from '@/components/mapping-bench/store/bench-content';
import { emptyContent, ids, tile } from './bench-fixture';

const one: BenchContent = { ...emptyContent, placement: { [ids.left]: tile(0) } };
const two: BenchContent = { ...emptyContent, placement: { [ids.left]: tile(2) } };

/** A saver whose clock and server the test moves by hand. */
function harness() {
  const timers: { delayMs: number; run: () => void; off: boolean }[] = [];
  const sent: { content: BenchContent; revision: number; answer: (answer: SaveAnswer) => void }[] = [];
  const states: SaveState[] = [];
  let kept: { content: BenchContent; revision: number } | null = null;
  const saver = createSaver({
    content: emptyContent,
    revision: 4,
    send: (content, revision) => new Promise((resolve) => sent.push({ content, revision, answer: resolve })),
    after: (delayMs, run) => {
      const timer = { delayMs, run, off: false };
      timers.push(timer);
      return () => {
        timer.off = true;
      };
    },
    onChange: (state) => states.push(state),
    backUp: (unsaved) => {
      kept = unsaved;
    },
  });
  return {
    saver,
    sent,
    kept: () => kept,
    /** Runs the newest timer that still waits. */
    tick: () => timers.findLast((timer) => !timer.off && timer.delayMs < 20_000)?.run(),
    answer: async (answer: SaveAnswer) => {
      sent.at(-1)?.answer(answer);
      await Promise.resolve();
      await Promise.resolve();
    },
  };
}

describe('saving a bench', () => {
  test('sends the newest content once, with the revision it knows, and is then clean', async () => {
    const h = harness();
    h.saver.edited(one);
    h.saver.edited(two);
    h.tick();
    expect(h.sent.map(({ content, revision }) => [content, revision])).toEqual([[two, 4]]);
    await h.answer({ type: 'saved', revision: 5, atMs: 1 });
    expect(h.saver.state()).toMatchObject({ phase: 'clean', revision: 5 });
    expect(h.kept()).toBeNull();
  });

  test('an edit while a request runs is sent after it, on the new revision', async () => {
    const h = harness();
    h.saver.edited(one);
    h.tick();
    h.saver.edited(two);
    await h.answer({ type: 'saved', revision: 5, atMs: 1 });
    h.tick();
    expect(h.sent.at(-1)).toMatchObject({ content: two, revision: 5 });
  });

  test('a server that is away is asked again and the content stays in the browser meanwhile', async () => {
    const h = harness();
    h.saver.edited(one);
    h.tick();
    await h.answer({ type: 'unreachable' });
    expect(h.saver.state().phase).toBe('retrying');
    expect(h.kept()).toEqual({ content: one, revision: 4 });
    h.tick();
    await h.answer({ type: 'saved', revision: 5, atMs: 1 });
    expect(h.saver.state().phase).toBe('clean');
  });

  test('a conflict stops saving and keeps both states', async () => {
    const h = harness();
    h.saver.edited(one);
    h.tick();
    await h.answer({ type: 'conflict', theirs: { content: two, revision: 9, changedBy: 'Editor' } });
    expect(h.saver.state()).toMatchObject({ phase: 'conflict', theirs: { content: two, revision: 9 } });
    expect(h.kept()?.content).toBe(one);
    h.saver.tookTheirs();
    expect(h.saver.state()).toMatchObject({ phase: 'clean', revision: 9 });
  });

  test('a conflict with our own content, whose answer was lost, is none', async () => {
    const h = harness();
    h.saver.edited(one);
    h.tick();
    await h.answer({ type: 'unreachable' });
    h.tick();
    const stored = { ...one, placement: { ...one.placement } };
    await h.answer({ type: 'conflict', theirs: { content: stored, revision: 5, changedBy: 'Me' } });
    expect(h.saver.state()).toMatchObject({ phase: 'clean', revision: 5, theirs: null });
  });

  test('flush saves at once and tells when all is saved', async () => {
    const h = harness();
    h.saver.edited(one);
    const done = h.saver.flush();
    await h.answer({ type: 'saved', revision: 5, atMs: 1 });
    await expect(done).resolves.toBe(true);
  });
});

test('a backup read back is the backup; other text is none', () => {
  const backup = { content: one, revision: 4, atMs: 17 };
  expect(parseBackup(backupText(backup))).toEqual(backup);
  expect(parseBackup('{"revision":4}')).toBeNull();
  expect(parseBackup('not json')).toBeNull();
});
