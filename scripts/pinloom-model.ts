/** `model`: prints a placement problem, routes included, as an integer program that other solvers read. */
import type { Objective } from '../lib/mapping/mapping';
import { unequalWeights } from '../lib/mapping/weights';
import { err, ok, type Result } from '../lib/result';
import { buildInstance, hopsBetween, type PlacementInstance, withinReach } from '../lib/solver/instance';
import type { IntegerProgram } from '../lib/solver/integer-program/integer-program';
import {
  exportedOpName,
  type NameFamily,
  nameRoutedProgram,
  routedColumnCount,
  routedNameFamilies,
  routedProgram,
} from '../lib/solver/integer-program/routed-program';
import { writeLp } from '../lib/solver/integer-program/write-lp';
import { writeMps } from '../lib/solver/integer-program/write-mps';
import {
  type CheckedProblem,
  checkProblem,
  type InputFault,
  type PlacementProblem,
} from '../lib/solver/problem';
import { readArguments } from './command-line/arguments';
import { printFaults } from './command-line/print';
import { inputFaultLine, readProblem } from './command-line/read-problem';

export const modelUsage = `
npm run -s pinloom -- model --kernel K --fabric F --format lp|mps [--objective O] [--weights W] [--pins P]
  Prints the problem as an integer program of placement and routes, rules R1 to R7, as CPLEX LP or
  free MPS text. Comments at its head explain the names. Its optimum is the least objective of a legal
  mapping; where it is infeasible, no legal mapping exists. Exit codes: 0 printed, 2 bad input.
`;

const writers = { lp: writeLp, mps: writeMps } as const;
type ModelFormat = keyof typeof writers;

/** Columns, and the rows' entries, above which the text would be hundreds of megabytes. */
const MODEL_LIMITS = { columns: 300_000, reachEntries: 2_000_000 } as const;

const names = ['kernel', 'fabric', 'pins', 'objective', 'weights', 'format'] as const;

export function model(args: readonly string[]): 0 | 2 {
  const given = readArguments(args, names, ['kernel', 'fabric', 'format']);
  if (!given.ok) return printFaults(given.error);
  if (given.value.help) {
    process.stdout.write(modelUsage.trimStart());
    return 0;
  }
  const format = (Object.keys(writers) as ModelFormat[]).find((one) => one === given.value.format);
  const problem = readProblem(given.value);
  if (!format || !problem.ok) {
    const formatFault = format ? [] : [`--format: one of ${Object.keys(writers).join(', ')}`];
    return printFaults([...formatFault, ...(problem.ok ? [] : problem.error)]);
  }
  const text = modelText(problem.value, format);
  if (!text.ok) return printFaults(text.error.map((fault) => inputFaultLine(given.value, fault)));
  // A reader that closes early, such as `head`, has all it wants.
  process.stdout.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code !== 'EPIPE') throw error;
  });
  process.stdout.write(text.value);
  return 0;
}

/** The full model as text, or what is wrong with the problem. */
export function modelText(problem: PlacementProblem, format: ModelFormat): Result<string, InputFault[]> {
  const checked = checkProblem(problem);
  if (!checked.ok) return err(checked.error.faults);
  const { kernel, graph, pins, objective, library, weights } = checked.value;
  const instance = buildInstance(kernel, graph, pins, objective, library, weights);
  const columns = routedColumnCount(instance, graph.links.length);
  if (columns > MODEL_LIMITS.columns || hasTooManyReachEntries(instance)) {
    const sizes = `${kernel.ops.length} ops on ${graph.tileCount} tiles`;
    const message = `The integer program of ${sizes} would be too large to print: use a smaller fabric or kernel.`;
    return err([{ part: 'kernel', message, id: null }]);
  }
  const opIds = kernel.ops.map((op) => op.id);
  const program = nameRoutedProgram(routedProgram(instance, graph, 0).program, instance, graph, opIds);
  return ok(writers[format](program, headLines(checked.value, program)));
}

/** The rows of R7 are the only ones that grow with the square of the tiles. Stops counting at the limit. */
function hasTooManyReachEntries(instance: PlacementInstance): boolean {
  let entries = 0;
  for (const { from, to } of instance.pairs) {
    for (const p of instance.candidates[from] ?? []) {
      for (const q of instance.candidates[to] ?? []) {
        if (!withinReach(instance, hopsBetween(instance, p, q))) entries++;
      }
      if (entries > MODEL_LIMITS.reachEntries) return true;
    }
  }
  return false;
}

const objectiveMeaning: Record<Objective, string> = {
  wire: 'links of all nets',
  path: 'links of the paths of all connections',
};

/** What the text is and how to read its names, for the comments at its head. */
function headLines(
  { kernel, fabric, graph, objective, pins, weights }: CheckedProblem,
  { columnNames, rowNames }: IntegerProgram,
): string[] {
  const families = (group: Readonly<Record<string, NameFamily>>, own: readonly string[]) => {
    const titles = new Set(own.map((name) => name.slice(0, name.indexOf('.'))));
    return Object.values(group).flatMap(({ title, parts, meaning }) => {
      const form = [title, ...parts.map((part) => (part === 'pair' ? '<op>.<op>' : `<${part}>`))].join('.');
      return titles.has(title) ? [`  ${form}: ${meaning}`] : [];
    });
  };
  const clock = graph.maxHops === null ? 'no clock limit' : `at most ${graph.maxHops} hops a path`;
  const pinned = Object.entries(pins).map(([id, tile]) => `${id} on ${tile}`);
  const weighted = unequalWeights(weights, objective).map(([id, weight]) => `  ${id} counts ${weight}`);
  return [
    'Pinloom: where the ops of a kernel stand on a fabric and how their nets run, rules R1 to R7',
    `kernel ${JSON.stringify(kernel.name)}, fabric ${JSON.stringify(fabric.name)}`,
    `${fabric.rows} rows and ${fabric.cols} columns of tiles, ${clock}, ${pinned.length} pinned ops`,
    ...pinned.map((pin) => `  ${pin}`),
    `minimised: objective ${objective}, ${objectiveMeaning[objective]}${weighted.length > 0 ? ', each by its weight, 1 but for' : ''}`,
    ...weighted,
    'columns',
    ...families(routedNameFamilies.columns, columnNames),
    'rows; of a row with two sides, _low and _high',
    ...families(routedNameFamilies.rows, rowNames),
    'parts of names',
    '  tile_r2c3: the tile in row 2, column 3, both counted from 0 at the top left',
    '  link_r2c3_r2c4: the link from the router of r2c3 to that of r2c4',
    '  net_<op>: the net that carries the value of the op',
    ...kernel.ops.map(({ id, kind, label }, i) => {
      const name = exportedOpName(id, i);
      return `  ${name}: ${name === id ? '' : `${id}, `}${kind} ${JSON.stringify(label)}`;
    }),
  ];
}
