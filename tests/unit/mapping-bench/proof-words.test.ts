import { expect, test } from 'vitest';
import { methodSentence, proveCommand, repeatSentence } from '@/components/mapping-bench/solve/proof-words';
import { proofMethods } from '@/lib/mapping/certificate';
import { sampleCertificate } from '../../helpers/sample-certificate';

test('each method has a sentence of its own, for an optimum and for none', () => {
  const none = { status: 'infeasible', objectiveValue: null, bound: null } as const;
  const sentences = proofMethods.flatMap((method) => [
    methodSentence(sampleCertificate({ method })),
    methodSentence(sampleCertificate({ method, ...none })),
  ]);
  expect(new Set(sentences).size).toBe(2 * proofMethods.length);
  expect(methodSentence(sampleCertificate({ objective: 'path' }))).toContain('path hops');
});

test('levels are spoken of only where there are any', () => {
  const method = 'exact search';
  expect(methodSentence(sampleCertificate({ method }))).toContain('no level had to be searched');
  expect(
    methodSentence(sampleCertificate({ method, nodes: 2, levels: [{ cutoff: 4, nodes: 2 }] })),
  ).toContain('level by level');
});

test('the same nodes are promised only where nothing but counts decided', () => {
  expect(repeatSentence(sampleCertificate({}))).toContain('same nodes');
  expect(repeatSentence(sampleCertificate({ isRepeatable: false }))).toContain('need not');
});

test('the command names the files, the mapping only where one is kept', () => {
  const files = { kernel: 'k.kernel.json', fabric: 'f.fabric.json', certificate: 'm.certificate.json' };
  expect(proveCommand({ ...files, mapping: null })).toBe(
    'npm run -s pinloom -- prove --kernel k.kernel.json --fabric f.fabric.json --certificate m.certificate.json',
  );
  expect(proveCommand({ ...files, mapping: 'm.json' })).toMatch(/ --mapping m\.json$/);
});
