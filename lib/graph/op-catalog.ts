/**
 * The operations a kernel is drawn with: their operand ports, result, parameters and group.
 * The order here is the order of the palette.
 */

/** What travels on a connection: a word of the op's width, a one-bit flag, or an index (a word of any width). */
export type PortType = 'word' | 'flag' | 'index';
export type OpGroup =
  | 'memory'
  | 'scratchpad'
  | 'arithmetic'
  | 'multiply'
  | 'logic'
  | 'compare'
  | 'choose'
  | 'reduce';

export interface PortSpec {
  name: string;
  label: string;
  type: PortType;
  /** A required port must have an edge or an immediate. */
  required: boolean;
}

export type ParamSpec =
  | { type: 'integer'; name: string; label: string; min: number; max: number; initial: number }
  | { type: 'dataName'; name: string; label: string; initial: string }
  | { type: 'choice'; name: string; label: string; choices: readonly string[]; initial: string };

export interface OpSpec {
  label: string;
  /** What a node shows in small space. */
  symbol: string;
  group: OpGroup;
  summary: string;
  inputs: readonly PortSpec[];
  output: 'word' | 'flag' | null;
  /** Ops with a side effect are what a kernel exists for; others must reach one. */
  sideEffect: boolean;
  /** `vector`: one result per vector instead of one per iteration. */
  yields: 'iteration' | 'vector';
  params: readonly ParamSpec[];
}

const word = (name: string, label: string): PortSpec => ({ name, label, type: 'word', required: true });
const index: PortSpec = { name: 'index', label: 'index', type: 'index', required: true };
const A = word('a', 'a');
const B = word('b', 'b');
const VALUE = word('value', 'value');
const INT31 = 2 ** 31 - 1;

const array: ParamSpec = { type: 'dataName', name: 'array', label: 'Array', initial: 'x' };
const table: ParamSpec = { type: 'dataName', name: 'table', label: 'Table', initial: 'table' };
const base: ParamSpec = {
  type: 'integer',
  name: 'base',
  label: 'First element',
  min: -INT31,
  max: INT31,
  initial: 0,
};
const stride: ParamSpec = {
  type: 'integer',
  name: 'stride',
  label: 'Stride',
  min: -65536,
  max: 65536,
  initial: 1,
};
const overflow: ParamSpec = {
  type: 'choice',
  name: 'overflow',
  label: 'On overflow',
  choices: ['wrap', 'saturate'],
  initial: 'wrap',
};

const op = (
  label: string,
  symbol: string,
  group: OpGroup,
  summary: string,
  inputs: readonly PortSpec[],
  output: OpSpec['output'],
  params: readonly ParamSpec[] = [],
): OpSpec => ({
  label,
  symbol,
  group,
  summary,
  inputs,
  output,
  sideEffect: output === null,
  yields: group === 'reduce' ? 'vector' : 'iteration',
  params,
});

