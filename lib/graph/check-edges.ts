/** Rules of single connections: ends, ports, types, widths, values carried in from before the first iteration. */
import type { Edge, Kernel, Op } from './kernel';
import type { KernelIndex } from './kernel-index';
import { opSpec, type PortSpec } from './op-catalog';
import { connectionFault, initialValueRange, inRange, isConstantOnly, opName, portOf } from './ports';
import { errorProblem, type Problem, type ProblemCode } from './problem';

/** K2, K3, K6, K9. */
export function checkEdges(kernel: Kernel, { opById }: KernelIndex): Problem[] {
  return kernel.edges.flatMap((edge) => {
    const source = opById.get(edge.from);
    const target = opById.get(edge.to);
    if (source === undefined || target === undefined) return [missingEnd(edge, source, target)];
    return [...checkPort(edge, source, target), ...checkInitialValues(edge, source, target)];
  });
}

function missingEnd(edge: Edge, source: Op | undefined, target: Op | undefined): Problem {
  const missing = source === undefined ? edge.from : edge.to;
  const known = source ?? target;
  const end = known === undefined ? '' : ` of ${opName(known)}`;
  return errorProblem(
    'missingOp',
    `A connection${end} needs the op ${missing}, which does not exist: remove the connection ${edge.id} or add the op.`,
    { opIds: known === undefined ? [] : [known.id], edgeIds: [edge.id] },
  );
}

function checkPort(edge: Edge, source: Op, target: Op): Problem[] {
  const places = { opIds: [target.id, source.id], edgeIds: [edge.id], port: edge.port };
  const port = portOf(target, edge.port);
  if (port === undefined) {
    const text = `${opName(target)} has no operand “${edge.port}”: remove the connection from ${opName(source)} or lead it to another operand.`;
    return [errorProblem('unknownPort', text, places)];
  }
  const fault = connectionFault(source, target, port);
  if (fault === null) return [];
  return [errorProblem(faultCode(source, target, port), fault, places)];
}

/** The code of what `connectionFault` found. */
function faultCode(source: Op, target: Op, port: PortSpec): ProblemCode {
  const { output } = opSpec(source.kind);
  if (output === null) return 'noResult';
  if (isConstantOnly(target, port)) return 'rateMismatch';
  return (output === 'flag') === (port.type === 'flag') ? 'widthMismatch' : 'typeMismatch';
}

function checkInitialValues(edge: Edge, source: Op, target: Op): Problem[] {
  const places = { opIds: [target.id, source.id], edgeIds: [edge.id], port: edge.port };
  const name = `The connection from ${opName(source)} to ${opName(target)}`;
  const problems: Problem[] = [];
  if (edge.initialValues.length > edge.distance) {
    const text = `${name} has ${edge.initialValues.length} initial values but a distance of ${edge.distance}: remove the surplus or raise the distance.`;
    problems.push(errorProblem('initialValueCount', text, places));
  }
  const range = initialValueRange(source);
  const outside = edge.initialValues.find((value) => !inRange(value, range));
  if (outside !== undefined && opSpec(source.kind).output !== null) {
    const text = `${name} starts with ${outside}: give a value from ${range.min} to ${range.max}.`;
    problems.push(errorProblem('initialValueRange', text, places));
  }
  return problems;
}
