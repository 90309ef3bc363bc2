import { expect, test } from 'vitest';
import { fabricFileName, kernelFileName, mappingFileName } from '@/lib/formats/file-names';

test.each([
  [kernelFileName('Gauge: scale & clamp', 3, 'kernel.json'), 'gauge-scale-clamp-v3.kernel.json'],
  [kernelFileName('Été', null, 'dot'), 'e-te.dot'],
  [kernelFileName('織', 1, 'kernel.json'), 'kernel-v1.kernel.json'],
  [fabricFileName('Hive, 6 × 6', 2), 'hive-6-x-6-v2.fabric.json'],
  [fabricFileName('"\r\n', null), 'fabric.fabric.json'],
  [mappingFileName('../Best one', 'certificate.json'), 'best-one.certificate.json'],
  [mappingFileName(' ', 'svg'), 'mapping.svg'],
])('%s', (name, expected) => {
  expect(name).toBe(expected);
});
