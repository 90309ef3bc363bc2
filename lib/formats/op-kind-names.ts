/** The names under which files may call an operation. */
import { type OpKind, opKinds, opSpec } from '../graph/op-catalog';

/** Usual short forms besides each kind's own name, label and symbol. */
const SHORT_FORMS: Readonly<Record<string, OpKind>> = {
  ld: 'load',
  st: 'store',
  gather: 'loadIndexed',
  scatter: 'storeIndexed',
  '-': 'subtract',
  sub: 'subtract',
  abs: 'absolute',
  '*': 'multiply',
  mul: 'multiply',
  mac: 'multiplyAccumulate',
  '<<': 'shiftLeft',
  shl: 'shiftLeft',
  '>>': 'shiftRight',
  shr: 'shiftRight',
  '>>>': 'shiftRightLogical',
  '|': 'or',
  '^': 'xor',
  '==': 'equal',
  eq: 'equal',
  '!=': 'notEqual',
  ne: 'notEqual',
  lt: 'less',
  '<=': 'lessOrEqual',
  le: 'lessOrEqual',
  mux: 'select',
  sum: 'reduceSum',
};

const kindByName: ReadonlyMap<string, OpKind> = new Map([
  ...Object.entries(SHORT_FORMS),
  ...opKinds.map((kind): [string, OpKind] => [opSpec(kind).symbol.toLowerCase(), kind]),
  ...opKinds.map((kind): [string, OpKind] => [opSpec(kind).label.toLowerCase(), kind]),
  ...opKinds.map((kind): [string, OpKind] => [kind.toLowerCase(), kind]),
]);

/** The kind that a name, label, symbol or short form means, whatever its case; null when it means none. */
export const kindNamed = (name: string): OpKind | null => kindByName.get(name.trim().toLowerCase()) ?? null;

/** For messages: the names by which kinds are written. */
export const kindNames = opKinds.join(', ');
