/** One solve from the queue: take its row, run the thread, keep the row's progress and lease fresh, write the end. */
import type { Logger } from 'pino';
import { database } from '../../db/client';
import {
  finishSolve,
  type Hold,
  releaseSolve,
  reportProgress,
  type SolveProgressNote,
  type TakenSolve,
  takeSolve,
} from '../../db/queries/solve-work';
import type { SolveAsk, SolveBest, SolveEnd, SolveHistoryPoint } from '../../db/schema/solve-jobs';
import type { Id } from '../../lib/ids';
import { verifyMapping } from '../../lib/mapping/verify';
import type { SolveOutcome, SolveProgress } from '../../lib/solver/outcome';
import type { PlacementProblem } from '../../lib/solver/problem';
import { isBadInputError, runSolve, threadsHere } from '../../lib/solver/worker/client';

/** How often the row learns of progress; also how soon a stop by a person is noticed. */
const REPORT_MS = 300;
const MEMORY_LIMIT_MB = Number(process.env.SOLVE_MEMORY_MB ?? 1024);
/** A solve that was taken up again has at least this long, however much of its time an earlier worker used. */
const SHORTEST_RUN_MS = 1000;

interface JobContext {
  solveId: Id<'solve'>;
  worker: string;
  log: Logger;
  /** The whole worker is stopping: hand the job back. */
  stopping: AbortSignal;
}

export async function runSolveJob({ solveId, worker, log, stopping }: JobContext): Promise<void> {
  const taken = await takeSolve(database(), { solveId, worker });
  if (!taken) return;
  log.info({ solve: solveId, attempt: taken.attempt, ops: taken.kernel.ops.length }, 'solve taken');
  const ended = await runTaken(taken, log, stopping);
  log.info({ solve: solveId, ended }, 'solve ended');
}

async function runTaken(taken: TakenSolve, log: Logger, stopping: AbortSignal): Promise<string> {
  const hold: Hold = { solveId: taken.solveId, worker: taken.worker, attempt: taken.attempt };
  const ledger = progressLedger(taken.history);
  const abort = new AbortController();
  const handBack = () => abort.abort();
  stopping.addEventListener('abort', handBack, { once: true });
  let asked: 'continue' | 'stop' | 'lost' = 'continue';
  const reporter = reportEvery(
    REPORT_MS,
    async () => {
      asked = await reportProgress(database(), hold, ledger.note());
      if (asked !== 'continue') abort.abort();
    },
    log,
  );
  const result = await solveTaken(taken, ledger, abort.signal);
  await reporter.stop();
  stopping.removeEventListener('abort', handBack);
  if ((asked as string) === 'lost') return 'lost to another worker';
  if (stopping.aborted && (asked as string) !== 'stop') {
    await reportProgress(database(), hold, ledger.note());
    await releaseSolve(database(), hold);
    return 'handed back';
  }
  return writeEnd(hold, taken, result, ledger.note().history, (asked as string) === 'stop', log);
}

type SolveResult = { ok: true; outcome: SolveOutcome } | { ok: false; reason: string };

async function solveTaken(
  taken: TakenSolve,
  ledger: ProgressLedger,
  signal: AbortSignal,
): Promise<SolveResult> {
  const { kernel, fabric, pins, settings, startPlacement } = taken;
  const timeLimitMs = Math.max(SHORTEST_RUN_MS, settings.timeLimitMs - ledger.earlierMs);
  try {
    const outcome = await runSolve(
      {
        kernel,
        fabric,
        pins,
        objective: settings.objective,
        weights: settings.weights,
        ...(startPlacement ? { start: startPlacement } : {}),
        ...askedOf(settings.ask),
      },
      { engine: settings.engine, timeLimitMs, seed: settings.seed, nodeLimit: null, searchTries: null },
      { signal, memoryLimitMb: MEMORY_LIMIT_MB, threads: threadsHere(), onProgress: ledger.take },
    );
    return { ok: true, outcome };
  } catch (error) {
    if (isBadInputError(error)) return { ok: false, reason: error.badInput.messages.join(' ') };
    throw error;
  }
}

/** What an ask adds to the problem. */
const askedOf = (ask: SolveAsk | undefined): Pick<PlacementProblem, 'another' | 'provenBound'> => ({
  ...(ask && { provenBound: ask.provenBound }),
  ...(ask?.kind === 'another' && { another: { objectiveValue: ask.objectiveValue, than: ask.than } }),
});

