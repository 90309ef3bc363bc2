/** javascript-lp-solver: tableau simplex and branch and bound in plain JavaScript (Unlicense); for small models. */
import solver, { type Model } from 'javascript-lp-solver';
import { type IntegerProgram, violationAt, wholeObjective } from '../integer-program/integer-program';
import { type Engine, type EngineOutcome, tightenBound } from './engine';

/** What ends a run from within a pivot: the package looks at its own time limit only between nodes. */
const deadlineReached = new Error('deadline reached');

const FEASIBLE_WITHIN = 1e-5;

export const simplexEngine: Engine = {
  name: 'simplex',
  solveModel: (program, limits) => {
    const end = limits.nowMs() + limits.timeLimitMs;
    let stop: 'time limit' | 'stopped' = 'time limit';
    const check = () => {
      if (limits.nowMs() >= end) throw deadlineReached;
      if (limits.shouldStop()) {
        stop = 'stopped';
        throw deadlineReached;
      }
    };
    try {
      return read(
        program,
        withPivotCheck(check, () => solver.Solve(jsonModel(program), 1e-9, false, true)),
      );
    } catch (error) {
      if (error === deadlineReached) return unfinished(stop, null);
      return unfinished('engine failed', error instanceof Error ? error.message : String(error));
    }
  },
};

const unfinished = (
  stop: 'time limit' | 'stopped' | 'engine failed',
  message: string | null,
): EngineOutcome => ({
  status: 'unfinished',
  stop,
  bound: null,
  best: null,
  message,
});

/** Runs with every pivot checked first; the package's prototype is as it was afterwards. */
function withPivotCheck<T>(check: () => void, run: () => T): T {
  const prototype = solver.Tableau.prototype;
  const pivot = prototype.pivot;
  prototype.pivot = function checkedPivot(this: typeof prototype, ...args: Parameters<typeof pivot>) {
    check();
    return pivot.apply(this, args);
  };
  try {
    return run();
  } finally {
    prototype.pivot = pivot;
  }
}

/** Columns are moved to start at 0, as the package takes no lower bounds; upper bounds become rows. */
function jsonModel(program: IntegerProgram): Model {
  const variables: Record<string, Record<string, number>> = {};
  const constraints: Record<string, { min?: number; max?: number; equal?: number }> = {};
  const ints: Record<string, 1> = {};
  program.columnNames.forEach((_, column) => {
    const entries: Record<string, number> = { cost: program.cost[column] as number };
    const range = (program.upper[column] as number) - (program.lower[column] as number);
    if (Number.isFinite(range)) {
      entries[`u${column}`] = 1;
      constraints[`u${column}`] = { max: range };
    }
    variables[`v${column}`] = entries;
    if (program.isInteger[column]) ints[`v${column}`] = 1;
  });
  for (let row = 0; row < program.rowNames.length; row++) {
    let shift = 0;
    const end = program.rowStart[row + 1] as number;
    for (let entry = program.rowStart[row] as number; entry < end; entry++) {
      const column = program.entryColumn[entry] as number;
      const value = program.entryValue[entry] as number;
      shift += value * (program.lower[column] as number);
      (variables[`v${column}`] as Record<string, number>)[`r${row}`] = value;
    }
    const low = (program.rowLower[row] as number) - shift;
    const high = (program.rowUpper[row] as number) - shift;
    if (low === high) constraints[`r${row}`] = { equal: low };
    else {
      constraints[`r${row}`] = {
        ...(Number.isFinite(low) ? { min: low } : {}),
        ...(Number.isFinite(high) ? { max: high } : {}),
      };
    }
  }
  return { optimize: 'cost', opType: 'min', constraints, variables, ints };
}

/** The package's answer is believed only as far as its point is feasible in our own reading of the model. */
function read(program: IntegerProgram, answer: unknown): EngineOutcome {
  if (typeof answer !== 'object' || answer === null) return unfinished('engine failed', 'no answer');
  const fields = answer as Record<string, number | boolean | undefined>;
  if (fields.feasible !== true) return { status: 'infeasible' };
  if (fields.bounded === false) return unfinished('engine failed', 'the model is unbounded');
  const values = Float64Array.from(program.columnNames, (_, column) => {
    const value = fields[`v${column}`];
    return (program.lower[column] as number) + (typeof value === 'number' ? value : 0);
  });
  if (violationAt(program, values) > FEASIBLE_WITHIN) {
    return unfinished('engine failed', 'the point found breaks a row');
  }
  const objectiveValue = wholeObjective(program, values);
  return {
    status: 'optimal',
    objectiveValue,
    bound: Math.min(objectiveValue, tightenBound(program, objectiveValue)),
    values,
  };
}
