import { describe, expect, test } from 'vitest';
import {
  autosave,
  hasUnsavedEdits,
  initialSave,
  retryDelayMs,
  type SaveAnswer,
  type SaveEvent,
  type SaveState,
} from '@/components/kernel-editor/save/autosave';
import { ANSWER_DEADLINE_MS, runAutosave } from '@/components/kernel-editor/save/run-autosave';
import type { Kernel } from '@/lib/graph';
import { renamed, smallKernel } from './small-kernel';

const one = renamed('one');
const two = renamed('two');
const theirs = { kernel: renamed('theirs'), revision: 8, changedBy: 'Compiler engineer' };
const start = initialSave(smallKernel, 4);

/** The state after the events, and what the last of them asked to be done. */
function follow(events: readonly SaveEvent[], from: SaveState = start) {
  let step: ReturnType<typeof autosave> = { state: from, effects: [] };
  for (const event of events) step = autosave(step.state, event);
  return step;
}
const edited = (kernel: Kernel): SaveEvent => ({ type: 'edited', kernel });
const saved = (revision: number): SaveEvent => ({ type: 'saved', revision, atMs: 1000 });

describe('the autosave machine', () => {
  test('an edit waits, further edits ride along, and one request carries the newest state', () => {
    const { state, effects } = follow([edited(one), edited(two), { type: 'due' }]);
    expect(state.phase).toBe('saving');
    expect(effects).toEqual([{ type: 'send', kernel: two, baseRevision: 4 }]);
  });

  test('what is edited while a request runs is sent after it, from the new revision', () => {
    const waiting = follow([edited(one), { type: 'due' }, edited(two), saved(5)]);
    expect(waiting.state.phase).toBe('waiting');
    const { effects } = follow([{ type: 'due' }], waiting.state);
    expect(effects).toEqual([{ type: 'send', kernel: two, baseRevision: 5 }]);
  });

  test('nothing is sent twice: a second due during a request does nothing', () => {
    expect(follow([edited(one), { type: 'due' }, { type: 'due' }]).effects).toEqual([]);
  });

  test('without an answer it tries again later and later, 1 s, 2 s, 4 s … at most 30 s', () => {
    expect([1, 2, 3, 4, 5, 6, 20].map(retryDelayMs)).toEqual([
      1000, 2000, 4000, 8000, 16_000, 30_000, 30_000,
    ]);
    const lost: SaveEvent = { type: 'unreachable', reason: 'server unreachable' };
    const { state, effects } = follow([edited(one), { type: 'due' }, lost, { type: 'due' }, lost]);
    expect(state).toMatchObject({ phase: 'retrying', failures: 2, reason: 'server unreachable' });
    expect(effects).toEqual([{ type: 'wait', delayMs: 2000 }]);
    expect(hasUnsavedEdits(state)).toBe(true);
  });

  test('a save that arrived though its answer got lost is no conflict', () => {
    const lost: SaveEvent = { type: 'unreachable', reason: '' };
    const echo: SaveEvent = { type: 'conflict', theirs: { ...theirs, kernel: structuredClone(one) } };
    const { state, effects } = follow([
      edited(one),
      { type: 'due' },
      lost,
      edited(two),
      { type: 'due' },
      echo,
    ]);
    expect(state.phase).toBe('saving');
    expect(effects).toEqual([{ type: 'send', kernel: two, baseRevision: 8 }]);
  });

  test('nor is one that an earlier visit sent without hearing the answer', () => {
    const echo: SaveEvent = { type: 'conflict', theirs: { ...theirs, kernel: structuredClone(one) } };
    const { state, effects } = follow([
      { type: 'recovered', kernel: one },
      edited(two),
      { type: 'due' },
      echo,
    ]);
    expect(state.phase).toBe('saving');
    expect(effects).toEqual([{ type: 'send', kernel: two, baseRevision: 8 }]);
  });

  test('somebody else’s state is a conflict, and saving rests until there is a choice', () => {
    const conflict = follow([edited(one), { type: 'due' }, { type: 'conflict', theirs }]).state;
    expect(conflict).toMatchObject({ phase: 'conflict', theirs, latest: one });
    expect(follow([edited(two), { type: 'due' }, { type: 'retry' }], conflict)).toEqual({
      state: { ...conflict, latest: two },
      effects: [],
    });
    const chosen = follow([{ type: 'tookTheirs', kernel: theirs.kernel, revision: 8 }], conflict).state;
    expect(chosen).toMatchObject({ phase: 'clean', revision: 8, theirs: null });
  });

  test('a refusal is not repeated by itself; the next edit or the person tries again', () => {
    const refused = follow([edited(one), { type: 'due' }, { type: 'refused', reason: 'archived' }]);
    expect(refused).toMatchObject({ state: { phase: 'refused', reason: 'archived' }, effects: [] });
    expect(follow([{ type: 'due' }], refused.state).effects).toEqual([]);
    expect(follow([{ type: 'retry' }], refused.state).effects).toHaveLength(1);
    expect(follow([edited(two)], refused.state).state.phase).toBe('waiting');
  });
});

