/** Assignment problems for tests: published ones from tests/reference/qaplib, and small random ones. */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { parseQaplib } from '@/lib/formats/qaplib';
import { type QapProblem, qapValue } from '@/lib/solver/qap/qap';
import { type QapModel, qapInstance } from '@/lib/solver/qap/qap-instance';
import { seededRandom } from '@/lib/solver/search/random';

const folder = 'tests/reference/qaplib';

export interface PublishedQap {
  problem: QapProblem;
  optimum: number;
  /** Location by facility of a best assignment, counted from 0; the first matrix is the flow. */
  locationOf: number[];
  gilmoreLawlerBound: number | null;
}

/** From our JSON of a published instance: value and permutation are those of QAPLIB where it has them. */
export function publishedJson(name: string): PublishedQap {
  const file = JSON.parse(readFileSync(join(folder, `${name}.json`), 'utf8'));
  const isFlowFirst = file.distanceMatrix === 'B';
  const locationOf: number[] = file.locationOfFacility;
  return {
    problem: {
      n: file.n,
      flow: Float64Array.from(file.A.flat()),
      distance: Float64Array.from(file.B.flat()),
    },
    optimum: file.optimum,
    locationOf: isFlowFirst ? locationOf : inverse(locationOf),
    gilmoreLawlerBound: file.gilmoreLawlerRootBound ?? null,
  };
}

/** From QAPLIB's own files: `.dat`, and `.sln` with size, value and permutation. */
export function publishedText(name: string): PublishedQap {
  const parsed = parseQaplib(readFileSync(join(folder, `${name}.dat`), 'utf8'));
  if (!parsed.ok) throw new Error(`${name}.dat: ${parsed.errors[0]?.message}`);
  const { n, first, second } = parsed.value;
  const [, optimum, ...permutation] = readFileSync(join(folder, `${name}.sln`), 'utf8')
    .trim()
    .split(/\s+/)
    .map(Number);
  return {
    problem: { n, flow: first, distance: second },
    optimum: optimum as number,
    locationOf: permutation.map((location) => location - 1),
    gilmoreLawlerBound: null,
  };
}

/** Every published instance of up to 12 facilities here, with its reader. */
export const upToTwelve: [string, (name: string) => PublishedQap][] = [
  ...['nug5', 'nug6', 'nug7', 'nug8', 'scr10', 'nug12', 'scr12', 'had12'].map(
    (name): [string, typeof publishedJson] => [name, publishedJson],
  ),
  ...['chr12a', 'chr12b', 'chr12c', 'rou12', 'tai12a'].map((name): [string, typeof publishedJson] => [
    name,
    publishedJson,
  ]),
  ['tai12b', publishedText],
];

function inverse(permutation: readonly number[]): number[] {
  const inverted = permutation.map(() => -1);
  permutation.forEach((to, from) => {
    inverted[to] = from;
  });
  return inverted;
}

export type Shape = 'symmetric' | 'one-sided' | 'directed' | 'diagonal' | 'below zero' | 'alike';
export const shapes: readonly Shape[] = [
  'symmetric',
  'one-sided',
  'directed',
  'diagonal',
  'below zero',
  'alike',
];

/** A problem of the kind that the shape names, the same for a seed. */
export function randomProblem(n: number, shape: Shape, seed: number): QapProblem {
  const random = seededRandom(seed);
  const low = shape === 'below zero' ? -9 : 0;
  const matrix = (isMirrored: boolean, hasDiagonal: boolean): Float64Array => {
    const entries = new Float64Array(n * n);
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        const isFixed = i === j ? !hasDiagonal : isMirrored && j < i;
        const value = shape === 'alike' ? 6 : low + random.below(12);
        entries[i * n + j] = isFixed ? (i === j ? 0 : (entries[j * n + i] as number)) : value;
      }
    }
    return entries;
  };
  const hasDiagonal = shape === 'diagonal' || shape === 'below zero';
  const isFlowFirst = seed % 2 === 0;
  const one = matrix(shape === 'symmetric' || shape === 'one-sided', hasDiagonal);
  const other = matrix(shape === 'symmetric', hasDiagonal);
  return isFlowFirst ? { n, flow: one, distance: other } : { n, flow: other, distance: one };
}

/** All permutations of 0 to n − 1. */
export function* permutations(n: number, from: readonly number[] = []): Generator<number[]> {
  if (from.length === n) yield [...from];
  for (let next = 0; next < n; next++) if (!from.includes(next)) yield* permutations(n, [...from, next]);
}

/** The least value of all assignments, by trying all of them. */
export function leastValue(problem: QapProblem): number {
  let least = Number.POSITIVE_INFINITY;
  for (const permutation of permutations(problem.n)) {
    least = Math.min(least, qapValue(problem, permutation) as number);
  }
  return least;
}

export function modelOf(problem: QapProblem): QapModel {
  const made = qapInstance(problem);
  if (!made.ok) throw new Error(made.error);
  return made.value;
}
