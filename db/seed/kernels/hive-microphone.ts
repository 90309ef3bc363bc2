/** Kernels of the hive microphone: it listens for the tones of a colony that is about to swarm. */
import { earlier, kernelBuilder } from './kernel-builder';

/** One step of the reversible 5/3 wavelet by lifting: a detail and a smooth value for two samples. */
export function waveletStep() {
  const k = kernelBuilder(
    'Hive: 5/3 wavelet lifting step',
    'Splits the sound into details and a smooth half, in whole numbers, so that it can be undone exactly.',
    16,
  );
  const even = k.op('load', 'even', {}, { array: 'sound', base: 0, stride: 2 });
  const odd = k.op('load', 'odd', {}, { array: 'sound', base: 1, stride: 2 });
  const nextEven = k.op('load', 'next even', {}, { array: 'sound', base: 2, stride: 2 });
  const pair = k.op('add', 'even pair', { a: even, b: nextEven });
  const predicted = k.op('shiftRight', 'predict', { a: pair, amount: 1 });
  const detail = k.op('subtract', 'detail', { a: odd, b: predicted });
  const previous = k.op('pass', 'previous detail', { value: earlier(detail, 1, [0]) });
  const details = k.op('add', 'detail pair', { a: previous, b: detail });
  const rounded = k.op('add', 'round', { a: details, b: 2 });
  const update = k.op('shiftRight', 'update', { a: rounded, amount: 2 });
  const smooth = k.op('add', 'smooth', { a: even, b: update });
  k.op('store', 'd[n]', { value: detail }, { array: 'details' });
  k.op('store', 's[n]', { value: smooth }, { array: 'smooth' });
  return k.build();
}

/** cos(π/4) with 14 fraction bits. */
const COS_45_Q14 = 11585;

/** One butterfly of a Fourier transform, its factor fixed at an eighth of a turn. */
export function fourierButterfly() {
  const k = kernelBuilder(
    'Hive: radix-2 butterfly',
    'Two complex values in, two out, the second turned by −45°. Factors have 14 fraction bits.',
    32,
  );
  const load = (label: string, array: string) => k.op('load', label, {}, { array });
  const [ar, ai, br, bi] = [load('ar', 'a_re'), load('ai', 'a_im'), load('br', 'b_re'), load('bi', 'b_im')];
  const turn = (label: string, a: typeof br, b: number) => k.op('multiply', label, { a, b });
  const realSum = k.op('subtract', 'turned re', {
    a: turn('br·cos', br, COS_45_Q14),
    b: turn('−bi·sin', bi, -COS_45_Q14),
  });
  const imagSum = k.op('add', 'turned im', {
    a: turn('−br·sin', br, -COS_45_Q14),
    b: turn('bi·cos', bi, COS_45_Q14),
  });
  const re = k.op('shiftRight', 'scale re', { a: realSum, amount: 14 });
  const im = k.op('shiftRight', 'scale im', { a: imagSum, amount: 14 });
  const outputs = [
    ['c_re', k.op('add', 'cr', { a: ar, b: re })],
    ['c_im', k.op('add', 'ci', { a: ai, b: im })],
    ['d_re', k.op('subtract', 'dr', { a: ar, b: re })],
    ['d_im', k.op('subtract', 'di', { a: ai, b: im })],
  ] as const;
  for (const [array, value] of outputs) k.op('store', `store ${array}`, { value }, { array });
  return k.build();
}

/** Add, compare, select for the two states that share their predecessors in the radio's decoder. */
export function addCompareSelect() {
  const k = kernelBuilder(
    'Hive: add, compare, select',
    'The inner step of the radio’s decoder: two states, their better predecessors, normalised path metrics.',
    16,
  );
  const load = (label: string, array: string, base = 0) =>
    k.op('load', label, {}, { array, base, stride: 2 });
  const [metric0, metric1] = [load('metric 0', 'metrics'), load('metric 1', 'metrics', 1)];
  const [branch0, branch1] = [load('branch 0', 'branches'), load('branch 1', 'branches', 1)];
  const survivor = (state: string, near: typeof metric0, far: typeof metric0, bit: number) => {
    const stay = k.op('add', `${state} stay`, { a: metric0, b: near });
    const cross = k.op('add', `${state} cross`, { a: metric1, b: far });
    const better = k.op('less', `${state} cross?`, { a: cross, b: stay });
    const best = k.op('select', `${state} best`, { condition: better, whenTrue: cross, whenFalse: stay });
    const decision = k.op('select', `${state} bit`, { condition: better, whenTrue: bit, whenFalse: 0 });
    return { best, decision };
  };
  const p = survivor('p', branch0, branch1, 1);
  const q = survivor('q', branch1, branch0, 2);
  const lowest = k.op('min', 'lowest', { a: p.best, b: q.best });
  const next0 = k.op('subtract', 'normal p', { a: p.best, b: lowest });
  const next1 = k.op('subtract', 'normal q', { a: q.best, b: lowest });
  const bits = k.op('or', 'decisions', { a: p.decision, b: q.decision });
  k.op('store', 'next p', { value: next0 }, { array: 'next_metrics', base: 0, stride: 2 });
  k.op('store', 'next q', { value: next1 }, { array: 'next_metrics', base: 1, stride: 2 });
  k.op('store', 'bits', { value: bits }, { array: 'decisions' });
  k.op('store', 'level', { value: lowest }, { array: 'levels' });
  return k.build();
}

/** How often the sound was in each of four classes; the class of a level stands in a table beside the PE. */
export function loudnessHistogram() {
  const k = kernelBuilder(
    'Hive: loudness in four classes',
    'A table gives the class of each level; one predicated sum per class counts it over the vector.',
    16,
  );
  const level = k.op('load', 'level', {}, { array: 'loudness' });
  const size = k.op('absolute', 'size', { a: level });
  const entry = k.op('shiftRight', 'entry', { a: size, amount: 8 });
  const kind = k.op('scratchRead', 'class', { index: entry }, { table: 'class_of_level' });
  for (const number of [0, 1, 2, 3]) {
    const hit = k.op('equal', `class ${number}?`, { a: kind, b: number });
    const count = k.op('reduceSum', `count ${number}`, { value: 1, predicate: hit, fallback: 0 });
    k.op('store', `bin ${number}`, { value: count }, { array: 'bins', base: number, stride: 4 });
  }
  return k.build();
}
