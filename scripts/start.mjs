#!/usr/bin/env node
// npm start: from a bare checkout to a running Pinloom; npm run dev: the same with rebuilding on change.
// Everything is idempotent; Ctrl-C stops what was started here, the private database last.
import { spawn, spawnSync } from 'node:child_process';
import { createServer } from 'node:net';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { startDatabase, stopDatabase } from './db.mjs';
import { ensureDebianPackages } from './debian-packages.mjs';
import { ensureNpmPackages } from './npm-packages.mjs';
import { ensureWebBuild } from './web-build.mjs';

const ROOT = resolve(dirname(fileURLToPath(import.meta.url)), '..');
const DEV = process.argv.includes('--dev');
const HOST = '127.0.0.1';
const STOP_WITHIN_MS = 8000;
const RESTART_AFTER_MS = 1000;

/** The first free port from `wanted` on. */
async function freePort(wanted) {
  for (let port = wanted; port < wanted + 50; port++) {
    const free = await new Promise((done) => {
      const probe = createServer();
      probe.once('error', () => done(false));
      probe.listen(port, HOST, () => probe.close(() => done(true)));
    });
    if (free) return port;
  }
  throw new Error(`No free port from ${wanted} on. Set PORT to another one.`);
}

/** @type {Map<string, import('node:child_process').ChildProcess>} */
const children = new Map();
let stopping = false;

// Detached: a Ctrl-C in the terminal reaches this process only, which then stops the others in order.
function startChild(name, args, env, { restart }) {
  const child = spawn(
    process.execPath,
    ['--import', join(ROOT, 'scripts', 'exit-with-parent.mjs'), ...args],
    {
      cwd: ROOT,
      env,
      detached: true,
      stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
    },
  );
  children.set(name, child);
  child.on('exit', (code, signal) => {
    children.delete(name);
    if (stopping) return;
    console.error(`${name} ended (${signal ?? code})`);
    if (restart) setTimeout(() => !stopping && startChild(name, args, env, { restart }), RESTART_AFTER_MS);
    else stop(1);
  });
}

async function stop(exitCode) {
  if (stopping) return;
  stopping = true;
  const gone = [...children.values()].map((child) => new Promise((done) => child.once('exit', done)));
  for (const child of children.values()) child.kill('SIGTERM');
  const late = setTimeout(() => {
    for (const child of children.values()) child.kill('SIGKILL');
  }, STOP_WITHIN_MS);
  await Promise.all(gone);
  clearTimeout(late);
  if (!process.env.DATABASE_URL) await stopDatabase();
  console.log('Pinloom is stopped.');
  process.exit(exitCode);
}

async function untilHealthy(address) {
  for (let attempt = 0; attempt < 300; attempt++) {
    const healthy = await fetch(`${address}/api/health`).then(
      (response) => response.ok,
      () => false,
    );
    if (healthy) return;
    if (stopping) return;
    await new Promise((wake) => setTimeout(wake, 100));
  }
  throw new Error('The web application did not answer within 30 seconds');
}

function runOnce(script, env) {
  const result = spawnSync(process.execPath, [script], {
    cwd: ROOT,
    env,
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  if (result.status !== 0) throw new Error(`${script} failed`);
}

function printWelcome(address, seconds, mailAddress) {
  const lines = [
    '',
    `Pinloom is ready at ${address}  (${seconds} s)`,
    '',
    'Demo sign-ins of the Tarnbrook workspace, password "woven on a small frame":',
    '  lead@tarnbrook.example        owner',
    '  architect@tarnbrook.example   editor',
    '  compiler@tarnbrook.example    editor',
    '  reviewer@tarnbrook.example    reviewer',
    '  student@tarnbrook.example     viewer',
    ...(mailAddress ? ['', `Mail is kept here, nothing is sent: ${mailAddress}`] : []),
    '',
    'Ctrl-C stops everything; nothing is lost.',
    '',
  ];
  console.log(lines.join('\n'));
}

async function main() {
  const startedAt = Date.now();
  if (!process.env.DATABASE_URL) ensureDebianPackages(['postgresql']);
  ensureNpmPackages();
  const { bundle } = await import('./bundle.mjs');
  await bundle();
  const databaseUrl = await startDatabase();
  const port = await freePort(Number(process.env.PORT ?? 3000));
  const address = process.env.PUBLIC_ADDRESS ?? `http://${HOST}:${port}`;
  const smtpPort = process.env.SMTP_URL ? null : await freePort(2525);
  const env = {
    ...process.env,
    DATABASE_URL: databaseUrl,
    PUBLIC_ADDRESS: address,
    COOKIE_SECURE: process.env.COOKIE_SECURE ?? (address.startsWith('https:') ? '1' : '0'),
    SMTP_URL: process.env.SMTP_URL ?? `smtp://${HOST}:${smtpPort}`,
    NEXT_TELEMETRY_DISABLED: '1',
    ...(smtpPort ? { MAIL_SINK: '1', MAIL_SINK_PORT: String(smtpPort) } : {}),
  };
  runOnce('dist/seed.mjs', env);
  if (!DEV) ensureWebBuild();
  const next = join('node_modules', 'next', 'dist', 'bin', 'next');
  startChild(
    'web',
    [next, DEV ? 'dev' : 'start', '-H', HOST, '-p', String(port)],
    { ...env, NODE_ENV: DEV ? 'development' : 'production' },
    { restart: false },
  );
  startChild('worker', ['--enable-source-maps', 'dist/worker.mjs'], env, { restart: true });
  if (smtpPort) startChild('mail', ['--enable-source-maps', 'dist/mail-sink.mjs'], env, { restart: true });
  await untilHealthy(address);
  if (!stopping)
    printWelcome(address, Math.round((Date.now() - startedAt) / 1000), smtpPort ? `${address}/mail` : null);
}

process.on('SIGINT', () => stop(0));
process.on('SIGTERM', () => stop(0));
main().catch((error) => {
  console.error(error.message);
  stop(1);
});
