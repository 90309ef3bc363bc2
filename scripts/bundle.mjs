// Bundles the programs that run outside the web application: dist/<name>.mjs and dist/threads/<name>.mjs.
// Packages stay outside the bundle. A fraction of a second, so it runs at every start.
import { existsSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build } from 'esbuild';

const ROOT = resolve(dirname(fileURLToPath(import.meta.url)), '..');

const programs = {
  worker: 'scripts/worker.ts',
  seed: 'scripts/seed.ts',
  'mail-sink': 'scripts/mail-sink.ts',
  pinloom: 'scripts/pinloom.ts',
  bench: 'scripts/bench.ts',
  'bench-solve': 'scripts/bench-solve.ts',
  'demo-mappings': 'scripts/demo-mappings.ts',
  'threads/solver': 'lib/solver/worker/thread.ts',
};

/** @param {(keyof typeof programs)[]} names all of them when left out */
export async function bundle(names = Object.keys(programs)) {
  const entryPoints = Object.fromEntries(
    names.map((name) => [name, join(ROOT, programs[name])]).filter(([, source]) => existsSync(source)),
  );
  await build({
    absWorkingDir: ROOT,
    entryPoints,
    outdir: 'dist',
    outExtension: { '.js': '.mjs' },
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    packages: 'external',
    sourcemap: true,
    tsconfig: 'tsconfig.json',
    logLevel: 'warning',
  });
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  await bundle(process.argv.length > 2 ? process.argv.slice(2) : undefined);
}