async function writeEnd(
  hold: Hold,
  taken: TakenSolve,
  result: SolveResult,
  history: SolveHistoryPoint[],
  stoppedByPerson: boolean,
  log: Logger,
): Promise<string> {
  if (!result.ok) {
    await finishSolve(database(), hold, { state: 'failed', outcome: refusal(result.reason), best: null });
    return 'refused';
  }
  const { outcome } = result;
  const best: SolveBest | null = outcome.placement
    ? { objectiveValue: outcome.objectiveValue, placement: outcome.placement, routes: outcome.routes }
    : null;
  // The solver has verified it in its thread; nothing is stored on a thread's word alone.
  const broken = best ? verifyMapping(taken.kernel, taken.fabric, { ...best, pins: taken.pins }) : [];
  if (broken.length > 0) {
    log.error({ solve: hold.solveId, rules: broken.map((violation) => violation.rule) }, 'solve broke rules');
    const reason = 'The solver’s result did not pass the check, so it was thrown away. Please report this.';
    await finishSolve(database(), hold, { state: 'failed', outcome: refusal(reason), best: null });
    return 'broken';
  }
  const state = stoppedByPerson ? 'cancelled' : 'done';
  const written = await finishSolve(database(), hold, { state, outcome: endOf(outcome), best, history });
  return written ? outcome.status : 'lost to another worker';
}

const endOf = (outcome: SolveOutcome): SolveEnd => ({
  status: outcome.status,
  engine: outcome.engine,
  elapsedMs: outcome.elapsedMs,
  nodes: outcome.nodes,
  objectiveValue: outcome.objectiveValue,
  bound: outcome.bound,
  gapRatio: outcome.gapRatio,
  stopReason: outcome.stopReason,
  reason: outcome.reason,
  explanation: outcome.explanation,
  certificate: outcome.certificate,
});

const refusal = (reason: string): SolveEnd => ({
  status: 'unknown',
  engine: '',
  elapsedMs: 0,
  nodes: 0,
  objectiveValue: null,
  bound: null,
  gapRatio: null,
  stopReason: 'refused',
  reason,
  explanation: null,
  certificate: null,
});

interface ProgressLedger {
  /** Solve time that earlier attempts used. */
  earlierMs: number;
  take(progress: SolveProgress): void;
  /** What the row should say now; a best is in it only once. */
  note(): SolveProgressNote;
}

/** Collects progress between two reports. */
function progressLedger(earlier: readonly SolveHistoryPoint[]): ProgressLedger {
  const earlierMs = earlier.at(-1)?.elapsedMs ?? 0;
  const history = [...earlier];
  let latest: SolveProgress | null = null;
  let told: SolveProgress['best'] = null;
  return {
    earlierMs,
    take: (progress) => {
      latest = progress;
      const best = progress.best?.objectiveValue ?? null;
      const last = history.at(-1);
      if (last?.best === best && last?.bound === progress.bound) return;
      history.push({ elapsedMs: Math.round(earlierMs + progress.elapsedMs), best, bound: progress.bound });
    },
    note: () => {
      const best = latest?.best && latest.best !== told ? latest.best : null;
      told = latest?.best ?? told;
      return {
        phase: latest?.phase ?? 'presolve',
        bound: latest?.bound ?? null,
        gapRatio: latest?.gapRatio ?? null,
        elapsedMs: earlierMs + (latest?.elapsedMs ?? 0),
        nodes: latest?.nodes ?? 0,
        best: best && { objectiveValue: best.objectiveValue, placement: best.placement, routes: best.routes },
        history,
      };
    },
  };
}

/** Calls `report` again and again, never twice at once. A failed report is logged; the lease bounds how long. */
function reportEvery(intervalMs: number, report: () => Promise<void>, log: Logger) {
  let over = false;
  let wake = () => {};
  const loop = (async () => {
    while (!over) {
      await report().catch((error: unknown) => log.error({ err: error }, 'progress could not be written'));
      if (!over) {
        await new Promise<void>((done) => {
          const timer = setTimeout(done, intervalMs);
          wake = () => {
            clearTimeout(timer);
            done();
          };
        });
      }
    }
  })();
  return {
    stop: async () => {
      over = true;
      wake();
      await loop;
    },
  };
}
