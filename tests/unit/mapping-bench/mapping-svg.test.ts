import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { certificateSchema } from '@/lib/mapping/certificate';
import { honestProvenance } from '@/lib/mapping/honest-provenance';
import { mappingSvg, PICTURE_CAUTION } from '@/lib/mapping/picture/mapping-svg';
import { picturePalette } from '@/lib/mapping/picture/picture-palette';
import { escapeXml } from '@/lib/mapping/picture/svg-text';
import { sampleCertificate } from '../../helpers/sample-certificate';
import { fabric, kernel, newStore, placeAll } from './bench-fixture';

function smallMapping(name: string) {
  const store = newStore();
  placeAll(store);
  return {
    format: 'pinloom.mapping' as const,
    formatVersion: 1 as const,
    name,
    kernel: { name: kernel.name, version: 1 },
    fabric: { name: fabric.name, version: 2 },
    ...store.getState().content,
  };
}

test('the picture tells name, versions, figures and the caution, with markup in names escaped', () => {
  const svg = mappingSvg(smallMapping('A < B & "C"'), kernel, fabric);
  expect(svg).toContain('A &lt; B &amp; &quot;C&quot;');
  expect(svg).toContain('Product and sum, version 1 on Three by three, version 2');
  expect(svg).toContain('wire hops 5 · path hops 6 · longest path 2 of 7');
  expect(svg).toContain(PICTURE_CAUTION);
  expect(svg).not.toContain('var(');
});

test('the picture has one thread for each net', () => {
  const svg = mappingSvg(smallMapping('m'), kernel, fabric);
  expect(svg.match(/stroke-width="2.2"/g)).toHaveLength(4);
});

test('control characters, which XML 1.0 cannot hold, are left out', () => {
  expect(escapeXml('a\u0000b\u001fc')).toBe('abc');
});

test('the palette has the values of the light theme', () => {
  const css = readFileSync('app/globals.css', 'utf8');
  const light = (name: string) => new RegExp(`--${name}: light-dark\\((#[0-9a-f]{6})`).exec(css)?.[1];
  const { threads, ...colours } = picturePalette;
  for (const [name, value] of Object.entries(colours)) {
    expect([name, light(name.replace(/[A-Z]/g, (letter) => `-${letter.toLowerCase()}`))]).toEqual([
      name,
      value,
    ]);
  }
  expect(threads.map((_, i) => light(`thread-${i + 1}`))).toEqual([...threads]);
});

test('a claim of the solver’s work stands only for what a solve has found', () => {
  const { placement } = smallMapping('m');
  const solved = {
    by: 'solver' as const,
    engine: 'search',
    objective: 'wire' as const,
    timeLimitMs: 5000,
    seed: 1,
    status: 'optimal' as const,
    objectiveValue: 5,
    bound: 5,
    elapsedMs: 9,
    changedByHand: false,
  };
  expect(honestProvenance(solved, placement, [])).toEqual({ by: 'hand' });
  expect(honestProvenance(solved, placement, [{ provenance: solved, placement }])).toEqual(solved);
  expect(honestProvenance(solved, {}, [{ provenance: solved, placement }])).toEqual({
    ...solved,
    changedByHand: true,
  });
  const tighter = { ...solved, bound: 4 };
  expect(honestProvenance(tighter, placement, [{ provenance: solved, placement }])).toEqual({ by: 'hand' });
  const better = { ...solved, objectiveValue: 3, bound: 3 };
  expect(honestProvenance(better, placement, [{ provenance: solved, placement }])).toEqual({ by: 'hand' });
});

test('of solves with the same figures the certificate tells which one is meant', () => {
  const { placement } = smallMapping('m');
  const made = (digit: string) => ({
    by: 'solver' as const,
    engine: 'search',
    objective: 'wire' as const,
    timeLimitMs: 5000,
    seed: 1,
    status: 'optimal' as const,
    objectiveValue: 5,
    bound: 5,
    elapsedMs: 9,
    changedByHand: false,
    certificate: certificateSchema.parse(sampleCertificate({ problemDigest: `sha256:${digit.repeat(64)}` })),
  });
  const known = ['0', '1', '2'].map((digit) => ({ provenance: made(digit), placement }));
  expect(honestProvenance(made('1'), placement, known)).toEqual(made('1'));
  // Only the solver's own certificates are stored: of an unknown one nothing is taken over.
  expect(honestProvenance(made('9'), placement, known)).toEqual(made('0'));
  const forged = { ...made('1'), certificate: { ...made('1').certificate, nodes: 1e6 } };
  expect(honestProvenance(forged, placement, known)).toEqual(made('1'));
});
