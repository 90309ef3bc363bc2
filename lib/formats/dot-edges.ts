/** The connections of a DOT graph to edges: which operand each drives, how far it is carried, what it starts with. */
import { freshEdgeId } from '../graph/ids';
import { type Edge, type EdgeId, edgeIdSchema, KERNEL_LIMITS, type Op } from '../graph/kernel';
import { opSpec, portsOf } from '../graph/op-catalog';
import { isDrawingAttribute } from './dot-attribute-names';
import { readInteger, wrongValue } from './dot-op';
import type { DotEdge, DotFault } from './dot-statements';
import { readPlain } from './dot-text';

const EDGE_ATTRIBUTES = ['id', 'port', 'distance', 'initialValues'];

interface Drawn {
  dot: DotEdge;
  from: Op;
  to: Op;
  /** Null until a free operand is found for it. */
  port: string | null;
}

/**
 * Connections that name their operand take it first; the others take, in the order of the text, the first required
 * operand of their target that is still free. Connections of nodes without an op are passed over.
 */
export function readEdges(
  edges: readonly DotEdge[],
  opByName: ReadonlyMap<string, Op>,
  faults: DotFault[],
): Edge[] {
  const drawn: Drawn[] = edges.flatMap((dot) => {
    const [from, to] = [opByName.get(dot.from), opByName.get(dot.to)];
    return from === undefined || to === undefined ? [] : [{ dot, from, to, port: null }];
  });
  const driven = new Map<Op, Set<string>>();
  for (const op of opByName.values()) driven.set(op, new Set(Object.keys(op.immediates)));
  for (const edge of drawn) edge.port = claimNamed(edge, driven.get(edge.to)!, faults);
  for (const edge of drawn) edge.port ??= claimFree(edge, driven.get(edge.to)!, faults);
  const ids = readIds(drawn, faults);
  return drawn.flatMap((edge, i) => {
    checkNames(edge.dot, faults);
    if (edge.port === null) return [];
    const distance = readDistance(edge.dot, faults);
    const initialValues = readInitialValues(edge.dot, faults);
    return [{ id: ids[i]!, from: edge.from.id, to: edge.to.id, port: edge.port, distance, initialValues }];
  });
}

/** The operand that the connection names, by attribute or behind the target's name. */
function namedPort({ port, attributes }: DotEdge): { name: string; offset: number } | null {
  const attribute = attributes.get('port');
  if (port !== null) return port;
  return attribute === undefined
    ? null
    : { name: readPlain(attribute.content), offset: attribute.valueOffset };
}

const UNNAMED = null;

function claimNamed({ dot, to, from }: Drawn, driven: Set<string>, faults: DotFault[]): string | null {
  if (opSpec(from.kind).output === null) {
    const message = `An op of the kind ${from.kind} has no result to connect.`;
    faults.push({ offset: dot.offset, message, expected: 'an op with a result' });
  }
  const named = namedPort(dot);
  if (named === null) return UNNAMED;
  const ports = portsOf(to.kind).map((spec) => spec.name);
  if (!ports.includes(named.name)) {
    const message = `An op of the kind ${to.kind} has no operand “${named.name}”.`;
    faults.push({ offset: named.offset, message, expected: ports.join(', ') });
  } else if (driven.has(named.name)) {
    const message = `The operand “${named.name}” of “${dot.to}” is driven already: keep one constant or connection.`;
    faults.push({ offset: named.offset, message });
  }
  driven.add(named.name);
  return named.name;
}

function claimFree({ dot, to }: Drawn, driven: Set<string>, faults: DotFault[]): string | null {
  const free = opSpec(to.kind).inputs.find((spec) => !driven.has(spec.name));
  if (free === undefined) {
    const message = `“${dot.to}” has no operand left for this connection: name one by the attribute port or remove it.`;
    const expected = portsOf(to.kind)
      .map((spec) => `port=${spec.name}`)
      .join(', ');
    faults.push({ offset: dot.targetOffset, message, expected });
    return null;
  }
  driven.add(free.name);
  return free.name;
}

/** Ids as given where they are ours, else fresh ones. */
function readIds(drawn: readonly Drawn[], faults: DotFault[]): EdgeId[] {
  const taken = new Set<string>();
  const given = drawn.map(({ dot }) => {
    const attribute = dot.attributes.get('id');
    const parsed = edgeIdSchema.safeParse(attribute === undefined ? '' : readPlain(attribute.content));
    if (attribute === undefined || !parsed.success) return null;
    if (taken.has(parsed.data)) {
      const message = `Another connection has the id ${parsed.data} already.`;
      faults.push({ offset: attribute.valueOffset, message });
    }
    taken.add(parsed.data);
    return parsed.data;
  });
  let next = 1;
  return given.map((id) => {
    if (id !== null) return id;
    while (taken.has(`edge_${next}`)) next++;
    const fresh = freshEdgeId(taken, String(next));
    taken.add(fresh);
    return fresh;
  });
}

function checkNames(dot: DotEdge, faults: DotFault[]): void {
  for (const [name, attribute] of dot.attributes) {
    if (EDGE_ATTRIBUTES.includes(name) || isDrawingAttribute(name)) continue;
    faults.push({
      offset: attribute.nameOffset,
      message: `A connection has no attribute “${name}”.`,
      expected: `${EDGE_ATTRIBUTES.join(', ')} or an attribute of Graphviz`,
    });
  }
}

function readDistance(dot: DotEdge, faults: DotFault[]): number {
  const attribute = dot.attributes.get('distance');
  if (attribute === undefined) return 0;
  const value = readInteger(attribute.content, 0, KERNEL_LIMITS.distance);
  if (value === null) {
    faults.push(wrongValue('distance', attribute, `an integer from 0 to ${KERNEL_LIMITS.distance}`));
  }
  return value ?? 0;
}

function readInitialValues(dot: DotEdge, faults: DotFault[]): number[] {
  const attribute = dot.attributes.get('initialValues');
  const words = attribute?.content.split(/[\s,]+/).filter((word) => word !== '') ?? [];
  const values = words.map((word) => readInteger(word));
  const known = values.filter((value) => value !== null);
  if (attribute !== undefined && (known.length < values.length || values.length > KERNEL_LIMITS.distance)) {
    const expected = `up to ${KERNEL_LIMITS.distance} integers of 32 bits with spaces between them`;
    faults.push(wrongValue('initialValues', attribute, expected));
  }
  return known;
}
