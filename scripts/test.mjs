#!/usr/bin/env node
// npm test: brings what the tests need, then runs all of them. The last line adds up the runners' own reports.
import { spawn, spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureDebianPackages } from './debian-packages.mjs';
import { ensureNpmPackages } from './npm-packages.mjs';

const ROOT = resolve(dirname(fileURLToPath(import.meta.url)), '..');
const OUT = join(ROOT, '.out');
const bin = (name) => join(ROOT, 'node_modules', '.bin', name);
// A database of the tests' own beside the one people work in: never their data, never their server.
const testState = { PINLOOM_PG_FAST: '1', PINLOOM_STATE: join(ROOT, '.data', 'test') };
const env = { ...process.env, ...testState, NEXT_TELEMETRY_DISABLED: '1', CI: process.env.CI ?? '' };

const failures = [];

function step(title, command, args, options = {}) {
  const startedAt = Date.now();
  console.log(`\n== ${title}`);
  const result = spawnSync(command, args, { cwd: ROOT, env, stdio: 'inherit', ...options });
  const seconds = ((Date.now() - startedAt) / 1000).toFixed(1);
  console.log(`== ${title}: ${result.status === 0 ? 'ok' : 'FAILED'} (${seconds} s)`);
  if (result.status !== 0) failures.push(title);
}

const database = (command) =>
  spawnSync(process.execPath, ['scripts/db.mjs', command], { cwd: ROOT, env, stdio: 'inherit' });

const freePort = () =>
  new Promise((done) => {
    const probe = createServer();
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address();
      probe.close(() => done(port));
    });
  });

/** The product as a person starts it, on the tests' own database and port. */
async function startProduct() {
  const port = await freePort();
  const child = spawn(process.execPath, ['scripts/start.mjs'], {
    cwd: ROOT,
    env: { ...env, PORT: String(port), PINLOOM_E2E: '1' },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  let output = '';
  const ready = new Promise((done, failed) => {
    child.stdout.on('data', (chunk) => {
      output += chunk;
      const address = /Pinloom is ready at (\S+)/.exec(output)?.[1];
      if (address) done(address);
    });
    child.once('exit', (code) => failed(new Error(`The product ended while starting (${code}):\n${output}`)));
  });
  const address = await ready;
  const stop = () =>
    new Promise((done) => {
      child.once('exit', done);
      child.kill('SIGTERM');
    });
  return { address, pid: child.pid, stop };
}

async function endToEnd() {
  if (!existsSync(join(ROOT, 'playwright.config.ts'))) return;
  const product = await startProduct();
  try {
    step('end to end in Chromium', bin('playwright'), ['test', ...only('e2e')], {
      env: { ...env, PINLOOM_ADDRESS: product.address, PINLOOM_START_PID: String(product.pid) },
    });
  } finally {
    await product.stop();
  }
}

/** `npm test -- unit tests/unit/graph` runs one kind and, of it, one place. */
const [kind, ...rest] = process.argv.slice(2);
const wants = (name) => !kind || kind === name;
const only = (name) => (kind === name ? rest : []);

function readReport(file, read) {
  const path = join(OUT, file);
  if (!existsSync(path)) return { passed: 0, failed: 0, skipped: 0 };
  return read(JSON.parse(readFileSync(path, 'utf8')));
}

function summary() {
  const reports = [
    readReport('vitest.json', (r) => ({
      passed: r.numPassedTests,
      failed: r.numFailedTests,
      skipped: r.numPendingTests + r.numTodoTests,
    })),
    readReport('playwright.json', (r) => ({
      passed: r.stats.expected,
      failed: r.stats.unexpected + r.stats.flaky,
      skipped: r.stats.skipped,
    })),
  ];
  const total = (key) => reports.reduce((sum, report) => sum + report[key], 0);
  return `${total('passed')} passed, ${total('failed')} failed, ${total('skipped')} skipped`;
}

async function main() {
  ensureDebianPackages(['postgresql', 'chromium', 'graphviz', 'glpk-utils', 'coinor-cbc']);
  ensureNpmPackages();
  rmSync(OUT, { recursive: true, force: true });
  mkdirSync(OUT, { recursive: true });
  const { bundle } = await import('./bundle.mjs');
  await bundle();
  database('destroy');
  if (wants('lint')) {
    step('lint', bin('biome'), ['check', '.']);
    step('import rules', bin('depcruise'), ['app', 'components', 'db', 'lib']);
  }
  if (wants('types')) {
    step('route types', bin('next'), ['typegen']);
    step('types', bin('tsc'), ['--noEmit']);
    step('migrations match the schema', bin('drizzle-kit'), ['check']);
  }
  const projects = ['unit', 'property', 'ui', 'integration'].filter(wants);
  if (projects.length > 0) {
    step('unit, property, screens and database', bin('vitest'), [
      'run',
      ...projects.flatMap((name) => ['--project', name]),
      ...(kind && projects.includes(kind) ? rest : []),
    ]);
  }
  if (wants('e2e')) await endToEnd();
}

try {
  await main();
} catch (error) {
  console.error(error.message);
  failures.push('preparation');
}
database('stop');
if (failures.length > 0) console.log(`\nFailed steps: ${failures.join(', ')}`);
console.log(summary());
process.exit(failures.length > 0 ? 1 : 0);