/** A runner whose clock and server the test moves by hand. */
function harness() {
  const timers: { delayMs: number; run: () => void; off: boolean }[] = [];
  const sent: { kernel: Kernel; baseRevision: number; answer(answer: SaveAnswer): void; fail(): void }[] = [];
  const runner = runAutosave({
    initial: start,
    send: (kernel, baseRevision) =>
      new Promise((resolve, reject) => sent.push({ kernel, baseRevision, answer: resolve, fail: reject })),
    after: (delayMs, run) => {
      const timer = { delayMs, run, off: false };
      timers.push(timer);
      return () => {
        timer.off = true;
      };
    },
    onChange: () => {},
  });
  /** Runs the timers that are still on and take this long. */
  const ring = (delayMs: number) => {
    for (const timer of [...timers]) {
      if (timer.off || timer.delayMs !== delayMs) continue;
      timer.off = true;
      timer.run();
    }
  };
  return { runner, sent, ring };
}
const settle = () => new Promise<void>((resolve) => setImmediate(resolve));

describe('the runner', () => {
  test('saves 800 ms after an edit and tells the revision that came back', async () => {
    const { runner, sent, ring } = harness();
    runner.dispatch(edited(one));
    ring(800);
    expect(sent).toHaveLength(1);
    sent[0]?.answer({ type: 'saved', revision: 5, atMs: 1 });
    await settle();
    expect(runner.state()).toMatchObject({ phase: 'clean', revision: 5 });
  });

  test('a request that fails, or is silent for 20 s, counts as unreachable; a late answer is not heard', async () => {
    const { runner, sent, ring } = harness();
    runner.dispatch(edited(one));
    ring(800);
    sent[0]?.fail();
    await settle();
    expect(runner.state()).toMatchObject({ phase: 'retrying', reason: 'server unreachable' });
    ring(1000);
    ring(ANSWER_DEADLINE_MS);
    expect(runner.state()).toMatchObject({ phase: 'retrying', failures: 2 });
    ring(2000);
    // The third request is under way now; the second one's answer says nothing of it.
    sent[1]?.answer({ type: 'saved', revision: 5, atMs: 1 });
    await settle();
    expect(runner.state().phase).toBe('saving');
    sent[2]?.answer({ type: 'saved', revision: 6, atMs: 1 });
    await settle();
    expect(runner.state()).toMatchObject({ phase: 'clean', revision: 6 });
  });

  test('after stop nothing is heard or sent any more', async () => {
    const { runner, sent, ring } = harness();
    runner.dispatch(edited(one));
    ring(800);
    runner.stop();
    sent[0]?.answer({ type: 'saved', revision: 5, atMs: 1 });
    await settle();
    runner.dispatch(edited(two));
    ring(800);
    expect(runner.state().revision).toBe(4);
    expect(sent).toHaveLength(1);
  });
});
