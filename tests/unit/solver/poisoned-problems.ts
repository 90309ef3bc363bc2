/** Problems that nobody would draw, but that a file, an import or a script can hold. */
import type { Fabric } from '@/lib/fabric/fabric';
import type { Kernel } from '@/lib/graph/kernel';
import type { SolveOutcome } from '@/lib/solver/outcome';
import type { PlacementProblem } from '@/lib/solver/problem';
import { fabricSketch, kernelSketch, wall } from '../../helpers/sketches';

const indices = (count: number) => Array.from({ length: count }, (_, i) => i);
const MANY = 2000;

export const chain = (ops: number): Kernel =>
  kernelSketch(
    [
      'o0=load',
      ...indices(ops - 2).map((i) => `o${i + 1}=add:o${i},1`),
      `o${ops - 1}=store:o${ops - 2}`,
    ].join(' '),
  );

/** One load that all others read. */
const star = (ops: number): Kernel =>
  kernelSketch(
    ['o0=load', ...indices(ops - 2).map((i) => `o${i + 1}=add:o0,1`), `o${ops - 1}=store:o0`].join(' '),
  );

/** Two operands each, from anywhere before. */
function dense(ops: number): Kernel {
  let state = 7;
  const below = (limit: number) => {
    state = (Math.imul(state, 1103515245) + 12345) & 0x7fffffff;
    return (state >>> 8) % limit;
  };
  const adds = indices(ops - 2).map((i) => `o${i + 1}=add:o${below(i + 1)},o${below(i + 1)}`);
  return kernelSketch(['o0=load', ...adds, `o${ops - 1}=store:o${ops - 2}`].join(' '));
}

/** Memory units in the first column, arithmetic ones elsewhere. */
export const square = (side: number, more: Parameters<typeof fabricSketch>[1] = {}): Fabric =>
  fabricSketch(
    indices(side).map(() => `m${'a'.repeat(side - 1)}`),
    more,
  );

const meshLinks = (side: number): string[] =>
  indices(side).flatMap((row) =>
    indices(side).flatMap((col) =>
      [
        [row, col + 1],
        [row + 1, col],
      ]
        .filter(([r, c]) => (r as number) < side && (c as number) < side)
        .flatMap(([r, c]) => [`r${row}c${col}>r${r}c${c}`, `r${r}c${c}>r${row}c${col}`]),
    ),
  );

/** Links only between columns 0 and 1, 2 and 3, and so on of each row: islands of two tiles. */
const islands = (side: number): Fabric => {
  const isBridge = (link: string) => {
    const [, fromRow, fromCol, toRow, toCol] = (/r(\d+)c(\d+)>r(\d+)c(\d+)/.exec(link) ?? []).map(Number);
    return fromRow === toRow && (fromCol as number) >> 1 === (toCol as number) >> 1;
  };
  return fabricSketch(
    indices(side).map(() => 'ma'.repeat(side / 2)),
    { removedLinks: meshLinks(side).filter((link) => !isBridge(link)) },
  );
};

const around = (row: number, col: number): string[] =>
  [
    [row - 1, col],
    [row + 1, col],
    [row, col - 1],
    [row, col + 1],
  ].flatMap(([r, c]) => [`r${row}c${col}>r${r}c${c}`, `r${r}c${c}>r${row}c${col}`]);

const small = kernelSketch('x=load s=add:x,1 out=store:s');

export interface Poisoned {
  name: string;
  problem: Partial<PlacementProblem> & Pick<PlacementProblem, 'kernel' | 'fabric'>;
  /** Outcomes that are right; what is infeasible says so by this code, in these words. */
  answers: readonly SolveOutcome['status'][];
  code?: string;
  words?: RegExp;
}

const infeasible = (name: string, problem: Poisoned['problem'], code: string, words: RegExp): Poisoned => ({
  name,
  problem,
  answers: ['infeasible'],
  code,
  words,
});

