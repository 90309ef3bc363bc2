/**
 * Rates: most ops fire once an iteration; a reduction takes an operand each iteration and gives one result per vector,
 * and what is reckoned from such results fires once per vector as well. An op takes operands of one rate only.
 */
import type { Kernel, OpId } from './kernel';
import { indexKernel, type KernelIndex } from './kernel-index';
import { opSpec } from './op-catalog';
import { opName } from './ports';
import { errorProblem, type Problem } from './problem';

export type Rate = 'iteration' | 'vector';

/**
 * How often each op gives its result. An op gives one per vector when it is a reduction or when any operand of it comes
 * once per vector, over edges of any distance. Linear.
 */
export function resultRates(
  kernel: Kernel,
  { edgesOutOf }: KernelIndex = indexKernel(kernel),
): Map<OpId, Rate> {
  const rates = new Map<OpId, Rate>(kernel.ops.map((op) => [op.id, 'iteration']));
  const open = kernel.ops.filter((op) => opSpec(op.kind).yields === 'vector').map((op) => op.id);
  for (const id of open) rates.set(id, 'vector');
  for (let id = open.pop(); id !== undefined; id = open.pop()) {
    for (const edge of edgesOutOf.get(id) ?? []) {
      if (rates.get(edge.to) === 'vector') continue;
      rates.set(edge.to, 'vector');
      open.push(edge.to);
    }
  }
  return rates;
}

/** K12. */
export function checkRates(kernel: Kernel, index: KernelIndex): Problem[] {
  const rates = resultRates(kernel, index);
  return kernel.ops.flatMap((op): Problem[] => {
    const into = index.edgesInto.get(op.id) ?? [];
    if (opSpec(op.kind).yields === 'vector') return checkReduction(op.id, index, rates);
    if (rates.get(op.id) !== 'vector') return [];
    const eachIteration = into.filter((edge) => rates.get(edge.from) === 'iteration');
    const first = eachIteration[0];
    const perVector = into.find((edge) => rates.get(edge.from) === 'vector');
    if (first === undefined || perVector === undefined) return [];
    const [often, seldom] = [index.opById.get(first.from)!, index.opById.get(perVector.from)!];
    return [
      errorProblem(
        'rateMismatch',
        `${opName(op)} takes a value from ${opName(often)} each iteration and one from ${opName(seldom)} once per vector: give it operands of one rate.`,
        { opIds: [op.id], edgeIds: eachIteration.map((edge) => edge.id), port: first.port },
      ),
    ];
  });
}

function checkReduction(id: OpId, index: KernelIndex, rates: ReadonlyMap<OpId, Rate>): Problem[] {
  const op = index.opById.get(id)!;
  return (index.edgesInto.get(id) ?? []).flatMap((edge) => {
    const places = { opIds: [id], edgeIds: [edge.id], port: edge.port };
    // A connected fallback is reported with the connection's other faults.
    if (edge.port === 'fallback') return [];
    if (rates.get(edge.from) !== 'vector') return [];
    const source = index.opById.get(edge.from)!;
    const text = `${opName(op)} goes through a vector, but ${opName(source)} gives only one value per vector: connect a value of each iteration.`;
    return [errorProblem('rateMismatch', text, places)];
  });
}
