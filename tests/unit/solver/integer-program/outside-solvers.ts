/**
 * Solvers from outside the project that read LP and MPS text by readers of their own: GLPK 5 (Debian glpk-utils),
 * CBC 2.10 (Debian coinor-cbc) and HiGHS (npm package `highs`).
 */
import { execFile } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import loadHighs from 'highs';

const start = promisify(execFile);

export const textFormats = ['lp', 'mps'] as const;
export type TextFormat = (typeof textFormats)[number];

export interface OutsideSolvers {
  /** What each of them proves, run side by side. */
  answers(text: string, format: TextFormat): Promise<Record<'glpk' | 'cbc' | 'highs', Answer>>;
  /** CBC's optimal point: the columns that are not 0, by name. */
  cbcPoint(text: string, format: TextFormat): Promise<Map<string, number>>;
  remove(): void;
}

/** The optimum; any other end than a proof is an error. */
export type Answer = number | 'infeasible';

/** HiGHS says 3.999999999999995 for 4: as exact as its tolerance of 1e-6, and as what the others print. */
const roundedToTolerance = (value: number): number => Math.round(value * 1e6) / 1e6;

export async function outsideSolvers(): Promise<OutsideSolvers> {
  const folder = mkdtempSync(join(tmpdir(), 'pinloom-model-'));
  const highs = await loadHighs();
  let count = 0;
  const files = (text: string, format: TextFormat): [model: string, report: string] => {
    const model = join(folder, `model-${++count}.${format}`);
    writeFileSync(model, text);
    return [model, `${model}.report`];
  };
  /** CBC's report by text: the answer and the point are read from one run. */
  const cbcReports = new Map<string, Promise<string>>();
  const runCbc = async (text: string, format: TextFormat): Promise<string> => {
    const [model, report] = files(text, format);
    await start('cbc', [model, '-sec', '60', '-solve', '-solution', report]);
    return readFileSync(report, 'utf8');
  };
  const cbcReport = (text: string, format: TextFormat): Promise<string> => {
    const report = cbcReports.get(text) ?? runCbc(text, format);
    cbcReports.set(text, report);
    return report;
  };
  const glpk = async (text: string, format: TextFormat): Promise<Answer> => {
    const [model, report] = files(text, format);
    const reader = format === 'lp' ? '--lp' : '--freemps';
    const { stdout } = await start('glpsol', [reader, model, '--tmlim', '60', '-o', report]);
    const found = /^Status: +(?:INTEGER )?OPTIMAL\nObjective: +cost = (\S+)/m.exec(
      readFileSync(report, 'utf8'),
    );
    if (found) return Number(found[1]);
    if (/HAS NO (PRIMAL |INTEGER )?FEASIBLE SOLUTION/.test(stdout)) return 'infeasible';
    throw new Error(`GLPK proved nothing:\n${stdout}`);
  };
  const cbc = async (text: string, format: TextFormat): Promise<Answer> => {
    const [status = ''] = (await cbcReport(text, format)).split('\n');
    const found = /^Optimal - objective value (\S+)/.exec(status);
    if (found) return Number(found[1]);
    if (/^(Infeasible|Integer infeasible)/.test(status)) return 'infeasible';
    throw new Error(`CBC proved nothing: ${status}`);
  };
  const highsAnswer = async (text: string, format: TextFormat): Promise<Answer> =>
    highs.withModel({ format, data: text }, (model) => {
      model.options.set({ output_flag: false, time_limit: 60, mip_rel_gap: 0 });
      const { modelStatus } = model.run();
      if (modelStatus === highs.constants.modelStatus.infeasible) return 'infeasible';
      if (modelStatus === highs.constants.modelStatus.optimal)
        return roundedToTolerance(Number(model.info.get('objective_function_value')));
      throw new Error(`HiGHS proved nothing: model status ${modelStatus}`);
    });
  return {
    answers: async (text, format) => {
      const runs = [glpk, cbc, highsAnswer].map((run) => run(text, format));
      const [first, second, third] = (await Promise.all(runs)) as [Answer, Answer, Answer];
      return { glpk: first, cbc: second, highs: third };
    },
    cbcPoint: async (text, format) => {
      const lines = (await cbcReport(text, format)).trim().split('\n').slice(1);
      return new Map(
        lines.map((line) => {
          const [, name, value] = line.trim().split(/ +/);
          return [name ?? '', Number(value)];
        }),
      );
    },
    remove: () => rmSync(folder, { recursive: true }),
  };
}
