/** What the solving commands share: their options, a solve in a thread of its own, and the document of its outcome. */
import { compileFabric } from '../../lib/fabric/compile';
import { measureMapping } from '../../lib/mapping/metrics';
import { err, ok, type Result } from '../../lib/result';
import { defaultSolveOptions, type SolveOptions, solveOptionsSchema } from '../../lib/solver/options';
import type { SolveOutcome } from '../../lib/solver/outcome';
import type { PlacementProblem } from '../../lib/solver/problem';
import { isBadInputError, runSolve, threadsHere } from '../../lib/solver/worker/client';
import { wholeNumber } from './arguments';
import type { Faults } from './read-document';
import { type GivenProblem, inputFaultLine } from './read-problem';

export const optionNames = ['engine', 'time-limit-ms', 'node-limit', 'seed'] as const;

export function readOptions(
  given: Partial<Record<(typeof optionNames)[number], string>>,
): Result<SolveOptions, Faults> {
  const nodeLimit = given['node-limit'];
  const parsed = solveOptionsSchema.safeParse({
    engine: given.engine ?? defaultSolveOptions.engine,
    timeLimitMs: wholeNumber(given['time-limit-ms'] ?? String(defaultSolveOptions.timeLimitMs)),
    seed: wholeNumber(given.seed ?? String(defaultSolveOptions.seed)),
    // What is no whole number becomes NaN, which the schema refuses; null is no limit.
    nodeLimit: nodeLimit === undefined ? null : (wholeNumber(nodeLimit) ?? Number.NaN),
  });
  if (parsed.success) return ok(parsed.data);
  const optionOf: Record<string, string> = {
    engine: '--engine',
    timeLimitMs: '--time-limit-ms',
    nodeLimit: '--node-limit',
    seed: '--seed',
  };
  return err(parsed.error.issues.map((issue) => `${optionOf[String(issue.path[0])]}: ${issue.message}`));
}

/** Runs `work` with a signal that Ctrl-C raises: the solve ends with its best. Bad input comes back as faults. */
export async function withSolver<T>(
  given: GivenProblem,
  options: SolveOptions,
  work: (solve: (problem: PlacementProblem) => Promise<SolveOutcome>) => Promise<T>,
): Promise<Result<T, Faults>> {
  const abort = new AbortController();
  const onInterrupt = () => abort.abort();
  process.once('SIGINT', onInterrupt);
  try {
    const threadPath = new URL('./threads/solver.mjs', import.meta.url);
    return ok(
      await work((problem) =>
        runSolve(problem, options, { threadPath, threads: threadsHere(), signal: abort.signal }),
      ),
    );
  } catch (error) {
    if (!isBadInputError(error)) throw error;
    return err(error.badInput.faults.map((fault) => inputFaultLine(given, fault)));
  } finally {
    process.off('SIGINT', onInterrupt);
  }
}

/** Every key is there for every status; what does not exist is null. */
export function outcomeDocument(problem: PlacementProblem, outcome: SolveOutcome): object {
  const { placement, routes } = outcome;
  return {
    status: outcome.status,
    objective: outcome.objective,
    weights: problem.weights ?? null,
    objectiveValue: outcome.objectiveValue,
    bound: outcome.bound,
    gapRatio: outcome.gapRatio,
    stopReason: outcome.stopReason,
    reason: outcome.explanation ?? outcome.reason,
    engine: outcome.engine,
    seed: outcome.seed,
    elapsedMs: outcome.elapsedMs,
    nodes: outcome.nodes,
    placement,
    routes,
    certificate: outcome.certificate,
    metrics: placement === null || routes === null ? null : metricsDocument(problem, { placement, routes }),
  };
}

function metricsDocument(problem: PlacementProblem, mapping: Parameters<typeof measureMapping>[2]): object {
  const metrics = measureMapping(problem.kernel, compileFabric(problem.fabric), mapping);
  return {
    ...metrics,
    linkLoads: Object.fromEntries(metrics.linkLoads),
    connectionHops: Object.fromEntries(metrics.connectionHops),
    netWireHops: Object.fromEntries(metrics.netWireHops),
  };
}
