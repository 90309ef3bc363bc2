/** `place`: solves and prints the outcome. */
import { compileFabric } from '../../lib/fabric/compile';
import { measureMapping } from '../../lib/mapping/metrics';
import { err, ok, type Result } from '../../lib/result';
import { defaultSolveOptions, type SolveOptions, solveOptionsSchema } from '../../lib/solver/options';
import type { SolveOutcome } from '../../lib/solver/outcome';
import type { PlacementProblem } from '../../lib/solver/problem';
import { isBadInputError, runSolve } from '../../lib/solver/worker/client';
import { readArguments, wholeNumber } from './arguments';
import { printDocument, printFaults } from './print';
import type { Faults } from './read-document';
import { inputFaultLine, readProblem } from './read-problem';
import { usage } from './usage';

const names = [
  'kernel',
  'fabric',
  'pins',
  'objective',
  'engine',
  'time-limit-ms',
  'node-limit',
  'seed',
] as const;
type Given = Partial<Record<(typeof names)[number], string>>;

export async function place(args: readonly string[]): Promise<0 | 2 | 3 | 4> {
  const given = readArguments(args, names, ['kernel', 'fabric']);
  if (!given.ok) return printFaults(given.error);
  if (given.value.help) {
    process.stdout.write(usage);
    return 0;
  }
  const options = readOptions(given.value);
  const problem = readProblem(given.value);
  if (!options.ok || !problem.ok) {
    return printFaults([...(options.ok ? [] : options.error), ...(problem.ok ? [] : problem.error)]);
  }
  const abort = new AbortController();
  const onInterrupt = () => abort.abort();
  process.once('SIGINT', onInterrupt);
  try {
    const threadPath = new URL('./threads/solver.mjs', import.meta.url);
    const outcome = await runSolve(problem.value, options.value, { threadPath, signal: abort.signal });
    printDocument(outcomeDocument(problem.value, outcome));
    return outcome.status === 'infeasible' ? 3 : outcome.status === 'unknown' ? 4 : 0;
  } catch (error) {
    if (!isBadInputError(error)) throw error;
    return printFaults(error.badInput.faults.map((fault) => inputFaultLine(given.value, fault)));
  } finally {
    process.off('SIGINT', onInterrupt);
  }
}

function readOptions(given: Given): Result<SolveOptions, Faults> {
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

/** Every key is there for every status; what does not exist is null. */
function outcomeDocument(problem: PlacementProblem, outcome: SolveOutcome): object {
  const { placement, routes } = outcome;
  return {
    status: outcome.status,
    objective: outcome.objective,
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
