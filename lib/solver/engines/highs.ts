/** HiGHS, as WebAssembly: branch and cut (package `highs`, MIT). */
import loadHighs, { type Highs, type Model } from 'highs';
import { type IntegerProgram, wholeObjective } from '../integer-program/integer-program';
import { type Engine, type EngineLimits, type EngineOutcome, tightenBound } from './engine';

/** Loads the WebAssembly module once; takes about 50 ms. */
export async function highsEngine(): Promise<Engine> {
  const highs = await loadHighs();
  return { name: 'highs', solveModel: (program, limits) => solveWithHighs(highs, program, limits) };
}

interface RunState {
  bound: number | null;
  best: { objectiveValue: number; values: Float64Array } | null;
  stopped: boolean;
}

function solveWithHighs(highs: Highs, program: IntegerProgram, limits: EngineLimits): EngineOutcome {
  const state: RunState = { bound: null, best: null, stopped: false };
  try {
    return highs.withModel((model) => {
      passProgram(highs, model, program);
      model.options.set({
        output_flag: true,
        log_to_console: false,
        time_limit: Math.max(0.001, limits.timeLimitMs / 1000),
        random_seed: limits.seed,
        mip_rel_gap: 0,
        mip_abs_gap: program.hasIntegerObjective ? 0.99 : 1e-6,
      });
      if (limits.warmStart) model.setSolution({ colValue: limits.warmStart });
      const { modelStatus } = model.run(callbacks(highs, program, limits, state));
      return readOutcome(highs, model, program, modelStatus, state);
    });
  } catch (error) {
    const message = error instanceof Error ? error.message : String(error);
    return { status: 'unfinished', stop: 'engine failed', bound: state.bound, best: state.best, message };
  }
}

function passProgram(highs: Highs, model: Model, program: IntegerProgram): void {
  model.passModel({
    numCols: program.columnNames.length,
    numRows: program.rowNames.length,
    sense: highs.constants.objectiveSense.minimize,
    offset: program.offset,
    colCost: program.cost,
    colLower: program.lower,
    colUpper: program.upper,
    rowLower: program.rowLower,
    rowUpper: program.rowUpper,
    integrality: Int32Array.from(program.isInteger),
    matrix: {
      format: 'csr',
      numRows: program.rowNames.length,
      numCols: program.columnNames.length,
      starts: program.rowStart,
      indices: program.entryColumn,
      values: program.entryValue,
    },
  });
}

function callbacks(highs: Highs, program: IntegerProgram, limits: EngineLimits, state: RunState) {
  const { callbackType } = highs.constants;
  const noteBound = (bound: unknown) => {
    if (typeof bound !== 'number' || !Number.isFinite(bound) || Math.abs(bound) > 1e25) return;
    const tight = tightenBound(program, bound);
    if (state.bound !== null && tight <= state.bound) return;
    state.bound = tight;
    limits.onBound?.(tight);
  };
  const interrupt = (event: { interrupt(): void }): undefined => {
    if (!limits.shouldStop()) return;
    state.stopped = true;
    event.interrupt();
  };
  return {
    [callbackType.mipInterrupt]: (event: {
      interrupt(): void;
      data: { mip_dual_bound?: number };
    }): undefined => {
      noteBound(event.data.mip_dual_bound);
      return interrupt(event);
    },
    [callbackType.simplexInterrupt]: interrupt,
    [callbackType.mipLogging]: (event: { data: { mip_dual_bound?: number } }): undefined => {
      noteBound(event.data.mip_dual_bound);
    },
    [callbackType.mipImprovingSolution]: (event: { data: { mip_solution?: Float64Array } }): undefined => {
      const values = event.data.mip_solution;
      if (!values) return;
      const objectiveValue = wholeObjective(program, values);
      if (state.best && state.best.objectiveValue <= objectiveValue) return;
      state.best = { objectiveValue, values };
      limits.onPoint?.(objectiveValue, values);
    },
  };
}

function readOutcome(
  highs: Highs,
  model: Model,
  program: IntegerProgram,
  modelStatus: number,
  state: RunState,
): EngineOutcome {
  const status = highs.constants.modelStatus;
  if (modelStatus === status.infeasible) return { status: 'infeasible' };
  if (modelStatus === status.optimal || modelStatus === status.empty) {
    const values = model.getSolution().colValue;
    const objectiveValue = wholeObjective(program, values);
    const dual = program.isInteger.includes(1) ? Number(model.info.get('mip_dual_bound')) : objectiveValue;
    const bound = Number.isFinite(dual)
      ? Math.min(objectiveValue, tightenBound(program, dual))
      : objectiveValue;
    return { status: 'optimal', objectiveValue, bound, values };
  }
  if (modelStatus === status.timeLimit || modelStatus === status.interrupted || state.stopped) {
    const dual = Number(model.info.get('mip_dual_bound'));
    const known = Number.isFinite(dual) && Math.abs(dual) < 1e25 ? tightenBound(program, dual) : null;
    const bound = known === null ? state.bound : Math.max(known, state.bound ?? known);
    return {
      status: 'unfinished',
      stop: modelStatus === status.timeLimit ? 'time limit' : 'stopped',
      bound,
      best: state.best,
      message: null,
    };
  }
  const message = `HiGHS ended with model status ${modelStatus}`;
  return { status: 'unfinished', stop: 'engine failed', bound: state.bound, best: state.best, message };
}
