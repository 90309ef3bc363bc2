import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoKernels } from '@/db/seed/kernels';
import { writeKernelJson } from '@/lib/formats/kernel-json';
import type { Kernel } from '@/lib/graph/kernel';
import { commandLine } from '../../helpers/command-line';

const { run, scratch, fixture, chain, clear } = commandLine();

/** Nine ops whose optimum takes the exact search a few dozen nodes. */
const surgeKernel = demoKernels.find(({ slug }) => slug === 'surge-detector')?.kernel as Kernel;
const surge = [
  '--kernel',
  scratch('surge.kernel.json', writeKernelJson(surgeKernel)),
  '--fabric',
  fixture('hive.fabric.json'),
];

function placed(name: string, ...args: string[]) {
  const { stdout } = run('place', ...args);
  return { path: scratch(`${name}.placed.json`, stdout), document: JSON.parse(stdout) };
}

let chainPlaced: ReturnType<typeof placed>;
let surgePlaced: ReturnType<typeof placed>;
beforeAll(() => {
  // The first call may have to bundle.
  chainPlaced = placed('chain', ...chain);
  surgePlaced = placed('surge', ...surge);
}, 60_000);
afterAll(clear);

describe('pinloom prove', { timeout: 60_000 }, () => {
  const certificate = (document: object) => scratch('c.certificate.json', JSON.stringify(document));
  const prove = (...args: string[]) => {
    const { code, stdout, stderr } = run('prove', ...args);
    return { code, stderr, answer: stdout === '' ? null : JSON.parse(stdout) };
  };
  const mappingOf = (document: { placement: object; routes: object }) => ({
    format: 'pinloom.mapping',
    formatVersion: 1,
    name: 'answer',
    kernel: { name: 'k', version: null },
    fabric: { name: 'f', version: null },
    placement: document.placement,
    pins: {},
    routes: document.routes,
    provenance: { by: 'hand' },
  });

  it('agrees with what place has proved, nodes and levels included, and with its mapping', () => {
    const { path, document } = surgePlaced;
    expect(document.certificate).toMatchObject({ method: 'exact search', objectiveValue: 14 });
    expect(document.certificate.nodes).toBeGreaterThan(0);
    const mapping = scratch('answer.mapping.json', JSON.stringify(mappingOf(document)));
    const { code, stderr, answer } = prove(...surge, '--certificate', path, '--mapping', mapping);
    expect({ code, stderr }).toEqual({ code: 0, stderr: '' });
    expect(answer).toMatchObject({ agrees: true, differences: [] });
    expect(answer.compared).toEqual(expect.arrayContaining(['bound', 'nodes', 'levels', 'mapping']));
  });

  it('takes weights from the certificate', () => {
    const weights = scratch('w.json', '{"format":"pinloom.weights","formatVersion":1,"nets":{"op_raw":2.5}}');
    const { path, document } = placed('weighted', ...chain, '--weights', weights);
    expect(document.certificate).toMatchObject({ weights: { nets: { op_raw: 2.5 } }, objectiveValue: 5.5 });
    const mapping = scratch('weighted.mapping.json', JSON.stringify(mappingOf(document)));
    const { code, answer } = prove(...chain, '--certificate', path, '--mapping', mapping);
    expect({ code, agrees: answer.agrees }).toEqual({ code: 0, agrees: true });
    expect(prove(...chain, '--certificate', path, '--weights', weights).code).toBe(0);
    const others = scratch('v.json', '{"format":"pinloom.weights","formatVersion":1,"nets":{"op_raw":2}}');
    const other = prove(...chain, '--certificate', path, '--weights', others);
    expect(other.code).toBe(2);
    expect(other.stderr).toContain('This certificate is of another problem');
  });

  it('agrees with a proof that nothing fits, in a file of its own', () => {
    const given = [
      '--kernel',
      fixture('smoothing-filter.kernel.json'),
      '--fabric',
      fixture('hive.fabric.json'),
    ];
    const { document } = placed('given', ...given);
    const { code, answer } = prove(...given, '--certificate', certificate(document.certificate));
    expect({ code, agrees: answer.agrees }).toEqual({ code: 0, agrees: true });
  });

  it('takes pins and start from the certificate; other pins are another problem', () => {
    const pins = (tile: string) =>
      scratch(`${tile}.pins.json`, `{"format":"pinloom.pins","formatVersion":1,"pins":{"op_raw":"${tile}"}}`);
    const { path } = placed('pinned', ...chain, '--pins', pins('r3c0'));
    expect(prove(...chain, '--certificate', path).code).toBe(0);
    expect(prove(...chain, '--certificate', path, '--pins', pins('r3c0')).code).toBe(0);
    const other = prove(...chain, '--certificate', path, '--pins', pins('r2c0'));
    expect(other).toMatchObject({ code: 2, answer: null });
    expect(other.stderr).toContain('This certificate is of another problem');
  });

  it.each<[string, object, string]>([
    ['a better value', { objectiveValue: 13, bound: 13 }, 'objectiveValue'],
    ['fewer nodes', { nodes: 2, levels: [{ cutoff: 13, nodes: 2 }] }, 'nodes'],
    ['another outcome', { status: 'infeasible', objectiveValue: null, bound: null }, 'status'],
    ['another seed', { seed: 5, searchTries: 0 }, 'nodes'],
  ])('exits 1 where a certificate was changed to claim %s', (_, change, what) => {
    const { document } = surgePlaced;
    const forged = certificate({ ...document.certificate, ...change });
    const { code, answer } = prove(...surge, '--certificate', forged);
    expect({ code, agrees: answer.agrees }).toEqual({ code: 1, agrees: false });
    expect(answer.differences.map((one: { what: string }) => one.what)).toContain(what);
  });

  it('exits 1 where the mapping is not the answer: a route is gone, or it is longer', () => {
    const { path, document } = chainPlaced;
    const check = (mapping: object) => {
      const at = scratch('other.mapping.json', JSON.stringify(mapping));
      return prove(...chain, '--certificate', path, '--mapping', at);
    };
    const broken = check({ ...mappingOf(document), routes: {} });
    expect(broken).toMatchObject({ code: 1, answer: { agrees: false } });
    expect(JSON.stringify(broken.answer.differences)).toContain('R5');
    // Found for other pins, at 1 hop more than the certificate says.
    const pins = { op_raw: 'r3c0', op_level: 'r2c5' };
    const pinned = scratch(
      'far.pins.json',
      JSON.stringify({ format: 'pinloom.pins', formatVersion: 1, pins }),
    );
    const longer = placed('far', ...chain, '--pins', pinned).document;
    expect(longer.objectiveValue).toBeGreaterThan(4);
    const original = certificate(document.certificate);
    const at = scratch('longer.mapping.json', JSON.stringify(mappingOf(longer)));
    expect(prove(...chain, '--certificate', original, '--mapping', at)).toMatchObject({
      code: 1,
      answer: { differences: [{ what: 'mapping', certificate: 4, found: longer.objectiveValue }] },
    });
  });

  it('exits 1 where the time is not enough to prove it again', () => {
    const { path } = surgePlaced;
    const { code, answer } = prove(...surge, '--certificate', path, '--time-limit-ms', '1');
    expect(code).toBe(1);
    expect(answer.differences).toEqual([
      { what: 'status', certificate: 'optimal', found: 'unknown (time limit)' },
    ]);
  });

  it('exits 2 and says what is wrong with the certificate', () => {
    const { document } = chainPlaced;
    const fault = (text: string) => {
      const path = scratch('faulty.certificate.json', text);
      const { code, stderr, answer } = prove(...chain, '--certificate', path);
      expect({ code, answer }).toEqual({ code: 2, answer: null });
      return stderr.replaceAll(path, 'C');
    };
    const text = JSON.stringify(document.certificate);
    expect(fault(text.slice(0, -1))).toMatch(/^C:1:\d+: Found the end of the text/);
    expect(fault(text.replace('"formatVersion":1', '"formatVersion":2'))).toMatch(
      /^C:1:\d+: formatVersion: 2 cannot stand here: give 1\. Certificates of other versions cannot be read\.[^\n]*\n$/,
    );
    expect(fault(text.replace('"bound":4', '"bound":3'))).toContain('bound of a proved answer equals');
    expect(fault('{"format":"pinloom.pins","formatVersion":1,"pins":{}}')).toContain('"pinloom.certificate"');
    expect(fault('{"status":"feasible","certificate":null}')).toContain('Nothing was proved');
    const otherFabric = [
      '--kernel',
      fixture('scale-and-clamp.kernel.json'),
      '--fabric',
      fixture('gauge.fabric.json'),
    ];
    const { code, stderr } = run('prove', ...otherFabric, '--certificate', certificate(document.certificate));
    expect(code).toBe(2);
    expect(stderr).toContain('This certificate is of another problem');
  });

  it.each([
    [['prove', ...chain], /--certificate is missing/],
    [['prove', ...chain, '--certificate', 'no-such-file.json'], /no-such-file\.json/],
    [['prove', ...chain, '--certificate', 'c.json', '--time-limit-ms', 'long'], /--time-limit-ms/],
  ])('exits 2 for %j', (args, message) => {
    const { code, stdout, stderr } = run(...args);
    expect({ code, stdout }).toEqual({ code: 2, stdout: '' });
    expect(stderr).toMatch(message);
  });
});