export const opCatalog = {
  load: op('Load', 'ld', 'memory', 'Reads the next element of an array', [], 'word', [array, base, stride]),
  store: op('Store', 'st', 'memory', 'Writes the next element of an array', [VALUE], null, [
    array,
    base,
    stride,
  ]),
  loadIndexed: op(
    'Load by index',
    'ld[i]',
    'memory',
    'Reads the element at an index (gather)',
    [index],
    'word',
    [array, base],
  ),
  storeIndexed: op(
    'Store by index',
    'st[i]',
    'memory',
    'Writes the element at an index (scatter)',
    [index, VALUE],
    null,
    [array, base],
  ),
  scratchRead: op(
    'Scratchpad read',
    'rd',
    'scratchpad',
    'Reads a table kept beside the PE',
    [index],
    'word',
    [table],
  ),
  scratchWrite: op(
    'Scratchpad write',
    'wr',
    'scratchpad',
    'Writes a table kept beside the PE',
    [index, VALUE],
    null,
    [table],
  ),
  add: op('Add', '+', 'arithmetic', 'a + b', [A, B], 'word', [overflow]),
  subtract: op('Subtract', '−', 'arithmetic', 'a − b', [A, B], 'word', [overflow]),
  absolute: op('Absolute value', '|a|', 'arithmetic', 'a without its sign', [A], 'word', [overflow]),
  min: op('Minimum', 'min', 'arithmetic', 'The smaller of a and b, signed', [A, B], 'word'),
  max: op('Maximum', 'max', 'arithmetic', 'The larger of a and b, signed', [A, B], 'word'),
  pass: op('Pass', '→', 'arithmetic', 'The operand, unchanged', [VALUE], 'word'),
  multiply: op('Multiply', '×', 'multiply', 'a × b, low half', [A, B], 'word', [overflow]),
  multiplyAccumulate: op(
    'Multiply-accumulate',
    '×+',
    'multiply',
    'a × b + addend',
    [A, B, word('addend', 'addend')],
    'word',
    [overflow],
  ),
  shiftLeft: op('Shift left', '«', 'logic', 'a moved left by amount', [A, word('amount', 'amount')], 'word'),
  shiftRight: op(
    'Shift right, arithmetic',
    '»',
    'logic',
    'a moved right by amount, the sign kept',
    [A, word('amount', 'amount')],
    'word',
  ),
  shiftRightLogical: op(
    'Shift right, logical',
    '»0',
    'logic',
    'a moved right by amount, zeros moved in',
    [A, word('amount', 'amount')],
    'word',
  ),
  and: op('And', '&', 'logic', 'Bitwise and', [A, B], 'word'),
  or: op('Or', '|', 'logic', 'Bitwise or', [A, B], 'word'),
  xor: op('Exclusive or', '^', 'logic', 'Bitwise exclusive or', [A, B], 'word'),
  equal: op('Equal', '=', 'compare', 'Flag: a = b', [A, B], 'flag'),
  notEqual: op('Not equal', '≠', 'compare', 'Flag: a ≠ b', [A, B], 'flag'),
  less: op('Less than', '<', 'compare', 'Flag: a < b, signed', [A, B], 'flag'),
  lessOrEqual: op('Less or equal', '≤', 'compare', 'Flag: a ≤ b, signed', [A, B], 'flag'),
  select: op(
    'Select',
    '?:',
    'choose',
    'One of two values, by a flag',
    [
      { name: 'condition', label: 'if', type: 'flag', required: true },
      word('whenTrue', 'then'),
      word('whenFalse', 'else'),
    ],
    'word',
  ),
  clamp: op(
    'Clamp',
    '[ ]',
    'choose',
    'The value, held between low and high',
    [VALUE, word('low', 'low'), word('high', 'high')],
    'word',
  ),
  reduceSum: op('Sum of a vector', 'Σ', 'reduce', 'One sum per vector', [VALUE], 'word', [overflow]),
  reduceMin: op('Minimum of a vector', '⌊v⌋', 'reduce', 'One minimum per vector', [VALUE], 'word'),
  reduceMax: op('Maximum of a vector', '⌈v⌉', 'reduce', 'One maximum per vector', [VALUE], 'word'),
} as const satisfies Record<string, OpSpec>;

export type OpKind = keyof typeof opCatalog;
export const opKinds = Object.keys(opCatalog) as [OpKind, ...OpKind[]];
export const opSpec = (kind: OpKind): OpSpec => opCatalog[kind];

/** Any op may take these two: with predicate 0 the unit does not fire and the fallback passes. */
export const PREDICATE_PORT: PortSpec = {
  name: 'predicate',
  label: 'predicate',
  type: 'flag',
  required: false,
};
export const fallbackPort = (output: 'word' | 'flag'): PortSpec => ({
  name: 'fallback',
  label: 'fallback',
  type: output,
  required: false,
});

/** Every port of an op kind, the optional predicate and fallback last. */
export function portsOf(kind: OpKind): readonly PortSpec[] {
  const spec = opSpec(kind);
  return spec.output === null
    ? [...spec.inputs, PREDICATE_PORT]
    : [...spec.inputs, PREDICATE_PORT, fallbackPort(spec.output)];
}
