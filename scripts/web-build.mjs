// Builds the web application when a source file has changed since the last build. Node built-ins only.
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

const ROOT = resolve(dirname(fileURLToPath(import.meta.url)), '..');
const STAMP = join(ROOT, '.next', 'pinloom-source-hash');
const SOURCES = [
  'app',
  'components',
  'db',
  'lib',
  'public',
  'proxy.ts',
  'next.config.mjs',
  'package-lock.json',
  'tailwind.config.ts',
  'tsconfig.json',
  'postcss.config.mjs',
];

function* filesBelow(path) {
  if (!existsSync(path)) return;
  if (!statSync(path).isDirectory()) {
    yield path;
    return;
  }
  for (const entry of readdirSync(path).sort()) yield* filesBelow(join(path, entry));
}

function sourceHash() {
  const hash = createHash('sha256');
  for (const source of SOURCES) {
    for (const file of filesBelow(join(ROOT, source)))
      hash.update(file.slice(ROOT.length)).update(readFileSync(file));
  }
  return hash.digest('hex');
}

/** Returns true when it had to build. */
export function ensureWebBuild() {
  const wanted = sourceHash();
  if (existsSync(STAMP) && readFileSync(STAMP, 'utf8') === wanted) return false;
  console.log('Building the web application (half a minute)');
  const next = join(ROOT, 'node_modules', 'next', 'dist', 'bin', 'next');
  const env = { ...process.env, NEXT_TELEMETRY_DISABLED: '1', NODE_ENV: 'production' };
  const result = spawnSync(process.execPath, [next, 'build'], {
    cwd: ROOT,
    env,
    encoding: 'utf8',
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  if (result.status !== 0) throw new Error(`next build failed:\n${result.stdout}${result.stderr}`);
  writeFileSync(STAMP, wanted);
  return true;
}
