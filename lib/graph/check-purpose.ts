/** Rules of the whole: something is written, everything drawn serves it, and tables are not taken for shared. */
import type { Kernel, Op, OpId } from './kernel';
import type { KernelIndex } from './kernel-index';
import { opSpec } from './op-catalog';
import { opName } from './ports';
import { errorProblem, type Problem, warningProblem } from './problem';

const hasSideEffect = (op: Op): boolean => opSpec(op.kind).sideEffect;

/** K13 and K14. Without any side effect nothing can reach one: only that is said then. */
export function checkPurpose(kernel: Kernel, { edgesInto }: KernelIndex): Problem[] {
  const ends = kernel.ops.filter(hasSideEffect);
  if (ends.length === 0) {
    const text = 'The kernel writes nothing: add a store or a scratchpad write for its result.';
    return [errorProblem('noSideEffect', text)];
  }
  const used = new Set<OpId>(ends.map((op) => op.id));
  const open = [...used];
  for (let id = open.pop(); id !== undefined; id = open.pop()) {
    for (const edge of edgesInto.get(id) ?? []) {
      if (used.has(edge.from)) continue;
      used.add(edge.from);
      open.push(edge.from);
    }
  }
  return kernel.ops
    .filter((op) => !used.has(op.id))
    .map((op) =>
      warningProblem(
        'unused',
        `Nothing that is written depends on ${opName(op)}: connect its result or remove it.`,
        { opIds: [op.id] },
      ),
    );
}

/** K15. Tables that are only read may have any number of readers: each PE holds a copy. */
export function checkTables(kernel: Kernel): Problem[] {
  const usersOf = new Map<string, Op[]>();
  for (const op of kernel.ops) {
    if (opSpec(op.kind).group !== 'scratchpad' || !Object.hasOwn(op.params, 'table')) continue;
    const table = String(op.params.table);
    const users = usersOf.get(table);
    if (users === undefined) usersOf.set(table, [op]);
    else users.push(op);
  }
  return [...usersOf].flatMap(([table, users]) => {
    if (users.length < 2 || !users.some((op) => op.kind === 'scratchWrite')) return [];
    const names = users.map(opName).join(', ');
    return [
      warningProblem(
        'sharedTable',
        `${names} use the table ${table}, but a scratchpad is private to its PE, so none sees what another writes: use an array in memory, or give each its own table.`,
        { opIds: users.map((op) => op.id) },
      ),
    ];
  });
}
