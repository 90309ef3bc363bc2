/** `verify`: checks a mapping against its kernel and fabric and prints every broken rule. */
import { compileFabric } from '../../lib/fabric/compile';
import { measureMapping } from '../../lib/mapping/metrics';
import { verifyMapping } from '../../lib/mapping/verify';
import { readArguments } from './arguments';
import { printDocument, printFaults } from './print';
import { readFabric, readKernel, readMapping } from './read-document';
import { usage } from './usage';

export function verify(args: readonly string[]): 0 | 2 | 3 {
  const given = readArguments(args, ['kernel', 'fabric', 'mapping'] as const, [
    'kernel',
    'fabric',
    'mapping',
  ]);
  if (!given.ok) return printFaults(given.error);
  if (given.value.help) {
    process.stdout.write(usage);
    return 0;
  }
  const kernel = readKernel(given.value.kernel ?? '');
  const fabric = readFabric(given.value.fabric ?? '');
  const mapping = readMapping(given.value.mapping ?? '');
  if (!kernel.ok || !fabric.ok || !mapping.ok) {
    return printFaults([kernel, fabric, mapping].flatMap((part) => (part.ok ? [] : part.error)));
  }
  const { placement, routes, pins } = mapping.value;
  const violations = verifyMapping(kernel.value, fabric.value, { placement, routes, pins });
  const metrics = measureMapping(kernel.value, compileFabric(fabric.value), { placement, routes });
  printDocument({
    legal: violations.length === 0,
    violations,
    totalWireHops: metrics.totalWireHops,
    totalPathHops: metrics.totalPathHops,
    longestPathHops: metrics.longestPathHops,
    maxHops: metrics.maxHops,
  });
  return violations.length === 0 ? 0 : 3;
}
