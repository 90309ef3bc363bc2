/**
 * The search in a thread of its own while the first one proves: each mapping that is better than all before goes to the
 * first thread, which takes it as its own. It begins late, so that short solves do not depend on how fast it comes up,
 * and begins again with the next seed when it finds nothing more.
 */
import { Worker } from 'node:worker_threads';
import type { SolveOptions } from '../options';
import type { BestMapping } from '../outcome';
import type { PlacementProblem } from '../problem';
import type { ThreadInput, ThreadMessage } from './protocol';

export interface SecondThread {
  end(): void;
}

interface SecondThreadParts {
  path: string | URL;
  problem: PlacementProblem;
  options: SolveOptions;
  stopCell: SharedArrayBuffer;
  memoryLimitMb: number;
  remainingMs(): number;
  /** The first thread's best mapping, to begin with. */
  best(): BestMapping | null;
  onMapping(mapping: BestMapping): void;
}

const BEGIN_MS = 1000;
const MOST_RUNS = 50;
/** Far from the seeds of the first thread, which counts its stretches upward. */
const SEED_DISTANCE = 100_003;

export function startSecondThread(parts: SecondThreadParts): SecondThread {
  const { path, problem, options, stopCell, memoryLimitMb, remainingMs, best, onMapping } = parts;
  let worker: Worker | null = null;
  let runs = 0;
  let isOver = false;
  const begin = () => {
    const timeLimitMs = Math.floor(remainingMs());
    if (isOver || timeLimitMs < 1 || runs >= MOST_RUNS) return;
    const seed = (options.seed + SEED_DISTANCE * ++runs) % 2 ** 31;
    const start = best()?.placement ?? problem.start;
    const input: ThreadInput = {
      problem: { ...problem, ...(start && { start }) },
      options: { ...options, engine: 'search', seed, timeLimitMs },
      stopCell,
    };
    const resourceLimits = { maxOldGenerationSizeMb: memoryLimitMb };
    const made = new Worker(path, { workerData: input, resourceLimits });
    worker = made;
    made.on('message', (message: ThreadMessage) => {
      if (isOver || message.type !== 'progress') return;
      const { best: found } = message.progress;
      if (found) onMapping(found);
    });
    // What it found is with the first thread already, which goes on without it.
    made.on('error', () => {
      isOver = true;
    });
    made.on('exit', begin);
  };
  const timer = setTimeout(begin, BEGIN_MS);
  return {
    end() {
      isOver = true;
      clearTimeout(timer);
      void worker?.terminate();
    },
  };
}
