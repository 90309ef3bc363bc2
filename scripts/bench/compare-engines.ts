/** How one engine does against the others on the same cases in the same run. */

export interface EngineRun {
  case: string;
  /** The engine that was asked for. */
  asked: string;
  status: string;
  elapsedMs: number;
}

export interface EngineComparison {
  summary: string;
  /** Cases that each of the two settled: proved optimal or infeasible. */
  settledByFirst: number;
  settledByOther: number;
  /** Settled by the other one only. */
  missedByFirst: string[];
  /** Geometric mean of the other's time over the first's, of the cases that both settled; null without any. */
  timesFaster: number | null;
}

/** Times below this are not told apart. */
const SHORTEST_MS = 1;
const settled = (run: EngineRun): boolean => run.status === 'optimal' || run.status === 'infeasible';

/** One comparison for each engine after the first. */
export function compareEngines(runs: readonly EngineRun[], engines: readonly string[]): EngineComparison[] {
  const [first = '', ...others] = engines;
  const of = (engine: string) =>
    new Map(runs.filter((run) => run.asked === engine).map((run) => [run.case, run]));
  const own = of(first);
  return others.map((other) => {
    const theirs = [...of(other).values()].filter(settled);
    const ratios = theirs.flatMap((run) => {
      const mine = own.get(run.case);
      if (!mine || !settled(mine)) return [];
      return [Math.log(Math.max(SHORTEST_MS, run.elapsedMs) / Math.max(SHORTEST_MS, mine.elapsedMs))];
    });
    return {
      summary: `${first} against ${other}`,
      settledByFirst: [...own.values()].filter(settled).length,
      settledByOther: theirs.length,
      missedByFirst: theirs.filter((run) => !settled(own.get(run.case) ?? run)).map((run) => run.case),
      timesFaster:
        ratios.length === 0 ? null : Math.exp(ratios.reduce((sum, x) => sum + x, 0) / ratios.length),
    };
  });
}
