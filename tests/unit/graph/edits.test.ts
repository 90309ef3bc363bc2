import { expect, test } from 'vitest';
import { scaleAndClamp } from '@/db/seed/kernels/stream-gauge';
import {
  alignEdit,
  applyEdit,
  canConnect,
  edgeId,
  emptyKernel,
  freshOpId,
  type GraphEdit,
  invertEdit,
  KERNEL_LIMITS,
  layoutEdit,
  newOp,
  nodeSizePx,
  opId,
  removeOpsEdit,
  validateKernel,
} from '@/lib/graph';

const kernel = scaleAndClamp();
const raw = opId('op_raw');
const gain = opId('op_gain');
const first = kernel.edges[0]!;

test.each<[string, GraphEdit, string]>([
  ['an op of a taken id', { type: 'addOp', op: kernel.ops[0]! }, 'There is an op op_raw already.'],
  ['an op that is gone', { type: 'removeOp', id: opId('op_gone') }, 'The op op_gone no longer exists.'],
  [
    'an op that is still connected',
    { type: 'removeOp', id: raw },
    'The op op_raw still has connections: remove those first.',
  ],
  [
    'a label that is too long',
    { type: 'updateOp', id: raw, patch: { label: 'x'.repeat(KERNEL_LIMITS.labelLength + 1) } },
    'The op op_raw is not valid at label: Too big: expected string to have <=60 characters.',
  ],
  [
    'a place that is no number',
    { type: 'moveOps', moves: [{ id: raw, positionPx: { x: Number.NaN, y: 0 } }] },
    'The position of op_raw is not valid at x: Invalid input: expected number, received NaN.',
  ],
  [
    'a connection to nowhere',
    { type: 'addEdge', edge: { ...first, id: edgeId('edge_new'), to: opId('op_gone') } },
    'The connection edge_new needs the op op_gone, which does not exist.',
  ],
  [
    'a connection of a taken id',
    { type: 'addEdge', edge: first },
    `There is a connection ${first.id} already.`,
  ],
  [
    'a distance beyond the limit',
    { type: 'updateEdge', id: first.id, patch: { distance: 65 } },
    `The connection ${first.id} is not valid at distance: Too big: expected number to be <=64.`,
  ],
])('%s is refused with a reason', (_, edit, reason) => {
  expect(applyEdit(kernel, edit)).toEqual({ ok: false, error: reason });
  expect(() => invertEdit(kernel, edit)).toThrow(reason);
});

test('a batch with one bad step changes nothing', () => {
  const edit: GraphEdit = {
    type: 'batch',
    edits: [
      { type: 'setMeta', patch: { name: 'Other' } },
      { type: 'removeOp', id: opId('op_gone') },
    ],
  };
  expect(applyEdit(kernel, edit).ok).toBe(false);
  expect(kernel.name).toBe('Gauge: scale and clamp');
});

test('what an edit does not touch is the same object before and after', () => {
  const moved = applyEdit(kernel, { type: 'moveOps', moves: [{ id: raw, positionPx: { x: 1, y: 2 } }] });
  if (!moved.ok) throw new Error(moved.error);
  expect(moved.value.edges).toBe(kernel.edges);
  expect(moved.value.ops[1]).toBe(kernel.ops[1]);
  expect(moved.value.ops[0]).toEqual({ ...kernel.ops[0], positionPx: { x: 1, y: 2 } });
});

test('removing ops takes their connections with them, and the inverse brings all back in order', () => {
  const edit = removeOpsEdit(kernel, [gain]);
  const removed = applyEdit(kernel, edit);
  if (!removed.ok) throw new Error(removed.error);
  expect(removed.value.ops.map((op) => op.id)).toEqual(['op_raw', 'op_offset', 'op_range', 'op_level']);
  expect(removed.value.edges.map((edge) => edge.port)).toEqual(['value', 'value']);
  expect(applyEdit(removed.value, invertEdit(kernel, edit))).toEqual({ ok: true, value: kernel });
});

test('new ops are numbered by kind and take the width of the op before them', () => {
  const empty = emptyKernel('k');
  const one = newOp(empty, 'add', { x: 0, y: 0 }, 32);
  expect([one.id, one.label, one.widthBits, one.params]).toEqual([
    'op_add1',
    'add1',
    32,
    { overflow: 'wrap' },
  ]);
  const two = newOp({ ...empty, ops: [one] }, 'add', { x: 0, y: 0 });
  expect([two.id, two.widthBits]).toEqual(['op_add2', 32]);
});

