import { describe, expect, test } from 'vitest';
import { demoKernels } from '@/db/seed/kernels';
import {
  applyEdit,
  type Edge,
  edgeId,
  emptyKernel,
  type GraphEdit,
  initialParams,
  type Kernel,
  type Op,
  type OpKind,
  opId,
  type ProblemCode,
  validateKernel,
} from '@/lib/graph';

const op = (id: string, kind: OpKind, more: Partial<Op> = {}): Op => ({
  id: opId(`op_${id}`),
  kind,
  label: id,
  widthBits: 16,
  params: initialParams(kind),
  immediates: {},
  positionPx: { x: 0, y: 0 },
  ...more,
});
let edgeCount = 0;
const edge = (from: string, to: string, port: string, more: Partial<Edge> = {}): Edge => ({
  id: edgeId(`edge_${++edgeCount}`),
  from: opId(`op_${from}`),
  to: opId(`op_${to}`),
  port,
  distance: 0,
  initialValues: [],
  ...more,
});
const kernel = (ops: Op[], edges: Edge[]): Kernel => ({ ...emptyKernel('test'), ops, edges });
const codes = (one: Kernel) => validateKernel(one).map((problem) => problem.code);

const load = op('x', 'load');
const store = op('out', 'store');
const add = op('sum', 'add');
const toSum = [edge('x', 'sum', 'a'), edge('x', 'sum', 'b'), edge('sum', 'out', 'value')];

test('a load added to itself and stored has no problems', () => {
  expect(validateKernel(kernel([load, add, store], toSum))).toEqual([]);
});

test.each(demoKernels.map(({ slug, kernel: demo }) => [slug, demo] as const))(
  'the demo kernel %s has no problems, 5 to 30 ops and every op at a place of its own',
  (_, demo) => {
    expect(validateKernel(demo)).toEqual([]);
    expect(demo.ops.length).toBeGreaterThanOrEqual(5);
    expect(demo.ops.length).toBeLessThanOrEqual(30);
    expect(new Set(demo.ops.map(({ positionPx: { x, y } }) => `${x},${y}`)).size).toBe(demo.ops.length);
  },
);

const compare = op('flag', 'less', { immediates: { b: 0 } });
const toFlag = edge('x', 'flag', 'a');
const select = op('choice', 'select', { immediates: { whenTrue: 1, whenFalse: 0 } });
const sum = op('total', 'reduceSum');
const toTotal = [edge('x', 'total', 'value'), edge('total', 'out', 'value')];

