import { readFileSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { commandLine } from '../../helpers/command-line';

const { run, scratch, fixture, chain, clear } = commandLine();

beforeAll(() => {
  // The first call may have to bundle.
  run('--help');
}, 60_000);
afterAll(clear);

describe('pinloom place', { timeout: 60_000 }, () => {
  it('prints one JSON document and nothing else, and exits 0', () => {
    const { code, stdout, stderr } = run('place', ...chain);
    expect({ code, stderr }).toEqual({ code: 0, stderr: '' });
    expect(JSON.parse(stdout)).toMatchObject({
      status: 'optimal',
      objective: 'wire',
      objectiveValue: 4,
      bound: 4,
      reason: null,
      metrics: { totalWireHops: 4, placedOps: 5 },
    });
  });

  it('reads DOT, pins and the objective path', () => {
    const pins = scratch('pins.json', '{"format":"pinloom.pins","formatVersion":1,"pins":{"op_raw":"r3c0"}}');
    const kernel = fixture('scale-and-clamp.kernel.dot');
    const { code, stdout } = run(
      'place',
      '--kernel',
      kernel,
      '--fabric',
      fixture('hive.fabric.json'),
      '--pins',
      pins,
      '--objective',
      'path',
    );
    expect(code).toBe(0);
    expect(JSON.parse(stdout)).toMatchObject({ objective: 'path', placement: { op_raw: 'r3c0' } });
  });

  it('exits 3 with the reason as JSON where nothing fits', () => {
    const { code, stdout, stderr } = run(
      'place',
      '--kernel',
      fixture('smoothing-filter.kernel.json'),
      '--fabric',
      fixture('hive.fabric.json'),
    );
    expect({ code, stderr }).toEqual({ code: 3, stderr: '' });
    expect(JSON.parse(stdout)).toMatchObject({
      status: 'infeasible',
      reason: { code: 'too few tiles' },
      placement: null,
    });
  });

  it('exits 2 with file:line:column on standard error for broken JSON', () => {
    const broken = scratch('broken.json', '{\n  "format": "pinloom.kernel",\n  oops\n}');
    const { code, stdout, stderr } = run(
      'place',
      '--kernel',
      broken,
      '--fabric',
      fixture('hive.fabric.json'),
    );
    expect({ code, stdout }).toEqual({ code: 2, stdout: '' });
    expect(stderr).toContain(`${broken}:3:3: `);
  });

  it('exits 2 and points at the op of a kernel that breaks a rule', () => {
    const kernel = JSON.parse(readFileSync(fixture('scale-and-clamp.kernel.json'), 'utf8'));
    kernel.edges.pop();
    const path = scratch('undriven.json', JSON.stringify(kernel, null, 2));
    const { code, stdout, stderr } = run('place', '--kernel', path, '--fabric', fixture('hive.fabric.json'));
    expect({ code, stdout }).toEqual({ code: 2, stdout: '' });
    expect(stderr).toMatch(/undriven\.json:\d+:\d+: /);
    expect(stderr).not.toContain(':1:1:');
  });

  it.each([
    [['place'], /--kernel is missing/],
    [['place', ...chain, '--objective', 'area'], /--objective/],
    [['place', ...chain, '--time-limit-ms', 'soon'], /--time-limit-ms/],
    [['place', ...chain, '--node-limit', '0'], /--node-limit/],
    [['place', ...chain, '--node-limit', 'few'], /--node-limit/],
    [['place', ...chain, '--node-limit', '9', '--engine', 'program'], /--node-limit: .* engine auto/],
    [['place', ...chain, '--colour', 'red'], /--colour/],
    [
      ['place', '--kernel', 'no-such-file.json', '--fabric', fixture('hive.fabric.json')],
      /no-such-file\.json/,
    ],
    [['weave'], /no command weave/],
  ])('exits 2 for %j', (args, message) => {
    const { code, stdout, stderr } = run(...args);
    expect({ code, stdout }).toEqual({ code: 2, stdout: '' });
    expect(stderr).toMatch(message);
  });

  it('exits 4 where the time is over before anything is found', () => {
    const { code, stdout } = run('place', ...chain, '--time-limit-ms', '1');
    expect(code).toBe(4);
    expect(JSON.parse(stdout)).toMatchObject({
      status: 'unknown',
      stopReason: 'time limit',
      placement: null,
    });
  });
});

describe('pinloom verify', { timeout: 60_000 }, () => {
  type Editable = Record<'placement' | 'pins' | 'routes', Record<string, unknown>>;
  const mapping = (change: (document: Editable) => void): string => {
    const placed = JSON.parse(run('place', ...chain).stdout);
    const document = {
      format: 'pinloom.mapping',
      formatVersion: 1,
      name: 'checked',
      kernel: { name: 'k', version: null },
      fabric: { name: 'f', version: null },
      placement: placed.placement,
      pins: {},
      routes: placed.routes,
      provenance: { by: 'hand' },
    };
    change(document);
    return scratch('mapping.json', JSON.stringify(document));
  };

  it('exits 0 for what place has printed', () => {
    const { code, stdout } = run(
      'verify',
      ...chain,
      '--mapping',
      mapping(() => undefined),
    );
    expect(code).toBe(0);
    expect(JSON.parse(stdout)).toMatchObject({ legal: true, violations: [], totalWireHops: 4 });
  });

  it('exits 3 and names R5 for a route that is gone, R4 for a pin that is not kept', () => {
    const path = mapping((document) => {
      delete document.routes.op_raw;
      document.pins = { op_gain: 'r0c0' };
    });
    const { code, stdout } = run('verify', ...chain, '--mapping', path);
    expect(code).toBe(3);
    const rules = JSON.parse(stdout).violations.map((violation: { rule: string }) => violation.rule);
    expect(rules).toEqual(expect.arrayContaining(['R4', 'R5']));
  });
});

describe('pinloom --help', () => {
  it('tells all commands and the exit codes', () => {
    const { code, stdout } = run('--help');
    expect(code).toBe(0);
    for (const word of ['place', 'verify', 'prove', 'Exit codes']) expect(stdout).toContain(word);
  });
});
