/**
 * Whether a kernel is legal: the rules K1 to K15 of MODEL.md. The editor, the server, the importers and the solver use
 * this one validator. Linear in ops and edges, without recursion, so a kernel of 2,000 ops is checked at every change.
 */
import { checkEdges } from './check-edges';
import { checkOperands } from './check-operands';
import { checkParams } from './check-params';
import { checkPurpose, checkTables } from './check-purpose';
import { checkRates } from './check-rates';
import type { Kernel, Op } from './kernel';
import { indexKernel, type KernelIndex } from './kernel-index';
import { sameIterationCycles } from './order';
import { opName } from './ports';
import { errorProblem, type Problem } from './problem';

/** Every problem, errors first; an empty list means that the kernel can be placed. */
export function validateKernel(kernel: Kernel): Problem[] {
  const index = indexKernel(kernel);
  const found = [
    ...checkIds(kernel),
    ...checkEdges(kernel, index),
    ...kernel.ops.flatMap((op) => checkOperands(op, index.edgesInto.get(op.id) ?? [])),
    ...kernel.ops.flatMap(checkParams),
    ...checkCycles(kernel, index),
    ...checkRates(kernel, index),
    ...checkPurpose(kernel, index),
    ...checkTables(kernel),
  ];
  return [
    ...found.filter((problem) => problem.severity === 'error'),
    ...found.filter((problem) => problem.severity === 'warning'),
  ];
}

/** K1. */
function checkIds(kernel: Kernel): Problem[] {
  const problems: Problem[] = [];
  const seen = new Set<string>();
  for (const op of kernel.ops) {
    if (seen.has(op.id)) {
      problems.push(
        errorProblem('duplicateId', `Two ops have the id ${op.id}: give each op an id of its own.`, {
          opIds: [op.id],
        }),
      );
    }
    seen.add(op.id);
  }
  for (const edge of kernel.edges) {
    if (seen.has(edge.id)) {
      problems.push(
        errorProblem(
          'duplicateId',
          `Two connections have the id ${edge.id}: give each connection an id of its own.`,
          { edgeIds: [edge.id] },
        ),
      );
    }
    seen.add(edge.id);
  }
  return problems;
}

const NAMED_IN_CYCLE = 6;

/** K10. */
function checkCycles(kernel: Kernel, index: KernelIndex): Problem[] {
  return sameIterationCycles(kernel, index).map(({ opIds, edges }) => {
    const names = opIds.map((id) => opName(index.opById.get(id) as Op));
    const shown = names.length > NAMED_IN_CYCLE ? [...names.slice(0, NAMED_IN_CYCLE), '…'] : names;
    const text =
      names.length === 1
        ? `${shown[0]} waits for its own result of the same iteration`
        : `${shown.join(' → ')} → ${names[0]} wait for each other in the same iteration`;
    return errorProblem(
      'cycleWithoutDistance',
      `${text}: give one connection of the cycle a distance of at least 1.`,
      { opIds, edgeIds: edges.map((edge) => edge.id) },
    );
  });
}
