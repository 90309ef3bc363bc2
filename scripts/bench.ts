/**
 * Measures the product and the solver on this machine and writes .out/bench.json:
 *   npm run bench -- [--only start-up|client|screens|solves] [--time-limit-ms N]
 * Times of two machines are compared by their ratio to the yardstick of the same run.
 */
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { measureBenchScreen } from './bench/bench-screen';
import { openBrowser } from './bench/browser';
import { measureClientCode } from './bench/client-code';
import { measureKernelEditor } from './bench/kernel-editor';
import { ledger, tableText, writeReport } from './bench/measurement';
import { startProduct } from './bench/product';
import { measureSolves } from './bench/solves';
import { measureStartUp } from './bench/start-up';
import { yardstickMs } from './bench/yardstick';

const { values } = parseArgs({
  options: {
    only: { type: 'string' },
    'time-limit-ms': { type: 'string', default: '10000' },
    help: { type: 'boolean', default: false },
  },
});
const parts = ['start-up', 'client', 'screens', 'solves'] as const;
const { only } = values;
if (values.help || (only && !parts.some((part) => part === only))) {
  console.log(`npm run bench -- [--only ${parts.join('|')}] [--time-limit-ms N]`);
  process.exit(values.help ? 0 : 2);
}
const wants = (part: (typeof parts)[number]) => !only || only === part;

const root = resolve(dirname(fileURLToPath(import.meta.url)), '..');
const place = { root, port: 3600 };
const book = ledger(yardstickMs());

if (wants('start-up') || wants('client') || wants('screens')) {
  const product = wants('start-up') ? await measureStartUp(place, book.take) : await startProduct(place);
  const visitor = await openBrowser(product.address);
  try {
    if (wants('client')) await measureClientCode(visitor, book.take);
    if (wants('screens')) {
      await measureBenchScreen(visitor, book.take);
      await measureKernelEditor(visitor, book.take);
    }
  } finally {
    await visitor.close();
    await product.stop();
  }
}
if (wants('solves')) await measureSolves(root, Math.max(1, Number(values['time-limit-ms']) || 1), book.take);

const path = join(root, '.out', 'bench.json');
writeReport(path, book, new Date());
console.log(`\n${tableText(book)}\n\nWritten to .out/bench.json`);
