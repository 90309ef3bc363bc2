/** `qap`: solves a quadratic assignment instance in QAPLIB's text format and prints the outcome. */
import { parseArgs } from 'node:util';
import { isMainThread, parentPort, Worker, workerData } from 'node:worker_threads';
import { err, ok, type Result } from '../lib/result';
import { defaultSolveOptions, solveOptionsSchema } from '../lib/solver/options';
import type { StopReason } from '../lib/solver/outcome';
import { type QapProblem, qapValue } from '../lib/solver/qap/qap';
import { type QapOptions, type QapOutcome, type QapProgress, qapOutcome } from '../lib/solver/qap/qap-state';
import { solveQap } from '../lib/solver/qap/solve-qap';
import { wholeNumber } from './command-line/arguments';
import { printDocument, printFaults } from './command-line/print';
import { type Faults, readQaplib } from './command-line/read-document';

export const qapUsage = `
npm run -s pinloom -- qap FILE.dat [--time-limit-ms N] [--seed N]
  Solves a quadratic assignment instance in QAPLIB's format: n, then two n × n matrices of whole numbers,
  flows between facilities first and distances between locations second (or the other way round: the
  optimum is the same). Prints a document as place does; placement tells the location of each facility,
  both counted from 1. Exit codes: 0 solved, 2 bad input, 4 nothing found.
`;

/** How long the thread may overrun its time limit before it is ended from outside. */
const GRACE_MS = 3000;
const MEMORY_LIMIT_MB = 1024;

/** What the thread is started with; the cell is 0 until the solve shall end. */
interface ThreadInput {
  problem: QapProblem;
  options: QapOptions;
  stopCell: SharedArrayBuffer;
}

type ThreadMessage =
  | { type: 'progress'; progress: QapProgress }
  | { type: 'done'; outcome: Result<QapOutcome, string> };

/** Runs in the solver thread too, which this program starts itself as. */
export async function qap(args: readonly string[]): Promise<0 | 2 | 4> {
  if (!isMainThread) return solveInThread(workerData as ThreadInput);
  const given = readGiven(args);
  if (!given.ok) return printFaults(given.error);
  if (given.value === 'help') {
    process.stdout.write(qapUsage.trimStart());
    return 0;
  }
  const { path, options } = given.value;
  const problem = readProblem(path);
  if (!problem.ok) return printFaults(problem.error);
  const outcome = await runThread(problem.value, options);
  if (!outcome.ok) return printFaults([`${path}:1:1: ${outcome.error}`]);
  if (outcome.value === null) {
    printDocument(unknownDocument(problem.value, options));
    return 4;
  }
  printDocument(outcomeDocument(problem.value, outcome.value));
  return 0;
}

function readGiven(args: readonly string[]): Result<{ path: string; options: QapOptions } | 'help', Faults> {
  try {
    const { values, positionals } = parseArgs({
      args: [...args],
      allowPositionals: true,
      options: {
        'time-limit-ms': { type: 'string' },
        seed: { type: 'string' },
        help: { type: 'boolean', short: 'h' },
      },
    });
    if (values.help) return ok('help');
    const timeLimitMs = wholeNumber(values['time-limit-ms'] ?? String(defaultSolveOptions.timeLimitMs));
    const seed = wholeNumber(values.seed ?? String(defaultSolveOptions.seed));
    const options = solveOptionsSchema.safeParse({ ...defaultSolveOptions, timeLimitMs, seed });
    const faults = options.success
      ? []
      : options.error.issues.map((issue) => {
          const name = issue.path[0] === 'seed' ? '--seed' : '--time-limit-ms';
          return `${name}: ${issue.message}`;
        });
    const [path] = positionals;
    if (path === undefined || positionals.length > 1) {
      faults.push(`qap takes one file in QAPLIB's format, and ${positionals.length} were given`);
    }
    if (!options.success || path === undefined || faults.length > 0) return err(faults);
    return ok({ path, options: { timeLimitMs: options.data.timeLimitMs, seed: options.data.seed } });
  } catch (error) {
    return err([error instanceof Error ? error.message : String(error)]);
  }
}

