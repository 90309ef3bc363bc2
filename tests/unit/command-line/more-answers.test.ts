import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoKernels } from '@/db/seed/kernels';

const folder = mkdtempSync(join(tmpdir(), 'pinloom-more-'));
const scratch = (name: string, document: unknown): string => {
  const path = join(folder, name);
  writeFileSync(path, typeof document === 'string' ? document : JSON.stringify(document));
  return path;
};
const run = (...args: string[]) => {
  const done = spawnSync(process.execPath, ['scripts/pinloom.mjs', ...args], { encoding: 'utf8' });
  return { code: done.status, stdout: done.stdout, stderr: done.stderr };
};
const hive = 'tests/fixtures/solver/hive.fabric.json';
const surge = [
  '--kernel',
  scratch('surge.json', demoKernels.find(({ slug }) => slug === 'surge-detector')?.kernel),
  '--fabric',
  hive,
];
const scale = ['--kernel', 'tests/fixtures/solver/scale-and-clamp.kernel.json', '--fabric', hive];
const pinsFile = (name: string, pins: object) =>
  scratch(name, { format: 'pinloom.pins', formatVersion: 1, pins });

beforeAll(() => {
  // The first call may have to bundle.
  run('--help');
}, 60_000);
afterAll(() => rmSync(folder, { recursive: true }));

describe('pinloom place --another-than', { timeout: 60_000 }, () => {
  it('takes what place has printed, and mapping documents, again and again', () => {
    const first = scratch('first.json', run('place', ...surge).stdout);
    const second = run('place', ...surge, '--another-than', first);
    expect(second.code).toBe(0);
    const other = JSON.parse(second.stdout);
    expect(other.objectiveValue).toBe(14);
    const document = {
      format: 'pinloom.mapping',
      formatVersion: 1,
      name: 'the second',
      kernel: { name: 'k', version: null },
      fabric: { name: 'f', version: null },
      placement: other.placement,
      pins: {},
      routes: other.routes,
      provenance: { by: 'hand' },
    };
    const both = ['--another-than', first, '--another-than', scratch('second.json', document)];
    const third = JSON.parse(run('place', ...surge, ...both).stdout);
    expect(third.objectiveValue).toBe(14);
    expect(third.placement).not.toEqual(other.placement);
  });

  it('exits 3 where there is no other: scale and clamp has one placement of 4 hops but for mirror images', () => {
    const first = scratch('only.json', run('place', ...scale).stdout);
    const { code, stdout } = run('place', ...scale, '--another-than', first);
    expect(code).toBe(3);
    expect(JSON.parse(stdout)).toMatchObject({ status: 'infeasible', reason: { code: 'no other' } });
  });

  it('exits 2 for a mapping that breaks a rule, and for a file that is none', () => {
    const printed = JSON.parse(run('place', ...scale).stdout);
    const unrouted = scratch('unrouted.json', { ...printed, routes: {} });
    const illegal = run('place', ...scale, '--another-than', unrouted);
    expect({ code: illegal.code, stdout: illegal.stdout }).toEqual({ code: 2, stdout: '' });
    expect(illegal.stderr).toMatch(/unrouted\.json:1:1: not a legal mapping of this kernel: R5/);
    const none = run('place', ...scale, '--another-than', scratch('none.json', '{"status": 1}'));
    expect(none.code).toBe(2);
    expect(none.stderr).toMatch(/none\.json:1:1: .*placement/);
  });
});

describe('pinloom pin-price', { timeout: 60_000 }, () => {
  it('of the load far from the multipliers: 4 hops without the pin, and what the pinned chain needs beyond', () => {
    // op_raw in the corner; the nearest multiplier and the ops after it are found by the solver, so the law is checked.
    const pins = pinsFile('raw.json', { op_raw: 'r0c0' });
    const { code, stdout } = run('pin-price', ...scale, '--pins', pins, '--op', 'op_raw');
    expect(code).toBe(0);
    const printed = JSON.parse(stdout);
    expect(printed).toMatchObject({
      op: 'op_raw',
      tile: 'r0c0',
      objective: 'wire',
      price: { kind: 'exact' },
    });
    expect(printed.withoutPin).toMatchObject({ status: 'optimal', objectiveValue: 4 });
    expect(printed.withPin).toMatchObject({ status: 'optimal', placement: { op_raw: 'r0c0' } });
    expect(printed.price.hops).toBe(printed.withPin.objectiveValue - 4);
  });

  it('exits 3 where the pin makes it infeasible: a load on an arithmetic unit', () => {
    const pins = pinsFile('wrong.json', { op_raw: 'r2c2' });
    const { code, stdout } = run('pin-price', ...scale, '--pins', pins, '--op', 'op_raw');
    expect(code).toBe(3);
    expect(JSON.parse(stdout)).toMatchObject({
      price: { kind: 'makes infeasible' },
      withPin: { reason: { code: 'pin conflict' } },
      withoutPin: { objectiveValue: 4 },
    });
  });

  it('exits 4 where nothing is found in the time', () => {
    const pins = pinsFile('short.json', { op_raw: 'r0c0' });
    const short = run('pin-price', ...scale, '--pins', pins, '--op', 'op_raw', '--time-limit-ms', '1');
    expect(short.code).toBe(4);
    expect(JSON.parse(short.stdout).price).toEqual({ kind: 'unknown' });
  });

  it('exits 2 for an op without a pin', () => {
    const pins = pinsFile('other.json', { op_raw: 'r0c0' });
    const { code, stdout, stderr } = run('pin-price', ...scale, '--pins', pins, '--op', 'op_gain');
    expect({ code, stdout }).toEqual({ code: 2, stdout: '' });
    expect(stderr).toMatch(/--op: .*other\.json has no pin for op_gain/);
  });
});
