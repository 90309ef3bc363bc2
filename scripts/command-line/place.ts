/** `place`: solves and prints the outcome. */
import { err, ok, type Result } from '../../lib/result';
import type { PlacementProblem } from '../../lib/solver/problem';
import { readAnotherThan } from './another-than';
import { readArguments } from './arguments';
import { printDocument, printFaults } from './print';
import type { Faults } from './read-document';
import { type GivenProblem, readProblem } from './read-problem';
import { optionNames, outcomeDocument, readOptions, withSolver } from './solve';
import { usage } from './usage';

const names = ['kernel', 'fabric', 'pins', 'objective', 'weights', ...optionNames] as const;

export async function place(args: readonly string[]): Promise<0 | 2 | 3 | 4> {
  const given = readArguments(args, names, ['kernel', 'fabric'], ['another-than']);
  if (!given.ok) return printFaults(given.error);
  if (given.value.help) {
    process.stdout.write(usage);
    return 0;
  }
  const options = readOptions(given.value);
  const problem = readWhole(given.value, given.value['another-than'] ?? []);
  if (!options.ok || !problem.ok) {
    return printFaults([...(options.ok ? [] : options.error), ...(problem.ok ? [] : problem.error)]);
  }
  const solved = await withSolver(given.value, options.value, (solve) => solve(problem.value));
  if (!solved.ok) return printFaults(solved.error);
  printDocument(outcomeDocument(problem.value, solved.value));
  return solved.value.status === 'infeasible' ? 3 : solved.value.status === 'unknown' ? 4 : 0;
}

function readWhole(given: GivenProblem, anotherThan: readonly string[]): Result<PlacementProblem, Faults> {
  const problem = readProblem(given);
  if (!problem.ok || anotherThan.length === 0) return problem;
  const another = readAnotherThan(problem.value, anotherThan);
  return another.ok ? ok({ ...problem.value, another: another.value }) : err(another.error);
}
