/**
 * Runs a solve in a thread of its own and answers with its outcome, whatever becomes of the thread: the best mapping
 * so far is kept here, so a thread that is stopped, ends or runs out of memory loses nothing.
 */
import { availableParallelism } from 'node:os';
import { join } from 'node:path';
import { Worker } from 'node:worker_threads';
import { interruptedOutcome } from '../ended-outcome';
import { compareMappings } from '../legal-mapping';
import { defaultSolveOptions, SOLVE_LIMITS, type SolveOptions } from '../options';
import type { SolveOutcome, SolveProgress, StopReason } from '../outcome';
import type { BadInput, PlacementProblem } from '../problem';
import { STOP_BY_MEMORY, STOP_BY_PERSON, STOP_NONE, type ThreadInput, type ThreadMessage } from './protocol';
import { type SecondThread, startSecondThread } from './second-thread';

export interface RunHooks {
  onProgress?: (progress: SolveProgress) => void;
  /** Ends the solve with its best when aborted. */
  signal?: AbortSignal;
  /** The same, for a caller that keeps the cell itself: any value but 0 stops. */
  stopFlag?: SharedArrayBuffer;
  /** Heap of the thread, and growth of the process while it runs. */
  memoryLimitMb?: number;
  /** 2: the search goes on in a thread of its own while the first one proves. By default 1, which can be repeated. */
  threads?: 1 | 2;
  /** The bundled thread; by default dist/threads/solver.mjs of the working directory or of APP_THREADS_DIR. */
  threadPath?: string | URL;
}

/** What the caller gave cannot be solved at all; `badInput.messages` tell what to change. */
export interface BadInputError extends Error {
  badInput: BadInput;
}
export const isBadInputError = (error: unknown): error is BadInputError =>
  error instanceof Error && 'badInput' in error;

/** How long a thread may overrun its time limit before it is ended from outside. */
const GRACE_MS = 3000;
const MEMORY_CHECK_MS = 250;
const DEFAULT_MEMORY_LIMIT_MB = 1024;

export const threadPath = (): string =>
  join(process.env.APP_THREADS_DIR ?? join(process.cwd(), 'dist', 'threads'), 'solver.mjs');

/** Two where the machine has two cores to spare for them. */
export const threadsHere = (): 1 | 2 => (availableParallelism() > 1 ? 2 : 1);

/** A fresh cell to stop a solve with. */
export const newStopFlag = (): SharedArrayBuffer => new SharedArrayBuffer(4);

/** Rejects for bad input only (`isBadInputError`) and for a thread that cannot start. */
export function runSolve(
  problem: PlacementProblem,
  options: SolveOptions = defaultSolveOptions,
  hooks: RunHooks = {},
): Promise<SolveOutcome> {
  const stopCell = hooks.stopFlag ?? newStopFlag();
  const cell = new Int32Array(stopCell);
  const memoryLimitMb = Math.min(hooks.memoryLimitMb ?? DEFAULT_MEMORY_LIMIT_MB, SOLVE_LIMITS.memoryLimitMb);
  const startMs = performance.now();
  const startRss = process.memoryUsage.rss();
  const input: ThreadInput = { problem, options, stopCell };
  return new Promise((resolve, reject) => {
    const path = hooks.threadPath ?? threadPath();
    const worker = new Worker(path, {
      workerData: input,
      resourceLimits: { maxOldGenerationSizeMb: memoryLimitMb },
    });
    let last: SolveProgress | null = null;
    let settled = false;
    const raise = (why: number) => void Atomics.compareExchange(cell, 0, STOP_NONE, why);
    const onAbort = () => raise(STOP_BY_PERSON);
    const memoryWatch = setInterval(() => {
      if ((process.memoryUsage.rss() - startRss) / 2 ** 20 > memoryLimitMb) raise(STOP_BY_MEMORY);
    }, MEMORY_CHECK_MS);
    const deadline = setTimeout(() => end('time limit'), options.timeLimitMs + GRACE_MS);
    const settle = (act: () => void) => {
      if (settled) return;
      settled = true;
      clearInterval(memoryWatch);
      clearTimeout(deadline);
      second?.end();
      hooks.signal?.removeEventListener('abort', onAbort);
      void worker.terminate();
      act();
    };
    /** The thread is gone or overdue: what it had reported is the answer. */
    const end = (stopReason: StopReason) =>
      settle(() =>
        resolve(
          interruptedOutcome(problem.objective, options, last, performance.now() - startMs, stopReason),
        ),
      );
    const second: SecondThread | null =
      hooks.threads === 2 && canUseSecondThread(problem, options)
        ? startSecondThread({
            path,
            problem,
            options,
            stopCell,
            memoryLimitMb,
            remainingMs: () => options.timeLimitMs - (performance.now() - startMs),
            best: () => last?.best ?? null,
            onMapping: (mapping) => {
              if (!last?.best || compareMappings(mapping, last.best) < 0) worker.postMessage(mapping);
            },
          })
        : null;
    if (hooks.signal?.aborted) onAbort();
    hooks.signal?.addEventListener('abort', onAbort, { once: true });
    worker.on('message', (message: ThreadMessage) => {
      if (settled) return;
      if (message.type === 'progress') {
        last = message.progress;
        hooks.onProgress?.(message.progress);
      } else if (message.type === 'done') settle(() => resolve(message.outcome));
      else settle(() => reject(badInputError(message.badInput)));
    });
    worker.on('error', (error: NodeJS.ErrnoException) => {
      if (error.code === 'ERR_WORKER_OUT_OF_MEMORY') return end('memory limit');
      if (last) return end('thread failed');
      settle(() => reject(error));
    });
    worker.on('exit', () => end(Atomics.load(cell, 0) === STOP_NONE ? 'thread failed' : 'stopped'));
  });
}

/** What is to be repeated must not depend on what another thread finds when; "another" has a way of its own. */
const canUseSecondThread = (
  problem: PlacementProblem,
  { engine, nodeLimit, searchTries }: SolveOptions,
): boolean => engine !== 'search' && nodeLimit === null && searchTries === null && !problem.another;

const badInputError = (badInput: BadInput): BadInputError =>
  Object.assign(new Error(badInput.messages.join('\n')), { badInput });
