import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { weightsSchema } from '@/lib/mapping/weights';
import {
  apart,
  type Case,
  chain,
  fabricOf,
  fan,
  hopLimit,
  kernelOf,
  textOf,
} from '../solver/integer-program/exported-cases';

describe('pinloom model', { timeout: 60_000 }, () => {
  const folder = mkdtempSync(join(tmpdir(), 'pinloom-model-cli-'));
  afterAll(() => rmSync(folder, { recursive: true }));
  const scratch = (name: string, content: string | object): string => {
    const path = join(folder, name);
    writeFileSync(path, typeof content === 'string' ? content : JSON.stringify(content, null, 2));
    return path;
  };
  const run = (...args: string[]) => {
    const done = spawnSync(process.execPath, ['scripts/pinloom.mjs', ...args], { encoding: 'utf8' });
    return { code: done.status, stdout: done.stdout, stderr: done.stderr };
  };
  const kernel = scratch('kernel.json', chain);
  const fabric = scratch('fabric.json', fabricOf('mam aam', hopLimit(2)));
  const pins = scratch('pins.json', { format: 'pinloom.pins', formatVersion: 1, pins: apart });
  const small = ['--kernel', kernel, '--fabric', fabric];

  it.each([
    ['lp', /^\\ Pinloom[\s\S]*\nEnd\n$/],
    ['mps', /^\* Pinloom[\s\S]*\nENDATA\n$/],
  ] as const)('prints the %s text and nothing else', (format, form) => {
    const one: Case = ['', 3, chain, fabricOf('mam aam', hopLimit(2)), apart, 'path'];
    const printed = run('model', ...small, '--pins', pins, '--objective', 'path', '--format', format);
    expect(printed).toEqual({ code: 0, stdout: textOf(one, format), stderr: '' });
    expect(printed.stdout).toMatch(form);
  });

  it('takes weights into the objective, and says so at the head', () => {
    const weights = { edges: { edge_0: 2.5 } };
    const file = scratch('weights.json', { format: 'pinloom.weights', formatVersion: 1, ...weights });
    const one: Case = [
      '',
      3,
      chain,
      fabricOf('mam aam', hopLimit(2)),
      {},
      'path',
      weightsSchema.parse(weights),
    ];
    const { stdout } = run('model', ...small, '--objective', 'path', '--weights', file, '--format', 'lp');
    expect(stdout).toBe(textOf(one, 'lp'));
    expect(stdout).toContain('each by its weight, 1 but for\n\\   edge_0 counts 2.5\n');
    expect(stdout).toMatch(/2\.5 flow\.net_op_in\.op_abs/);
  });

  it('takes wire where no objective is given', () => {
    const one: Case = ['', 2, chain, fabricOf('mam aam', hopLimit(2)), {}, 'wire'];
    expect(run('model', ...small, '--format', 'mps').stdout).toBe(textOf(one, 'mps'));
  });

  const broken = scratch('broken.json', '{\n  "format": "pinloom.kernel",\n  oops\n}');
  const undriven = scratch('undriven.json', { ...chain, edges: chain.edges.slice(1) });
  const strange = scratch('strange.json', {
    format: 'pinloom.pins',
    formatVersion: 1,
    pins: { op_in: 'r7c7', op_else: 'r0c0' },
  });
  it.each([
    ['broken JSON', ['--kernel', broken, '--fabric', fabric], /broken\.json:3:3: /],
    ['a kernel that breaks a rule', ['--kernel', undriven, '--fabric', fabric], /undriven\.json:\d+:\d+: /],
    ['an unknown objective', [...small, '--objective', 'area'], /--objective: one of wire, path/],
    [
      'pins of what does not exist',
      [...small, '--pins', strange],
      /strange\.json:\d+:\d+: .*r7c7[\s\S]*op_else/,
    ],
  ])('refuses %s as place does, with exit code 2', (_, args, message) => {
    const refused = run('model', ...args, '--format', 'lp');
    expect(refused).toMatchObject({ code: 2, stdout: '' });
    expect(refused.stderr).toMatch(message);
    expect(refused).toEqual(run('place', ...args));
  });

  it('refuses a missing or unknown format', () => {
    expect(run('model', ...small)).toEqual({ code: 2, stdout: '', stderr: '--format is missing\n' });
    const unknown = run('model', ...small, '--format', 'xls');
    expect(unknown).toEqual({ code: 2, stdout: '', stderr: '--format: one of lp, mps\n' });
  });

  const stores = Array.from({ length: 20 }, (_, i) => `out${i}`);
  const manyStores = kernelOf(
    { in: 'load', ...Object.fromEntries(stores.map((name) => [name, 'store' as const])) },
    stores.map((name) => `in>${name}:value`),
  );
  it.each([
    ['16128 links for a net and 20 connections', manyStores, {}, /21 ops on 4096 tiles/],
    ['most of 4096² pairs of tiles more than 20 hops apart', fan, hopLimit(20), /3 ops on 4096 tiles/],
  ])('refuses what would be too large to print: %s', (_, large, clock, message) => {
    const wide = fabricOf(Array.from({ length: 64 }, () => 'm'.repeat(64)).join(' '), clock);
    const files = ['--kernel', scratch('large.json', large), '--fabric', scratch('wide.json', wide)];
    const refused = run('model', ...files, '--format', 'lp');
    expect(refused).toMatchObject({ code: 2, stdout: '' });
    expect(refused.stderr).toMatch(/large\.json:1:1: .*too large to print: use a smaller/);
    expect(refused.stderr).toMatch(message);
  });

  it('is in the help', () => {
    expect(run('--help').stdout).toContain('pinloom -- model');
    expect(run('model', '--help')).toMatchObject({ code: 0, stderr: '' });
  });
});
