import { readFileSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { commandLine } from '../../helpers/command-line';

const { run, scratch, fixture, chain, clear } = commandLine();

const weightsText = (nets: string): string =>
  `{"format": "pinloom.weights", "formatVersion": 1,\n "nets": {${nets}}}`;

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

  it('takes weights: the net of op_raw counts 10, the three others 1', () => {
    const weights = scratch('weights.json', weightsText('"op_raw": 10'));
    const { code, stdout } = run('place', ...chain, '--weights', weights);
    expect(code).toBe(0);
    expect(JSON.parse(stdout)).toMatchObject({
      status: 'optimal',
      objectiveValue: 13,
      bound: 13,
      weights: { nets: { op_raw: 10 } },
      metrics: { totalWireHops: 4 },
    });
  });

  it.each([
    [
      'a weight below 0',
      '"op_raw": -1',
      ':2:21: nets.op_raw: -1 cannot stand here: give a number of at least 0.',
    ],
    ['a weight without end', '"op_raw": 1e999', ':2:21: nets.op_raw: '],
    ['the net of an op that is not there', '"op_ghost": 2', ':2:12: A weight names the net of op_ghost,'],
  ])('exits 2 at the exact place for %s', (_, nets, place) => {
    const weights = scratch('wrong-weights.json', weightsText(nets));
    for (const command of [['place'], ['model', '--format', 'lp']]) {
      const { code, stdout, stderr } = run(...command, ...chain, '--weights', weights);
      expect({ code, stdout }).toEqual({ code: 2, stdout: '' });
      expect(stderr).toContain(`${weights}${place}`);
    }
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
  type Editable = Record<'placement' | 'pins' | 'routes' | 'provenance', Record<string, unknown>>;
  const [firstEdge] = JSON.parse(readFileSync(fixture('scale-and-clamp.kernel.json'), 'utf8')).edges.map(
    (edge: { id: string }) => edge.id,
  );
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

  it('gives figures by the weights of a file, or else by those that the mapping was made with', () => {
    const path = mapping((document) => {
      document.provenance = {
        by: 'solver',
        engine: 'exact',
        objective: 'path',
        weights: { edges: { [firstEdge]: 3 } },
        timeLimitMs: 1,
        seed: 1,
        status: 'optimal',
        objectiveValue: 6,
        bound: 6,
        elapsedMs: 1,
        changedByHand: false,
      };
    });
    const figures = (...more: string[]) =>
      JSON.parse(run('verify', ...chain, '--mapping', path, ...more).stdout);
    // One connection of 1 hop at 3 and three at 1.
    expect(figures()).toMatchObject({ totalPathHops: 4, weightedWireHops: 4, weightedPathHops: 6 });
    const weights = scratch('other-weights.json', weightsText('"op_raw": 0.5'));
    expect(figures('--weights', weights)).toMatchObject({ weightedWireHops: 3.5, weightedPathHops: 4 });
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
