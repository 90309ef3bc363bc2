import { spawn, spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { qapValue } from '@/lib/solver/qap/qap';
import { publishedText } from './qap-cases';

const folder = mkdtempSync(join(tmpdir(), 'pinloom-qap-'));
const scratch = (name: string, text: string): string => {
  const path = join(folder, name);
  writeFileSync(path, text);
  return path;
};
const run = (...args: string[]) => {
  const done = spawnSync(process.execPath, ['scripts/pinloom.mjs', 'qap', ...args], { encoding: 'utf8' });
  return { code: done.status, stdout: done.stdout, stderr: done.stderr };
};
const locationsOf = (placement: Record<string, number>): number[] =>
  Object.keys(placement)
    .sort((a, b) => Number(a) - Number(b))
    .map((facility) => (placement[facility] as number) - 1);

beforeAll(() => {
  // The first call may have to bundle.
  run('--help');
}, 60_000);
afterAll(() => rmSync(folder, { recursive: true }));

describe('pinloom qap', { timeout: 60_000 }, () => {
  it('prints one JSON document with the published optimum of tai12b, and exits 0', () => {
    const { problem, optimum } = publishedText('tai12b');
    const { code, stdout, stderr } = run('tests/reference/qaplib/tai12b.dat', '--time-limit-ms', '40000');
    expect({ code, stderr }).toEqual({ code: 0, stderr: '' });
    const document = JSON.parse(stdout);
    expect(document).toMatchObject({
      status: 'optimal',
      objective: 'path',
      objectiveValue: optimum,
      bound: optimum,
      gapRatio: 0,
      stopReason: 'proved optimal',
      reason: null,
      engine: 'search + exact',
      seed: 1,
      size: 12,
    });
    expect(document.nodes).toBeGreaterThan(0);
    expect(qapValue(problem, locationsOf(document.placement))).toBe(optimum);
  });

  it('counts facilities and locations from 1, the first matrix being the facilities', () => {
    // Facilities 1 → 2 send 9 and 2 → 3 send 1; the short ways are from location 3 to 1 and from 1 to 2.
    const path = scratch('three.dat', '3\n0 9 0  0 0 1  0 0 0\n0 2 8  8 0 8  1 8 0\n');
    const { code, stdout } = run(path, '--seed', '7');
    expect(code).toBe(0);
    expect(JSON.parse(stdout)).toMatchObject({
      status: 'optimal',
      objectiveValue: 9 * 1 + 1 * 2,
      seed: 7,
      placement: { 1: 3, 2: 1, 3: 2 },
    });
  });

  it('ends with its best and a bound at the time limit', () => {
    const { code, stdout } = run('tests/reference/qaplib/bur26c.dat', '--time-limit-ms', '1000');
    const document = JSON.parse(stdout);
    expect(code).toBe(0);
    expect(document).toMatchObject({ status: 'feasible', stopReason: 'time limit' });
    expect(document.bound).toBeLessThanOrEqual(5426795);
    expect(document.objectiveValue).toBeGreaterThanOrEqual(5426795);
  });

  it('ends with its best on an interrupt', async () => {
    const child = spawn(process.execPath, [
      'scripts/pinloom.mjs',
      'qap',
      'tests/reference/qaplib/bur26c.dat',
    ]);
    let stdout = '';
    child.stdout.on('data', (part) => {
      stdout += part;
    });
    const code = new Promise((resolve) => child.once('exit', resolve));
    setTimeout(() => child.kill('SIGINT'), 5000);
    expect(await code).toBe(0);
    expect(JSON.parse(stdout)).toMatchObject({ status: 'feasible', stopReason: 'stopped' });
  });

  it('exits 2 with file:line:column and what was expected for a bad file', () => {
    const path = scratch('bad.dat', '2\n0 1\n1 0\n\n0 x\n1 0\n');
    const { code, stdout, stderr } = run(path);
    expect({ code, stdout }).toEqual({ code: 2, stdout: '' });
    expect(stderr).toBe(
      `${path}:5:3: second matrix, row 1, column 2: Found “x”. Expected: a whole number from -9007199254740991 to 9007199254740991.\n`,
    );
  });

  it('exits 2 with a sentence for matrices that fit no placement', () => {
    const path = scratch('wide.dat', `3\n${'0 100000 0  0 0 1  2 0 0\n'.repeat(2)}`);
    const { code, stderr } = run(path);
    expect(code).toBe(2);
    expect(stderr).toContain(`${path}:1:1: Both matrices`);
  });

  it.each([
    [[], /one file/],
    [['a.dat', 'b.dat'], /2 were given/],
    [['no-such-file.dat'], /no-such-file\.dat: cannot be read/],
    [['a.dat', '--seed', 'x'], /--seed/],
    [['a.dat', '--time-limit-ms', '0'], /--time-limit-ms/],
    [['a.dat', '--engine', 'highs'], /--engine/],
  ])('exits 2 for %j', (args, message) => {
    const { code, stdout, stderr } = run(...args);
    expect({ code, stdout }).toEqual({ code: 2, stdout: '' });
    expect(stderr).toMatch(message);
  });

  it('tells its options', () => {
    const { code, stdout } = run('--help');
    expect(code).toBe(0);
    for (const word of ['FILE.dat', '--time-limit-ms', '--seed', 'Exit codes'])
      expect(stdout).toContain(word);
  });
});