function readProblem(path: string): Result<QapProblem, Faults> {
  const read = readQaplib(path);
  return read.ok ? ok({ n: read.value.n, flow: read.value.first, distance: read.value.second }) : read;
}

/** Null where the thread ended before it had told anything. Ctrl-C ends the solve with its best. */
function runThread(problem: QapProblem, options: QapOptions): Promise<Result<QapOutcome | null, string>> {
  const stopCell = new SharedArrayBuffer(4);
  const input: ThreadInput = { problem, options, stopCell };
  return new Promise((resolve, reject) => {
    const worker = new Worker(new URL(import.meta.url), {
      argv: ['qap'],
      workerData: input,
      resourceLimits: { maxOldGenerationSizeMb: MEMORY_LIMIT_MB },
    });
    let last: QapProgress | null = null;
    const onInterrupt = () => void Atomics.store(new Int32Array(stopCell), 0, 1);
    process.once('SIGINT', onInterrupt);
    const settle = (answer: Result<QapOutcome | null, string>) => {
      clearTimeout(deadline);
      process.off('SIGINT', onInterrupt);
      resolve(answer);
      void worker.terminate();
    };
    const end = (reason: StopReason) => settle(ok(last && qapOutcome(last, reason)));
    const deadline = setTimeout(() => end('time limit'), options.timeLimitMs + GRACE_MS);
    worker.on('message', (message: ThreadMessage) => {
      if (message.type === 'progress') last = message.progress;
      else settle(message.outcome);
    });
    worker.on('error', (error: NodeJS.ErrnoException) => {
      if (last && error.code === 'ERR_WORKER_OUT_OF_MEMORY') return end('memory limit');
      clearTimeout(deadline);
      reject(error);
    });
  });
}

function solveInThread({ problem, options, stopCell }: ThreadInput): 0 {
  const send = (message: ThreadMessage) => parentPort?.postMessage(message);
  const cell = new Int32Array(stopCell);
  const outcome = solveQap(problem, options, {
    nowMs: () => performance.now(),
    shouldStop: () => Atomics.load(cell, 0) !== 0,
    onProgress: (progress) => send({ type: 'progress', progress }),
  });
  send({ type: 'done', outcome });
  return 0;
}

/** The keys of `place` where they mean something here; the value is computed from the matrices once more. */
function outcomeDocument(problem: QapProblem, outcome: QapOutcome): object {
  const value = qapValue(problem, outcome.locationOf);
  if (value !== outcome.objectiveValue || outcome.bound > value) {
    throw new Error(`The solver answered ${outcome.objectiveValue}, and its assignment is worth ${value}.`);
  }
  const placement = Object.fromEntries(outcome.locationOf.map((location, i) => [i + 1, location + 1]));
  return {
    status: outcome.status,
    objective: 'path',
    objectiveValue: outcome.objectiveValue,
    bound: outcome.bound,
    gapRatio: outcome.gapRatio,
    stopReason: outcome.stopReason,
    reason: null,
    engine: outcome.engine,
    seed: outcome.seed,
    elapsedMs: outcome.elapsedMs,
    nodes: outcome.nodes,
    size: problem.n,
    placement,
  };
}

function unknownDocument(problem: QapProblem, { seed, timeLimitMs }: QapOptions): object {
  return {
    status: 'unknown',
    objective: 'path',
    objectiveValue: null,
    bound: null,
    gapRatio: null,
    stopReason: 'time limit',
    reason: 'The solve ended before its first bound: allow more time.',
    engine: 'presolve',
    seed,
    elapsedMs: timeLimitMs,
    nodes: null,
    size: problem.n,
    placement: null,
  };
}
