/** Kernels of the stream gauge: a pressure cell in the bed of the stream, read four times a second. */
import { earlier, kernelBuilder } from './kernel-builder';

/** Raw counts to millimetres of water: gain and offset of the cell, held within its range. */
export function scaleAndClamp() {
  const k = kernelBuilder(
    'Gauge: scale and clamp',
    'Turns raw counts of the pressure cell into millimetres of water, held within the cell’s range.',
    16,
  );
  const raw = k.op('load', 'raw', {}, { array: 'gauge_raw' });
  const scaled = k.op('multiply', 'gain', { a: raw, b: 3 }, { overflow: 'saturate' });
  const level = k.op('add', 'offset', { a: scaled, b: -412 }, { overflow: 'saturate' });
  const held = k.op('clamp', 'range', { value: level, low: 0, high: 4000 });
  k.op('store', 'level', { value: held }, { array: 'level_mm' });
  return k.build();
}

/** Volume passed so far: a running sum over clamped flow, scaled down for the log. */
export function runningVolume() {
  const k = kernelBuilder(
    'Gauge: running volume',
    'Sums the flow since midnight. The sum is carried from iteration to iteration.',
    32,
  );
  const flow = k.op('load', 'flow', {}, { array: 'flow_l' });
  const sane = k.op('clamp', 'no backflow', { value: flow, low: 0, high: 60000 });
  const sum = k.op('add', 'volume', { a: sane }, { overflow: 'saturate' });
  k.feed(sum, 'b', earlier(sum, 1, [0]));
  const hectolitres = k.op('shiftRight', 'scale', { a: sum, amount: 7 });
  k.op('store', 'log', { value: hectolitres }, { array: 'volume_log' });
  return k.build();
}

/** Five taps over the last five levels; the samples are carried, so each is loaded once. */
export function smoothingFilter() {
  const k = kernelBuilder(
    'Gauge: five-tap smoothing filter',
    'A symmetric filter against waves. Every sample is loaded once and carried over four iterations.',
    32,
  );
  const x = k.op('load', 'x[n]', {}, { array: 'level_mm' });
  let sum = k.op('multiply', 'tap 0', { a: x, b: 1 });
  for (const [delay, weight] of [4, 6, 4, 1].entries()) {
    const carried = earlier(x, delay + 1, Array<number>(delay + 1).fill(0));
    sum = k.op('multiplyAccumulate', `tap ${delay + 1}`, { a: carried, b: weight, addend: sum });
  }
  const rounded = k.op('add', 'round', { a: sum, b: 8 });
  const mean = k.op('shiftRight', 'divide by 16', { a: rounded, amount: 4 });
  k.op('store', 'y[n]', { value: mean }, { array: 'smooth_mm' });
  return k.build();
}

/** A flood is coming when the level leaves its slow average: counts such samples and keeps them. */
export function surgeDetector() {
  const k = kernelBuilder(
    'Gauge: surge detector',
    'Follows a slow average of the level and keeps every sample that is more than 40 mm away from it.',
    16,
  );
  const x = k.op('load', 'level', {}, { array: 'smooth_mm' });
  const difference = k.op('subtract', 'difference', { a: x });
  const step = k.op('shiftRight', 'step', { a: difference, amount: 4 });
  const average = k.op('add', 'average', { b: step });
  k.feed(average, 'a', earlier(average, 1, [600]));
  k.feed(difference, 'b', earlier(average, 1, [600]));
  const size = k.op('absolute', 'size', { a: difference });
  const surge = k.op('less', 'surge?', { a: 40, b: size });
  const count = k.op('add', 'count', { b: 1, predicate: surge });
  k.feed(count, 'a', earlier(count, 1, [0]));
  k.feed(count, 'fallback', earlier(count, 1, [0]));
  k.op('storeIndexed', 'keep', { index: count, value: x, predicate: surge }, { array: 'surges' });
  k.op('store', 'average log', { value: average }, { array: 'average_mm' });
  return k.build();
}

/** Four neighbouring readings in order, smallest first: the two in the middle are the robust ones. */
export function sortFourReadings() {
  const k = kernelBuilder(
    'Gauge: sort four readings',
    'A network of five comparators puts four readings in order; outliers end at its edges.',
    16,
  );
  const lanes = [0, 1, 2, 3].map((i) => k.op('load', `r${i}`, {}, { array: 'burst', base: i, stride: 4 }));
  const pairs: readonly (readonly [number, number])[] = [
    [0, 1],
    [2, 3],
    [0, 2],
    [1, 3],
    [1, 2],
  ];
  for (const [number, [i, j]] of pairs.entries()) {
    const [a, b] = [lanes[i]!, lanes[j]!];
    lanes[i] = k.op('min', `low ${number + 1}`, { a, b });
    lanes[j] = k.op('max', `high ${number + 1}`, { a, b });
  }
  for (const [i, value] of lanes.entries()) {
    k.op('store', `s${i}`, { value }, { array: 'sorted', base: i, stride: 4 });
  }
  return k.build();
}
