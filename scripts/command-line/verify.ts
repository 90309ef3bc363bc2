/** `verify`: checks a mapping against its kernel and fabric and prints every broken rule. */
import { compileFabric } from '../../lib/fabric/compile';
import { measureMapping, objectiveOf } from '../../lib/mapping/metrics';
import { verifyMapping } from '../../lib/mapping/verify';
import { weightFaults } from '../../lib/mapping/weights';
import { readArguments } from './arguments';
import { printDocument, printFaults } from './print';
import { readFabric, readKernel, readMapping, readWeights } from './read-document';
import { inputFaultLine } from './read-problem';
import { usage } from './usage';

export function verify(args: readonly string[]): 0 | 2 | 3 {
  const given = readArguments(args, ['kernel', 'fabric', 'mapping', 'weights'] as const, [
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
  const asked = given.value.weights === undefined ? null : readWeights(given.value.weights);
  if (!kernel.ok || !fabric.ok || !mapping.ok || asked?.ok === false) {
    const parts = [kernel, fabric, mapping, ...(asked ? [asked] : [])];
    return printFaults(parts.flatMap((part) => (part.ok ? [] : part.error)));
  }
  const unknown = weightFaults(kernel.value, asked?.value ?? {});
  if (unknown.length > 0) {
    return printFaults(unknown.map((fault) => inputFaultLine(given.value, { part: 'weights', ...fault })));
  }
  const { placement, routes, pins, provenance } = mapping.value;
  const weights = asked?.value ?? (provenance.by === 'solver' ? provenance.weights : undefined);
  const violations = verifyMapping(kernel.value, fabric.value, { placement, routes, pins });
  const metrics = measureMapping(kernel.value, compileFabric(fabric.value), { placement, routes });
  printDocument({
    legal: violations.length === 0,
    violations,
    totalWireHops: metrics.totalWireHops,
    totalPathHops: metrics.totalPathHops,
    weightedWireHops: objectiveOf(metrics, 'wire', weights),
    weightedPathHops: objectiveOf(metrics, 'path', weights),
    longestPathHops: metrics.longestPathHops,
    maxHops: metrics.maxHops,
  });
  return violations.length === 0 ? 0 : 3;
}
