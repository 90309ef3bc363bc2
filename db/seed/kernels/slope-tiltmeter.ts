/** Kernels of the slope tiltmeter: two axes of tilt and a small thermal camera that looks over the slope. */
import type { OpId } from '@/lib/graph';
import { type KernelBuilder, kernelBuilder } from './kernel-builder';

/** A row of a sparse matrix times a vector: the columns that are there, gathered. */
export function sparseDotProduct() {
  const k = kernelBuilder(
    'Tiltmeter: sparse dot product',
    'One row of the calibration matrix: column numbers pick the elements, products are summed over the row.',
    32,
  );
  const column = k.op('load', 'column', {}, { array: 'columns' });
  const weight = k.op('load', 'weight', {}, { array: 'weights' });
  const element = k.op('loadIndexed', 'element', { index: column }, { array: 'readings' });
  const product = k.op('multiply', 'product', { a: weight, b: element });
  const sum = k.op('reduceSum', 'row sum', { value: product }, { overflow: 'saturate' });
  const scaled = k.op('shiftRight', 'scale', { a: sum, amount: 10 });
  k.op('store', 'row', { value: scaled }, { array: 'calibrated' });
  return k.build();
}

/** Brightness edges in the thermal picture of the slope, as the sum of two absolute slopes. */
export function gradient() {
  const k = kernelBuilder(
    'Tiltmeter: 3×3 gradient',
    'Weighted differences across and down over a 3×3 neighbourhood of the thermal picture, 64 columns wide.',
    16,
  );
  const COLUMNS = 64;
  const pixel = (row: number, column: number) =>
    k.op('load', `p${row}${column}`, {}, { array: 'picture', base: row * COLUMNS + column });
  const [nw, n, ne] = [pixel(0, 0), pixel(0, 1), pixel(0, 2)];
  const [w, e] = [pixel(1, 0), pixel(1, 2)];
  const [sw, s, se] = [pixel(2, 0), pixel(2, 1), pixel(2, 2)];
  const slope = (way: string, ends: readonly (readonly [OpId, OpId])[]) => {
    const [first, middle, last] = ends.map(([a, b], i) => k.op('subtract', `${way} ${i + 1}`, { a, b }));
    const twice = k.op('shiftLeft', `${way} twice`, { a: middle!, amount: 1 });
    const outer = k.op('add', `${way} outer`, { a: first!, b: last! });
    const sum = k.op('add', `${way} sum`, { a: outer, b: twice });
    return k.op('absolute', `|${way}|`, { a: sum });
  };
  const across = slope('across', [
    [ne, nw],
    [e, w],
    [se, sw],
  ]);
  const down = slope('down', [
    [sw, nw],
    [s, n],
    [se, ne],
  ]);
  const size = k.op('add', 'edge', { a: across, b: down }, { overflow: 'saturate' });
  k.op('store', 'edges', { value: size }, { array: 'edges', base: COLUMNS + 1 });
  return k.build();
}

interface Vector {
  x: OpId;
  y: OpId;
}

/** `x ± y·2^−shift` as the flag says: the sum where it is set, else the difference. */
function turned(k: KernelBuilder, label: string, flag: OpId, value: OpId, by: OpId, sumIfSet: boolean): OpId {
  const sum = k.op('add', `${label} +`, { a: value, b: by });
  const difference = k.op('subtract', `${label} −`, { a: value, b: by });
  const [whenTrue, whenFalse] = sumIfSet ? [sum, difference] : [difference, sum];
  return k.op('select', label, { condition: flag, whenTrue, whenFalse });
}

/** atan(2^−i) in hundredths of a degree. */
const ANGLES = [4500, 2657, 1404] as const;

/**
 * Size and direction of the tilt by three turns of a shift-and-add rotation (Volder 1959). The size comes out larger by
 * the method's constant factor, about 1.63 after three turns, which the reader of the log takes out.
 */
export function tiltDirection() {
  const k = kernelBuilder(
    'Tiltmeter: size and direction',
    'Turns the tilt vector onto its axis in three steps of shifts and additions; the angles add up to its direction.',
    16,
  );
  const x = k.op('absolute', '|x|', { a: k.op('load', 'tilt x', {}, { array: 'tilt_x' }) });
  const y = k.op('load', 'tilt y', {}, { array: 'tilt_y' });
  const below = (i: number, at: Vector) => k.op('less', `below ${i}?`, { a: at.y, b: 0 });
  const angle = (i: number, flag: OpId) =>
    k.op('select', `angle ${i}`, { condition: flag, whenTrue: -ANGLES[i]!, whenFalse: ANGLES[i]! });
  const down = (label: string, a: OpId, amount: number) => k.op('shiftRight', label, { a, amount });

  const flag0 = below(0, { x, y });
  const sum = k.op('add', 'x + y', { a: x, b: y });
  const x1 = k.op('select', 'x1', {
    condition: flag0,
    whenTrue: k.op('subtract', 'x − y', { a: x, b: y }),
    whenFalse: sum,
  });
  const y1 = k.op('select', 'y1', {
    condition: flag0,
    whenTrue: sum,
    whenFalse: k.op('subtract', 'y − x', { a: y, b: x }),
  });
  const flag1 = below(1, { x: x1, y: y1 });
  const x2 = turned(k, 'x2', flag1, x1, down('y1 / 2', y1, 1), false);
  const y2 = turned(k, 'y2', flag1, y1, down('x1 / 2', x1, 1), true);
  const flag2 = below(2, { x: x2, y: y2 });
  const size = turned(k, 'size', flag2, x2, down('y2 / 4', y2, 2), false);
  const first = k.op('add', 'angle 0 + 1', { a: angle(0, flag0), b: angle(1, flag1) });
  const direction = k.op('add', 'direction', { a: first, b: angle(2, flag2) });
  k.op('store', 'size log', { value: size }, { array: 'tilt_size' });
  k.op('store', 'direction log', { value: direction }, { array: 'tilt_direction' });
  return k.build();
}
