/** `pin-price`: solves with and without one pin and prints what it costs. */
import type { OpId } from '../../lib/graph/kernel';
import type { SolveOutcome } from '../../lib/solver/outcome';
import { type PinPrice, pinPrice } from '../../lib/solver/pin-price';
import type { PlacementProblem } from '../../lib/solver/problem';
import { readArguments } from './arguments';
import { printDocument, printFaults } from './print';
import { readProblem } from './read-problem';
import { optionNames, outcomeDocument, readOptions, withSolver } from './solve';
import { usage } from './usage';

const names = ['kernel', 'fabric', 'pins', 'op', 'objective', 'weights', ...optionNames] as const;

export async function printPinPrice(args: readonly string[]): Promise<0 | 2 | 3 | 4> {
  const given = readArguments(args, names, ['kernel', 'fabric', 'pins', 'op']);
  if (!given.ok) return printFaults(given.error);
  if (given.value.help) {
    process.stdout.write(usage);
    return 0;
  }
  const options = readOptions(given.value);
  const problem = readProblem(given.value);
  if (!options.ok || !problem.ok) {
    return printFaults([...(options.ok ? [] : options.error), ...(problem.ok ? [] : problem.error)]);
  }
  const op = given.value.op as OpId;
  const { [op]: tile, ...otherPins } = problem.value.pins;
  if (tile === undefined) return printFaults([`--op: ${given.value.pins} has no pin for ${op}`]);
  const solved = await withSolver(given.value, options.value, (solve) =>
    solveBoth(problem.value, { ...problem.value, pins: otherPins }, solve),
  );
  if (!solved.ok) return printFaults(solved.error);
  const { withPin, withoutPin } = solved.value;
  const price = pinPrice(withPin, withoutPin);
  printDocument({
    op,
    tile,
    objective: problem.value.objective,
    price,
    withPin: outcomeDocument(problem.value, withPin),
    withoutPin: outcomeDocument(problem.value, withoutPin),
  });
  return exitCode(price, withoutPin);
}

/** With the pin first: what it finds is legal without the pin too, so the second solve starts from there. */
async function solveBoth(
  pinned: PlacementProblem,
  unpinned: PlacementProblem,
  solve: (problem: PlacementProblem) => Promise<SolveOutcome>,
): Promise<{ withPin: SolveOutcome; withoutPin: SolveOutcome }> {
  const withPin = await solve(pinned);
  const start = withPin.placement ? { start: withPin.placement } : {};
  return { withPin, withoutPin: await solve({ ...unpinned, ...start }) };
}

const exitCode = ({ kind }: PinPrice, withoutPin: SolveOutcome): 0 | 3 | 4 => {
  if (kind === 'exact' || kind === 'between') return 0;
  return kind === 'makes infeasible' || withoutPin.status === 'infeasible' ? 3 : 4;
};
