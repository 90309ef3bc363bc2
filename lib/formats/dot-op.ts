/** One node of a DOT graph to an op: its kind, width, parameters and constants from attributes. */
import { paramDomain } from '../graph/check-params';
import { initialParams } from '../graph/edits';
import { KERNEL_LIMITS, type Op, type OpId, wordWidthsBits } from '../graph/kernel';
import { type OpKind, opSpec, type ParamSpec, portsOf } from '../graph/op-catalog';
import { isDrawingAttribute } from './dot-attribute-names';
import type { DotAttribute, DotFault, DotNode } from './dot-statements';
import { readPlain, readText } from './dot-text';
import { CONSTANT_PREFIX } from './kernel-dot-writer';
import { kindNamed, kindNames } from './op-kind-names';

const DEFAULT_WIDTH_BITS = 16;
const INT32 = { min: -(2 ** 31), max: 2 ** 31 - 1 };
const DATA_NAME = /^[A-Za-z_][A-Za-z0-9_]{0,39}$/;

/** Reads an integer within a range; null when the text is none. */
export function readInteger(content: string, min = INT32.min, max = INT32.max): number | null {
  if (!/^[+-]?\d{1,11}$/.test(content.trim())) return null;
  const value = Number(content);
  // Adding 0 turns −0 into 0.
  return value >= min && value <= max ? value + 0 : null;
}

/** The op, or null when its kind cannot be told; whatever is wrong is added to `faults`. */
export function readOp(node: DotNode, id: OpId, faults: DotFault[]): { op: Op; hasPosition: boolean } | null {
  const kind = readKind(node, faults);
  if (kind === null) return null;
  const op: Op = {
    id,
    kind,
    label: readLabel(node),
    widthBits: DEFAULT_WIDTH_BITS,
    params: initialParams(kind),
    immediates: {},
    positionPx: { x: 0, y: 0 },
  };
  for (const [name, attribute] of node.attributes) readOpAttribute(op, name, attribute, faults);
  return { op, hasPosition: node.attributes.has('positionPx') };
}

function readKind(node: DotNode, faults: DotFault[]): OpKind | null {
  const given = node.attributes.get('kind');
  const stand = given ?? node.attributes.get('label');
  const kind = stand === undefined ? null : kindNamed(readText(stand.content));
  if (kind !== null) return kind;
  faults.push(
    given === undefined
      ? {
          offset: node.offset,
          message: `“${node.name}” has no kind: add the attribute kind, such as kind=add.`,
          expected: kindNames,
        }
      : {
          offset: given.valueOffset,
          message: `“${readPlain(given.content)}” is no kind of operation.`,
          expected: kindNames,
        },
  );
  return null;
}

/** A label that stands for the kind, and a missing one, give way to the node's name. */
function readLabel(node: DotNode): string {
  const label = node.attributes.get('label');
  const standsForKind = !node.attributes.has('kind');
  const text = label === undefined || standsForKind ? node.name : readText(label.content, node.name);
  return text.trim().slice(0, KERNEL_LIMITS.labelLength).trim();
}

function readOpAttribute(op: Op, name: string, attribute: DotAttribute, faults: DotFault[]): void {
  const param = opSpec(op.kind).params.find((spec) => spec.name === name);
  if (param !== undefined) readParam(op, param, attribute, faults);
  else if (name === 'widthBits') readWidth(op, attribute, faults);
  else if (name === 'positionPx') readPosition(op, attribute, faults);
  else if (name.startsWith(CONSTANT_PREFIX)) readConstant(op, name, attribute, faults);
  else if (!READ_BEFORE.has(name) && !isDrawingAttribute(name))
    faults.push(unknownAttribute(op, name, attribute));
}

/** Attributes that made the op what it is before the others are read. */
const READ_BEFORE: ReadonlySet<string> = new Set(['kind', 'label']);

function unknownAttribute(op: Op, name: string, attribute: DotAttribute): DotFault {
  const params = opSpec(op.kind).params.map((spec) => spec.name);
  const known = [...READ_BEFORE, 'widthBits', 'positionPx', ...params].join(', ');
  return {
    offset: attribute.nameOffset,
    message: `An op of the kind ${op.kind} has no attribute “${name}”.`,
    expected: `${known}, ${CONSTANT_PREFIX}<operand> or an attribute of Graphviz`,
  };
}

function readWidth(op: Op, attribute: DotAttribute, faults: DotFault[]): void {
  const width = wordWidthsBits.find((bits) => bits === readInteger(attribute.content));
  if (width !== undefined) op.widthBits = width;
  else
    faults.push(wrongValue('widthBits', attribute, wordWidthsBits.join(', ').replace(/, (\d+)$/, ' or $1')));
}

const COORDINATE_LIMIT_PX = 1e6;
const COORDINATE = String.raw`([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d{1,3})?)`;
const POSITION = new RegExp(`^\\s*${COORDINATE}\\s*,\\s*${COORDINATE}\\s*$`);

function readPosition(op: Op, attribute: DotAttribute, faults: DotFault[]): void {
  const found = POSITION.exec(attribute.content);
  const [x, y] = [Number(found?.[1]), Number(found?.[2])];
  // Not a number is not within the limit either.
  if (Math.abs(x) <= COORDINATE_LIMIT_PX && Math.abs(y) <= COORDINATE_LIMIT_PX) op.positionPx = { x, y };
  else
    faults.push(
      wrongValue('positionPx', attribute, `two numbers up to ${COORDINATE_LIMIT_PX}, such as "40,64"`),
    );
}

function readConstant(op: Op, name: string, attribute: DotAttribute, faults: DotFault[]): void {
  const port = name.slice(CONSTANT_PREFIX.length);
  const ports = portsOf(op.kind).map((spec) => spec.name);
  if (!ports.includes(port)) {
    faults.push({
      offset: attribute.nameOffset,
      message: `An op of the kind ${op.kind} has no operand “${port}”.`,
      expected: ports.map((one) => CONSTANT_PREFIX + one).join(', '),
    });
    return;
  }
  const value = readInteger(attribute.content);
  if (value === null) faults.push(wrongValue(name, attribute, 'an integer of 32 bits'));
  else op.immediates[port] = value;
}

function readParam(op: Op, param: ParamSpec, attribute: DotAttribute, faults: DotFault[]): void {
  const content = readPlain(attribute.content);
  const value =
    param.type === 'integer'
      ? readInteger(content, param.min, param.max)
      : param.type === 'choice'
        ? (param.choices.find((choice) => choice === content) ?? null)
        : DATA_NAME.test(content)
          ? content
          : null;
  if (value === null) faults.push(wrongValue(param.name, attribute, paramDomain(param)));
  else op.params[param.name] = value;
}

export const wrongValue = (name: string, attribute: DotAttribute, expected: string): DotFault => ({
  offset: attribute.valueOffset,
  message: `“${readPlain(attribute.content).slice(0, 40)}” cannot be the value of “${name}”: give ${expected}.`,
  expected,
});
