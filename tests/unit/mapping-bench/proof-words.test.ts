import { expect, test } from 'vitest';
import { methodSentence, proveCommand, repeatSentence } from '@/components/mapping-bench/solve/proof-words';
import { type Certificate, proofMethods } from '@/lib/mapping/certificate';

const certificate = (more: Partial<Certificate>): Certificate => ({
  format: 'pinloom.certificate',
  formatVersion: 1,
  engineVersion: 1,
  problemDigest: `sha256:${'0'.repeat(64)}`,
  objective: 'wire',
  pins: {},
  start: null,
  engine: 'auto',
  seed: 1,
  searchTries: 1,
  status: 'optimal',
  objectiveValue: 5,
  bound: 5,
  method: 'counting',
  nodes: 0,
  levels: [],
  struckTiles: 0,
  isRepeatable: true,
  ...more,
});

test('each method has a sentence of its own, for an optimum and for none', () => {
  const none = { status: 'infeasible', objectiveValue: null, bound: null } as const;
  const sentences = proofMethods.flatMap((method) => [
    methodSentence(certificate({ method })),
    methodSentence(certificate({ method, ...none })),
  ]);
  expect(new Set(sentences).size).toBe(2 * proofMethods.length);
  expect(methodSentence(certificate({ objective: 'path' }))).toContain('path hops');
});

test('levels are spoken of only where there are any', () => {
  const method = 'exact search';
  expect(methodSentence(certificate({ method }))).toContain('no level had to be searched');
  expect(methodSentence(certificate({ method, nodes: 2, levels: [{ cutoff: 4, nodes: 2 }] }))).toContain(
    'level by level',
  );
});

test('the same nodes are promised only where nothing but counts decided', () => {
  expect(repeatSentence(certificate({}))).toContain('same nodes');
  expect(repeatSentence(certificate({ isRepeatable: false }))).toContain('need not');
});

test('the command names the files, the mapping only where one is kept', () => {
  const files = { kernel: 'k.kernel.json', fabric: 'f.fabric.json', certificate: 'm.certificate.json' };
  expect(proveCommand({ ...files, mapping: null })).toBe(
    'npm run -s pinloom -- prove --kernel k.kernel.json --fabric f.fabric.json --certificate m.certificate.json',
  );
  expect(proveCommand({ ...files, mapping: 'm.json' })).toMatch(/ --mapping m\.json$/);
});