export const smallPoisons: readonly Poisoned[] = [
  infeasible(
    'a fabric in two halves that no link joins, each too small',
    { kernel: chain(20), fabric: square(6, { removedLinks: wall(6, 2) }) },
    'out of reach',
    /in 2 parts that no link joins.* 20 ops/,
  ),
  infeasible(
    'a kernel of more ops than the fabric has PEs',
    { kernel: chain(10), fabric: square(3) },
    'too few tiles',
    /8 ops \(Add\).* only 6 PEs/,
  ),
  infeasible(
    'a fabric without links',
    { kernel: small, fabric: square(6, { removedLinks: meshLinks(6) }) },
    'out of reach',
    /from x to s are joined by links: add links/,
  ),
  infeasible(
    'a fabric without PEs',
    { kernel: small, fabric: fabricSketch(['...', '...']) },
    'too few tiles',
    /no PE .* can/,
  ),
  infeasible(
    'one tile for three ops',
    { kernel: small, fabric: fabricSketch(['m']) },
    'too few tiles',
    /2 ops .* only 1 PE|s need/,
  ),
  {
    name: 'one tile for one op',
    problem: { kernel: kernelSketch('out=store:7'), fabric: fabricSketch(['m']) },
    answers: ['optimal'],
  },
  {
    name: 'ops that nothing connects, on a fabric without links',
    problem: {
      kernel: kernelSketch('a=store:1 b=store:2 c=store:3'),
      fabric: fabricSketch(['mm', 'mm'], { removedLinks: meshLinks(2) }),
    },
    answers: ['optimal'],
  },
  {
    name: 'an op that reads itself, on a tile that no link enters',
    problem: {
      kernel: kernelSketch('n=add:@n,1 out=store:n'),
      fabric: fabricSketch(['am'], { removedLinks: ['r0c1>r0c0'] }),
    },
    answers: ['optimal'],
  },
  infeasible(
    'all links removed around a pinned op',
    {
      kernel: small,
      fabric: square(5, { removedLinks: around(2, 2) }),
      pins: { op_s: 'r2c2' } as PlacementProblem['pins'],
    },
    'out of reach',
    /connection from x to s are joined by links/,
  ),
  infeasible(
    'two ops pinned to one PE',
    { kernel: small, fabric: square(5), pins: { op_x: 'r0c0', op_out: 'r0c0' } as PlacementProblem['pins'] },
    'pin conflict',
    /x and out are both pinned to row 0, column 0/,
  ),
  infeasible(
    'pins that are too far from each other for the clock',
    {
      kernel: small,
      fabric: square(6, { clock: { periodPs: 250, entryDelayPs: 0, hopDelayPs: 100 } }),
      pins: { op_s: 'r0c1', op_out: 'r5c0' } as PlacementProblem['pins'],
    },
    'out of reach',
    /from s to out are within the clock's 2 hops/,
  ),
  infeasible(
    'a clock that leaves no hop',
    { kernel: small, fabric: square(4, { clock: { periodPs: 10, entryDelayPs: 1e9, hopDelayPs: 1e9 } }) },
    'out of reach',
    /0 hops/,
  ),
];

export const largePoisons: readonly Poisoned[] = [
  {
    name: '2,000 ops in a chain',
    problem: { kernel: chain(MANY), fabric: square(48) },
    answers: ['feasible', 'unknown'],
  },
  {
    name: '2,000 ops around one',
    problem: { kernel: star(MANY), fabric: square(48) },
    answers: ['feasible', 'unknown', 'infeasible'],
  },
  {
    name: '2,000 ops of two random operands',
    problem: { kernel: dense(MANY), fabric: square(48) },
    answers: ['feasible', 'unknown', 'infeasible'],
  },
  {
    name: '2,000 ops of two random operands, path hops, 16 channels and a clock on a torus of 64 × 64',
    problem: {
      kernel: dense(MANY),
      fabric: square(64, {
        topology: 'torus',
        channels: 16,
        clock: { periodPs: 450, entryDelayPs: 0, hopDelayPs: 100 },
      }),
      objective: 'path',
    },
    answers: ['feasible', 'unknown', 'infeasible'],
  },
  infeasible(
    '2,000 ops on a fabric without links',
    { kernel: chain(MANY), fabric: square(48, { removedLinks: meshLinks(48) }) },
    'out of reach',
    /from o0 to o1 are joined by links/,
  ),
  infeasible(
    '2,000 ops on 24 × 24 tiles',
    { kernel: chain(MANY), fabric: square(24) },
    'too few tiles',
    /1998 ops .* only 552 PEs/,
  ),
  infeasible(
    '400 chains of three on islands of two',
    {
      kernel: kernelSketch(
        indices(400)
          .map((i) => `l${i}=load a${i}=add:l${i},1 s${i}=store:a${i}`)
          .join(' '),
      ),
      fabric: islands(48),
    },
    'out of reach',
    /in 1152 parts .* 3 ops/,
  ),
  infeasible(
    '600 chains of three between units that only touch along one row, one hop apart',
    {
      kernel: kernelSketch(
        indices(600)
          .map((i) => `l${i}=load a${i}=add:l${i},1 s${i}=store:a${i}`)
          .join(' '),
      ),
      fabric: fabricSketch(
        indices(64).map((row) => (row < 32 ? 'm' : 'a').repeat(64)),
        { clock: { periodPs: 150, entryDelayPs: 0, hopDelayPs: 100 } },
      ),
    },
    'out of reach',
    /1200 ops \(Load, Store\).* only 64 PEs .*out of reach/,
  ),
  {
    name: '500 pairs on islands of two',
    problem: {
      kernel: kernelSketch(
        indices(500)
          .map((i) => `l${i}=load s${i}=store:l${i}`)
          .join(' '),
      ),
      fabric: fabricSketch(
        indices(40).map(() => 'mm'.repeat(20)),
        { removedLinks: islands(40).removedLinks },
      ),
    },
    answers: ['feasible', 'optimal', 'unknown'],
  },
  infeasible(
    '500 ops pinned one by one, each connection right across the fabric',
    {
      kernel: chain(500),
      fabric: square(24),
      pins: Object.fromEntries(
        indices(500)
          .slice(1, -1)
          .map((i) => [
            `op_o${i}`,
            i % 2 === 0
              ? `r${(i >> 1) % 24}c${1 + Math.floor((i >> 1) / 24)}`
              : `r${(i >> 1) % 24}c${23 - Math.floor((i >> 1) / 24)}`,
          ]),
      ) as PlacementProblem['pins'],
    },
    'too few channels',
    /nets have to lead/,
  ),
];
