/** Rules of one op's operands: each required one is driven exactly once, constants fit, predicate and fallback pair up. */
import type { Edge, Op } from './kernel';
import { opSpec, portsOf } from './op-catalog';
import { immediateRange, inRange, opName } from './ports';
import { errorProblem, type Problem } from './problem';

/** K4, K5, K7, K11. `edgesInto` are the edges whose target is the op. */
export function checkOperands(op: Op, edgesInto: readonly Edge[]): Problem[] {
  const problems: Problem[] = [];
  const edgesAt = new Map<string, Edge[]>();
  for (const edge of edgesInto) edgesAt.set(edge.port, [...(edgesAt.get(edge.port) ?? []), edge]);
  for (const port of portsOf(op.kind)) {
    const edges = edgesAt.get(port.name) ?? [];
    const constant = Object.hasOwn(op.immediates, port.name) ? op.immediates[port.name] : undefined;
    const operand = `The operand “${port.label}” of ${opName(op)}`;
    const places = { opIds: [op.id], edgeIds: edges.map((edge) => edge.id), port: port.name };
    if (port.required && edges.length === 0 && constant === undefined) {
      const text = `${operand} is not driven: connect a result to it or give it a constant.`;
      problems.push(errorProblem('missingOperand', text, places));
    }
    if (edges.length > 1) {
      const text = `${operand} is driven by ${edges.length} connections: keep one of them.`;
      problems.push(errorProblem('drivenTwice', text, places));
    }
    if (edges.length > 0 && constant !== undefined) {
      const text = `${operand} has a connection and the constant ${constant}: keep one of them.`;
      problems.push(errorProblem('edgeAndConstant', text, places));
    }
    const range = immediateRange(op, port);
    if (constant !== undefined && !inRange(constant, range)) {
      const text = `${operand} is the constant ${constant}: give a value from ${range.min} to ${range.max}.`;
      problems.push(errorProblem('constantRange', text, places));
    }
  }
  return [...problems, ...checkConstantNames(op), ...checkPredicate(op, edgesAt)];
}

function checkConstantNames(op: Op): Problem[] {
  const known = new Set(portsOf(op.kind).map((port) => port.name));
  return Object.keys(op.immediates)
    .filter((name) => !known.has(name))
    .map((name) =>
      errorProblem('unknownPort', `${opName(op)} has no operand “${name}”: remove its constant.`, {
        opIds: [op.id],
        port: name,
      }),
    );
}

function checkPredicate(op: Op, edgesAt: ReadonlyMap<string, readonly Edge[]>): Problem[] {
  const has = (port: string) => edgesAt.has(port) || Object.hasOwn(op.immediates, port);
  const places = (port: string) => ({
    opIds: [op.id],
    edgeIds: (edgesAt.get(port) ?? []).map((edge) => edge.id),
    port,
  });
  const spec = opSpec(op.kind);
  if (spec.output === null) return [];
  if (has('fallback') && !has('predicate')) {
    const text = `${opName(op)} has a fallback but no predicate: connect a flag to its predicate or remove the fallback.`;
    return [errorProblem('fallbackWithoutPredicate', text, places('fallback'))];
  }
  if (has('predicate') && !has('fallback')) {
    const text = `${opName(op)} has a predicate but no fallback: say what it gives when it does not fire, by a connection or a constant.`;
    return [errorProblem('predicateWithoutFallback', text, places('predicate'))];
  }
  return [];
}
