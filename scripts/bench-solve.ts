/**
 * Solves every demo kernel on every demo fabric with each engine and prints one JSON line a case, then a summary of how
 * the first engine compares with the others in the same run:
 *   npm run bench:solve -- [--time-limit-ms N] [--objective wire|path] [--engines auto,program,highs,simplex,search]
 *                          [--kernel part of its name] [--fabric part of its name] [--large]
 * With --large, kernels of 40 to 60 ops on 10 × 10 and 12 × 12 tiles in their place.
 */
import { parseArgs } from 'node:util';
import { demoFabrics } from '../db/seed/fabrics';
import { demoKernels } from '../db/seed/kernels';
import type { Fabric } from '../lib/fabric/fabric';
import type { Kernel } from '../lib/graph/kernel';
import { objectives } from '../lib/mapping/mapping';
import { type EngineChoice, engineChoices, SOLVE_LIMITS } from '../lib/solver/options';
import { runSolve, threadsHere } from '../lib/solver/worker/client';
import { compareEngines, type EngineRun } from './bench/compare-engines';
import { largeCases } from './bench/large-cases';

const { values } = parseArgs({
  options: {
    'time-limit-ms': { type: 'string', default: '20000' },
    objective: { type: 'string', default: 'wire' },
    engines: { type: 'string', default: 'auto,highs,simplex' },
    kernel: { type: 'string', default: '' },
    fabric: { type: 'string', default: '' },
    large: { type: 'boolean', default: false },
  },
});
const objective = objectives.find((one) => one === values.objective) ?? 'wire';
const wanted = values.engines.split(',');
const engines = wanted.flatMap((name) => engineChoices.find((one) => one === name) ?? []);
if (engines.length !== wanted.length) {
  console.error(`--engines: some of ${engineChoices.join(', ')}, with commas between them`);
  process.exit(2);
}
const timeLimitMs = Math.min(Math.max(1, Number(values['time-limit-ms'])), SOLVE_LIMITS.timeLimitMs);
const threadPath = new URL('./threads/solver.mjs', import.meta.url);

let lastObjective: number | null = null;

/** Solves one case with the process's memory watched; the peak is of the whole process. */
async function measure(kernel: Kernel, fabric: Fabric, engine: EngineChoice) {
  let peakBytes = 0;
  const watch = setInterval(() => {
    peakBytes = Math.max(peakBytes, process.memoryUsage.rss());
  }, 50);
  const startMs = performance.now();
  let firstMs: number | null = null;
  let bestMs: number | null = null;
  try {
    const outcome = await runSolve(
      { kernel, fabric, pins: {}, objective },
      { engine, timeLimitMs, seed: 1, nodeLimit: null, searchTries: null },
      {
        threadPath,
        threads: threadsHere(),
        onProgress: ({ best }) => {
          if (!best) return;
          firstMs ??= performance.now() - startMs;
          if (best.objectiveValue !== lastObjective) bestMs = performance.now() - startMs;
          lastObjective = best.objectiveValue;
        },
      },
    );
    const { status, objectiveValue, bound, elapsedMs, nodes, stopReason, reason } = outcome;
    const round = (ms: number | null) => (ms === null ? null : Math.round(ms));
    return {
      asked: engine,
      engine: outcome.engine,
      status,
      objective,
      objectiveValue,
      bound,
      elapsedMs,
      nodes,
      firstMappingMs: round(firstMs),
      bestMappingMs: round(bestMs),
      peakMemoryMb: Math.round(peakBytes / 2 ** 20),
      stopReason,
      reason,
    };
  } finally {
    clearInterval(watch);
    lastObjective = null;
  }
}

const runs: EngineRun[] = [];
const cases = !values.large
  ? demoKernels.flatMap(({ slug, kernel }) =>
      demoFabrics.map(({ key, fabric }) => ({ slug, kernel, key, fabric })),
    )
  : largeCases();
for (const { slug, kernel, key, fabric } of cases) {
  if (!slug.includes(values.kernel) || !key.includes(values.fabric)) continue;
  for (const engine of engines) {
    const figures = await measure(kernel, fabric, engine);
    const line = { case: `${slug} on ${key}`, ops: kernel.ops.length, fabric: fabric.name, ...figures };
    runs.push({ case: line.case, asked: engine, status: figures.status, elapsedMs: figures.elapsedMs });
    process.stdout.write(`${JSON.stringify(line)}\n`);
  }
}
for (const summary of compareEngines(runs, engines)) process.stdout.write(`${JSON.stringify(summary)}\n`);
