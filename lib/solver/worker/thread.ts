/** The solver thread's entry: solves what it was started with, reports as it goes, ends. */
import { parentPort, receiveMessageOnPort, workerData } from 'node:worker_threads';
import { highsEngine } from '../engines/highs';
import { simplexEngine } from '../engines/simplex';
import { solve } from '../solve';
import { STOP_BY_MEMORY, STOP_NONE, type ThreadInput, type ThreadMessage } from './protocol';

const { problem, options, stopCell } = workerData as ThreadInput;
const startMs = performance.now();
const cell = new Int32Array(stopCell);
const send = (message: ThreadMessage) => parentPort?.postMessage(message);
const wanted = options.engine;
const engines = [
  ...(wanted === 'program' || wanted === 'simplex' ? [simplexEngine] : []),
  ...(wanted === 'program' || wanted === 'highs' ? [await highsEngine()] : []),
];
// Loading the engine is part of the time that was asked for.
const loadedMs = performance.now() - startMs;
const timeLimitMs = Math.max(1, Math.floor(options.timeLimitMs - loadedMs));
const result = solve(
  problem,
  { ...options, timeLimitMs },
  {
    nowMs: () => performance.now(),
    shouldStop: () => Atomics.load(cell, 0) !== STOP_NONE,
    stopCause: () => (Atomics.load(cell, 0) === STOP_BY_MEMORY ? 'memory limit' : 'stopped'),
    news: () => (parentPort ? (receiveMessageOnPort(parentPort)?.message ?? null) : null),
    onProgress: (progress) => send({ type: 'progress', progress }),
    engines,
  },
);
send(result.ok ? { type: 'done', outcome: result.value } : { type: 'refused', badInput: result.error });
