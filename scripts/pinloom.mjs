// The command line: bundles itself when its sources are newer, then runs. Needs `npm ci` and nothing else.
import { readdirSync, statSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

const ROOT = resolve(dirname(fileURLToPath(import.meta.url)), '..');
const outputs = ['dist/pinloom.mjs', 'dist/threads/solver.mjs'].map((path) => join(ROOT, path));

/** The time of the newest file below a folder, in ms; 0 for none. */
function newestMs(path) {
  const stat = statSync(path, { throwIfNoEntry: false });
  if (!stat) return 0;
  if (!stat.isDirectory()) return stat.mtimeMs;
  return Math.max(stat.mtimeMs, ...readdirSync(path).map((name) => newestMs(join(path, name))));
}

const sources = [
  'lib',
  'scripts/pinloom.ts',
  'scripts/pinloom-model.ts',
  'scripts/pinloom-qap.ts',
  'scripts/command-line',
  'package-lock.json',
];
const newestSourceMs = Math.max(...sources.map((path) => newestMs(join(ROOT, path))));
const oldestOutputMs = Math.min(...outputs.map(newestMs));
if (oldestOutputMs < newestSourceMs) {
  const { bundle } = await import('./bundle.mjs');
  await bundle(['pinloom', 'threads/solver']);
}
await import('../dist/pinloom.mjs');
