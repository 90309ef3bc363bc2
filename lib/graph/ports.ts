/** What may be connected to what: the rules of types, widths and ranges that editor, validator and importer share. */
import type { Edge, Op, WidthBits } from './kernel';
import { opSpec, type PortSpec, portsOf } from './op-catalog';

/** How a message names an op: its label, or its kind and id while it has none. */
export const opName = (op: Op): string =>
  op.label === '' ? `${opSpec(op.kind).label} (${op.id})` : `“${op.label}”`;

/** The port of an op by its name; undefined when its kind has no such port. */
export const portOf = (op: Op, port: string): PortSpec | undefined =>
  portsOf(op.kind).find((spec) => spec.name === port);

/** The fallback of a reduction cannot be connected: no result of an iteration belongs to a whole vector. */
export const isConstantOnly = (target: Op, port: PortSpec): boolean =>
  port.name === 'fallback' && opSpec(target.kind).yields === 'vector';

/** Why the source's result cannot be the operand at a port, as one sentence; null when it can. */
export function connectionFault(source: Op, target: Op, port: PortSpec): string | null {
  const { output } = opSpec(source.kind);
  if (output === null) return `${opName(source)} has no result to connect.`;
  if (isConstantOnly(target, port)) {
    return `The fallback of ${opName(target)} stands for a vector in which no element counted: give it as a constant.`;
  }
  const operand = `the operand “${port.label}” of ${opName(target)}`;
  if (port.type === 'flag') {
    return output === 'flag'
      ? null
      : `${opName(source)} gives a word, but ${operand} takes a flag: use a comparison.`;
  }
  if (output === 'flag') {
    return `${opName(source)} gives a flag, but ${operand} takes a word: use a select with constants.`;
  }
  if (port.type === 'word' && source.widthBits !== target.widthBits) {
    return `${opName(source)} gives ${source.widthBits} bits, but ${operand} takes ${target.widthBits}: give both the same width.`;
  }
  return null;
}

export interface ValueRange {
  min: number;
  max: number;
}

/** The signed range of a word. */
export const wordRange = (widthBits: WidthBits): ValueRange => ({
  min: -(2 ** (widthBits - 1)),
  max: 2 ** (widthBits - 1) - 1,
});
const FLAG_RANGE: ValueRange = { min: 0, max: 1 };

/** The values that a constant may have at a port. */
export function immediateRange(op: Op, port: PortSpec): ValueRange {
  if (port.type === 'flag') return FLAG_RANGE;
  if (port.type === 'index') return { min: 0, max: wordRange(32).max };
  if (port.name === 'amount') return { min: 0, max: op.widthBits - 1 };
  return wordRange(op.widthBits);
}

/** The values that an edge may start with: those its source can give. */
export function initialValueRange(source: Op): ValueRange {
  return opSpec(source.kind).output === 'flag' ? FLAG_RANGE : wordRange(source.widthBits);
}

export const inRange = (value: number, range: ValueRange): boolean =>
  value >= range.min && value <= range.max;

/** The first `distance` values of an edge: missing ones are 0, surplus ones are dropped. */
export const fullInitialValues = (edge: Edge): number[] =>
  Array.from({ length: edge.distance }, (_, i) => edge.initialValues[i] ?? 0);