test.each([
  ['Größe 1', 'op_Gre1'],
  ['???', 'op_op1'],
  ['op_x', 'op_x2'],
  ['add9', 'op_add10'],
  ['y'.repeat(80), `op_${'y'.repeat(60)}`],
])('the hint “%s” becomes the free id %s', (hint, id) => {
  expect(freshOpId(new Set(['op_x', 'op_add9']), hint)).toBe(id);
});

test.each([
  [
    'a free operand is allowed',
    { from: raw, to: gain, port: 'predicate' },
    'gives a word, but the operand “predicate” of “gain” takes a flag',
  ],
  ['a constant stands in the way', { from: raw, to: gain, port: 'b' }, 'is the constant 3: clear it first'],
  ['another connection stands in the way', { from: raw, to: gain, port: 'a' }, 'is already driven by “raw”'],
  ['an operand is unknown', { from: raw, to: gain, port: 'c' }, '“gain” has no operand “c”'],
  ['an op has no result', { from: opId('op_level'), to: gain, port: 'a' }, '“level” has no result'],
  ['an op is gone', { from: opId('op_gone'), to: gain, port: 'a' }, 'no longer exists'],
])('canConnect says so when %s', (_, request, reason) => {
  const answer = canConnect(kernel, request);
  expect(answer).toMatchObject({ ok: false, reason: expect.stringContaining(reason) });
});

test('a connection back to an earlier op is allowed with a distance; a moved one frees its operand', () => {
  const freed = applyEdit(kernel, { type: 'updateOp', id: gain, patch: { immediates: {} } });
  if (!freed.ok) throw new Error(freed.error);
  expect(canConnect(freed.value, { from: opId('op_range'), to: gain, port: 'b' })).toEqual({
    ok: true,
    needsDistance: true,
  });
  expect(canConnect(freed.value, { from: raw, to: gain, port: 'b' })).toEqual({
    ok: true,
    needsDistance: false,
  });
  expect(canConnect(kernel, { from: raw, to: gain, port: 'a' }, first.id)).toEqual({
    ok: true,
    needsDistance: false,
  });
});

test('alignment to the right makes right sides agree; distribution makes gaps equal: 0, 300, 1000 becomes 0, 500, 1000', () => {
  const three = kernel.ops
    .slice(0, 3)
    .map((op, i) => ({ ...op, positionPx: { x: [0, 300, 1000][i]!, y: i } }));
  const start = { ...kernel, ops: three, edges: [] };
  const ids = three.map((op) => op.id);
  const after = (how: 'right' | 'distributeAcross') => {
    const result = applyEdit(start, alignEdit(start, ids, how));
    if (!result.ok) throw new Error(result.error);
    return result.value.ops;
  };
  expect(new Set(after('right').map((op) => op.positionPx.x + nodeSizePx(op).widthPx)).size).toBe(1);
  expect(after('distributeAcross').map((op) => op.positionPx.x)).toEqual([0, 500, 1000]);
  expect(alignEdit(start, ids.slice(0, 1), 'left')).toEqual({ type: 'moveOps', moves: [] });
});

test('a part is laid out where it stands; a large kernel is laid out in layers', () => {
  const start = applyEdit(kernel, {
    type: 'moveOps',
    moves: kernel.ops.map((op) => ({ id: op.id, positionPx: { x: 400, y: 300 } })),
  });
  if (!start.ok) throw new Error(start.error);
  const part = applyEdit(start.value, layoutEdit(start.value, [raw, gain]));
  if (!part.ok) throw new Error(part.error);
  expect(part.value.ops.slice(0, 2).map((op) => op.positionPx.x)).toEqual([400, 616]);
  expect(part.value.ops.slice(2)).toEqual(start.value.ops.slice(2));

  const ops = Array.from({ length: 1000 }, (_, i) => ({
    ...newOp(emptyKernel('k'), 'pass', { x: 0, y: 0 }),
    id: opId(`op_p${i}`),
  }));
  const edges = ops
    .slice(1)
    .map((op, i) => ({ ...first, id: edgeId(`edge_${i}`), from: ops[i >> 1]!.id, to: op.id, port: 'value' }));
  const tree = { ...emptyKernel('tree'), ops, edges };
  const laidOut = applyEdit(tree, layoutEdit(tree));
  if (!laidOut.ok) throw new Error(laidOut.error);
  const xOf = new Map(laidOut.value.ops.map((op) => [op.id, op.positionPx.x]));
  expect(edges.every((edge) => xOf.get(edge.from)! < xOf.get(edge.to)!)).toBe(true);
  expect(validateKernel(laidOut.value).map((problem) => problem.code)).toContain('noSideEffect');
});
