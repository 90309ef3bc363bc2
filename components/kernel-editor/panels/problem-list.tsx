'use client';

import type { Problem } from '@/lib/graph';
import { useEditor, useKernelState } from '../store/editor-context';
import { problemsOf } from '../store/kernel-facts';
import { selectEdge, selectOps } from '../store/selection';

/** What keeps the kernel from being placed, and what may be a mistake. A click leads to the place. */
export function ProblemList() {
  const { store, canvas } = useEditor();
  const problems = useKernelState((state) => problemsOf(state.kernel));
  const goTo = (problem: Problem) => {
    const { select } = store.getState();
    const [edge] = problem.edgeIds;
    if (problem.code === 'cycleWithoutDistance' || edge === undefined) select(selectOps(problem.opIds));
    else select(selectEdge(edge));
    canvas.current?.reveal(problem.opIds);
    const [op] = problem.opIds;
    if (op !== undefined) canvas.current?.focus(op);
  };
  if (problems.length === 0) {
    return (
      <p className="p-3 text-sm text-quiet">
        <span aria-hidden="true">✓ </span>No problems: the kernel can be placed.
      </p>
    );
  }
  return (
    <ul aria-label="Problems" className="flex flex-col py-1">
      {problems.map((problem, i) => (
        <li key={`${i}-${problem.code}`}>
          <button
            type="button"
            className="flex w-full items-start gap-2 px-3 py-1.5 text-left text-sm hover:bg-indigo-wash"
            onClick={() => goTo(problem)}
          >
            <span
              className={`op-problem-${problem.severity} mt-0.5 grid size-4 flex-none place-items-center rounded-full text-xs font-bold`}
            >
              <span aria-hidden="true">!</span>
              <span className="sr-only">{problem.severity}: </span>
            </span>
            <span>{problem.message}</span>
          </button>
        </li>
      ))}
    </ul>
  );
}

/** "2 errors, 1 warning", or that there is none. */
export function problemSummary(problems: readonly Problem[]): string {
  const errors = problems.filter((problem) => problem.severity === 'error').length;
  const warnings = problems.length - errors;
  const parts = [
    errors === 0 ? '' : `${errors} ${errors === 1 ? 'error' : 'errors'}`,
    warnings === 0 ? '' : `${warnings} ${warnings === 1 ? 'warning' : 'warnings'}`,
  ].filter(Boolean);
  return parts.length === 0 ? 'no problems' : parts.join(', ');
}