/** Rule, what is wrong, the kernel, the codes in the order of the list. */
const cases: [string, string, Kernel, ProblemCode[]][] = [
  ['K1', 'two ops of one id', kernel([load, load, add, store], toSum), ['duplicateId']],
  [
    'K1',
    'two connections of one id',
    kernel([load, add, store], [toSum[0]!, { ...toSum[1]!, id: toSum[0]!.id }, toSum[2]!]),
    ['duplicateId'],
  ],
  [
    'K2',
    'a connection from nowhere',
    kernel([load, add, store], [...toSum, edge('y', 'sum', 'a')]),
    ['missingOp'],
  ],
  [
    'K3',
    'an operand that the kind lacks',
    kernel([load, add, store], [...toSum, edge('x', 'sum', 'c')]),
    ['unknownPort'],
  ],
  [
    'K3',
    'a constant for an operand that the kind lacks',
    kernel([load, { ...add, immediates: { c: 1 } }, store], toSum),
    ['unknownPort'],
  ],
  [
    'K3',
    'a connection from a store',
    kernel([load, op('first', 'store'), store], [edge('x', 'first', 'value'), edge('first', 'out', 'value')]),
    ['noResult'],
  ],
  [
    'K4',
    'an operand without a driver',
    kernel([load, add, store], [toSum[0]!, toSum[2]!]),
    ['missingOperand'],
  ],
  [
    'K5',
    'two connections to one operand',
    kernel([load, add, store], [...toSum, edge('x', 'sum', 'a')]),
    ['drivenTwice'],
  ],
  [
    'K5',
    'a connection and a constant at one operand',
    kernel([load, { ...add, immediates: { b: 0 } }, store], toSum),
    ['edgeAndConstant'],
  ],
  [
    'K6',
    'a flag stored as a word',
    kernel([load, compare, store], [toFlag, edge('flag', 'out', 'value')]),
    ['typeMismatch'],
  ],
  [
    'K6',
    'a word as a condition',
    kernel([load, select, store], [edge('x', 'choice', 'condition'), edge('choice', 'out', 'value')]),
    ['typeMismatch'],
  ],
  [
    'K6',
    '8 bits into 16',
    kernel([{ ...load, widthBits: 8 }, store], [edge('x', 'out', 'value')]),
    ['widthMismatch'],
  ],
  [
    'K6',
    'a fallback of another width',
    kernel(
      [load, compare, op('narrow', 'load', { widthBits: 8 }), { ...add, immediates: { b: 1 } }, store],
      [
        toFlag,
        edge('x', 'sum', 'a'),
        edge('flag', 'sum', 'predicate'),
        edge('narrow', 'sum', 'fallback'),
        edge('sum', 'out', 'value'),
      ],
    ),
    ['widthMismatch'],
  ],
  [
    'K7',
    '128 as a constant of 8 bits (−128 to 127)',
    kernel([{ ...store, widthBits: 8, immediates: { value: 128 } }], []),
    ['constantRange'],
  ],
  [
    'K7',
    'a shift of 16 bits by 16',
    kernel(
      [load, op('shift', 'shiftLeft', { immediates: { amount: 16 } }), store],
      [edge('x', 'shift', 'a'), edge('shift', 'out', 'value')],
    ),
    ['constantRange'],
  ],
  [
    'K7',
    '2 as a predicate',
    kernel([load, { ...store, immediates: { predicate: 2 } }], [edge('x', 'out', 'value')]),
    ['constantRange'],
  ],
  [
    'K8',
    'a missing, an unknown and an impossible parameter',
    kernel([{ ...load, params: { base: 0, stride: 70000, step: 1 } }, store], [edge('x', 'out', 'value')]),
    ['unknownParam', 'missingParam', 'paramValue'],
  ],
  [
    'K8',
    'a parameter that only the prototype of objects has',
    kernel([{ ...load, params: { ...load.params, toString: 1 } }, store], [edge('x', 'out', 'value')]),
    ['unknownParam'],
  ],
  [
    'K9',
    'two initial values for a distance of 1',
    kernel([load, store], [edge('x', 'out', 'value', { distance: 1, initialValues: [1, 2] })]),
    ['initialValueCount'],
  ],
  [
    'K9',
    'an initial value that 16 bits cannot hold',
    kernel([load, store], [edge('x', 'out', 'value', { distance: 1, initialValues: [32768] })]),
    ['initialValueRange'],
  ],
  [
    'K10',
    'an op that waits for itself',
    kernel([load, add, store], [edge('x', 'sum', 'a'), edge('sum', 'sum', 'b'), edge('sum', 'out', 'value')]),
    ['cycleWithoutDistance'],
  ],
  [
    'K11',
    'a predicate without a fallback',
    kernel([load, compare, add, store], [...toSum, toFlag, edge('flag', 'sum', 'predicate')]),
    ['predicateWithoutFallback'],
  ],
  [
    'K11',
    'a fallback without a predicate',
    kernel([load, { ...add, immediates: { fallback: 0 } }, store], toSum),
    ['fallbackWithoutPredicate'],
  ],
  [
    'K12',
    'a sum of a vector added to an element',
    kernel(
      [load, sum, add, store],
      [toTotal[0]!, edge('total', 'sum', 'a'), edge('x', 'sum', 'b'), toSum[2]!],
    ),
    ['rateMismatch'],
  ],
  [
    'K12',
    'a sum of sums',
    kernel(
      [load, sum, op('grand', 'reduceSum'), store],
      [toTotal[0]!, edge('total', 'grand', 'value'), edge('grand', 'out', 'value')],
    ),
    ['rateMismatch'],
  ],
  [
    'K12',
    'a connected fallback of a sum',
    kernel(
      [load, compare, sum, store],
      [...toTotal, toFlag, edge('flag', 'total', 'predicate'), edge('x', 'total', 'fallback')],
    ),
    ['rateMismatch'],
  ],
  ['K13', 'no op that writes', kernel([load], []), ['noSideEffect']],
  ['K13', 'no op at all', kernel([], []), ['noSideEffect']],
  [
    'K14',
    'a load that nothing uses',
    kernel([load, op('y', 'load'), store], [edge('x', 'out', 'value')]),
    ['unused'],
  ],
  [
    'K15',
    'a table that one op writes and another reads',
    kernel(
      [
        load,
        op('write', 'scratchWrite', { immediates: { index: 0 } }),
        op('read', 'scratchRead', { immediates: { index: 0 } }),
        store,
      ],
      [edge('x', 'write', 'value'), edge('read', 'out', 'value')],
    ),
    ['sharedTable'],
  ],
];

test.each(cases)('%s: %s', (_rule, _what, one, expected) => {
  expect(codes(one)).toEqual(expected);
});

describe('what is legal', () => {
  test.each<[string, Kernel]>([
    [
      'a sum of a vector, scaled and stored once per vector',
      kernel(
        [load, sum, { ...add, immediates: { b: 1 } }, store],
        [toTotal[0]!, edge('total', 'sum', 'a'), toSum[2]!],
      ),
    ],
    [
      'a running total of vectors',
      kernel(
        [load, sum, add, store],
        [toTotal[0]!, edge('total', 'sum', 'a'), edge('sum', 'sum', 'b', { distance: 1 }), toSum[2]!],
      ),
    ],
    [
      'an index of another width',
      kernel(
        [{ ...load, widthBits: 32 }, op('pick', 'loadIndexed'), store],
        [edge('x', 'pick', 'index'), edge('pick', 'out', 'value')],
      ),
    ],
    [
      'a predicated store without a fallback',
      kernel([load, compare, store], [toFlag, edge('x', 'out', 'value'), edge('flag', 'out', 'predicate')]),
    ],
    [
      'a cycle that carries a distance',
      kernel(
        [load, add, store],
        [toSum[0]!, edge('sum', 'sum', 'b', { distance: 1, initialValues: [7] }), toSum[2]!],
      ),
    ],
    [
      'two readers of a table that nothing writes',
      kernel(
        [
          op('r1', 'scratchRead', { immediates: { index: 0 } }),
          op('r2', 'scratchRead', { immediates: { index: 1 } }),
          add,
          store,
        ],
        [edge('r1', 'sum', 'a'), edge('r2', 'sum', 'b'), toSum[2]!],
      ),
    ],
  ])('%s', (_, one) => {
    expect(validateKernel(one)).toEqual([]);
  });
});

test('a problem names the op by its label, points at it and says what to do', () => {
  const [problem] = validateKernel(kernel([load, add, store], [toSum[0]!, toSum[2]!]));
  expect(problem).toEqual({
    severity: 'error',
    code: 'missingOperand',
    message: 'The operand “b” of “sum” is not driven: connect a result to it or give it a constant.',
    opIds: ['op_sum'],
    edgeIds: [],
    port: 'b',
  });
});

test('a chain of 2,000 ops is validated and taken apart without recursion, each within two seconds', () => {
  const ops = [load, ...Array.from({ length: 1998 }, (_, i) => op(`p${i}`, 'pass')), store];
  const edges = ops.slice(1).map((one, i) => edge(ops[i]!.label, one.label, 'value'));
  const chain = kernel(ops, edges);
  const startMs = performance.now();
  expect(validateKernel(chain)).toEqual([]);
  const validatedMs = performance.now();
  const removals: GraphEdit = {
    type: 'batch',
    edits: [
      ...edges.map((one): GraphEdit => ({ type: 'removeEdge', id: one.id })),
      ...ops.map((one): GraphEdit => ({ type: 'removeOp', id: one.id })),
    ],
  };
  expect(applyEdit(chain, removals)).toEqual({ ok: true, value: emptyKernel('test') });
  const removedMs = performance.now();
  expect(validatedMs - startMs).toBeLessThan(2000);
  expect(removedMs - validatedMs).toBeLessThan(2000);
});
