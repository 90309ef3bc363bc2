/** DOT to a kernel: graphs of our own writing and ordinary hand-written ones. See docs/formats/dot.md. */
import { applyEdit } from '../graph/edits';
import { freshOpId } from '../graph/ids';
import { emptyKernel, KERNEL_LIMITS, type Kernel, kernelSchema, type Op, opIdSchema } from '../graph/kernel';
import { layoutEdit } from '../graph/layout';
import { isDrawingAttribute } from './dot-attribute-names';
import { readEdges } from './dot-edges';
import { readOp } from './dot-op';
import { type DotFault, type DotGraph, resolveStatements } from './dot-statements';
import { parseDotSyntax } from './dot-syntax';
import { readText } from './dot-text';
import { formatErrorAt, MAX_FORMAT_ERRORS, type ParseResult, refuse } from './parse-result';

const UNNAMED_KERNEL = 'Imported kernel';
const NAMES_WITHOUT_MEANING: ReadonlySet<string> = new Set(['', 'G', 'kernel']);

/**
 * The kernel of a digraph, or up to twenty errors at their statements and attributes; nothing is guessed after an error.
 * Whether the kernel is legal is for `validateKernel` to say. Nodes without positions are laid out.
 */
export function parseKernelDot(text: string): ParseResult<Kernel> {
  const syntax = parseDotSyntax(text);
  if (!syntax.ok) return syntax;
  const graph = resolveStatements(syntax.value);
  const faults = [...graph.faults];
  const ops = graph.faults.length > 0 ? new Map<string, ReadOp>() : readOps(graph, faults);
  const edges = readEdges(graph.edges, new Map([...ops].map(([name, { op }]) => [name, op])), faults);
  const { name, description } = readMeta(graph, faults);
  if (faults.length > 0) {
    const first = faults.sort((a, b) => a.offset - b.offset).slice(0, MAX_FORMAT_ERRORS);
    return refuse(
      ...first.map(({ offset, message, expected }) => formatErrorAt(text, offset, message, { expected })),
    );
  }
  const kernel: Kernel = {
    ...emptyKernel(name),
    description,
    ops: [...ops.values()].map(({ op }) => op),
    edges,
  };
  const unplaced = [...ops.values()].filter(({ hasPosition }) => !hasPosition);
  if (unplaced.length === 0) return { ok: true, value: kernel };
  const layout =
    unplaced.length === ops.size
      ? layoutEdit(kernel)
      : layoutEdit(
          kernel,
          unplaced.map(({ op }) => op.id),
        );
  const laidOut = applyEdit(kernel, layout);
  return { ok: true, value: laidOut.ok ? laidOut.value : kernel };
}

interface ReadOp {
  op: Op;
  hasPosition: boolean;
}

/** Names that are op ids stay what they are; others become ids as near to the name as can be. */
function readOps(graph: DotGraph, faults: DotFault[]): Map<string, ReadOp> {
  const taken = new Set<string>();
  for (const name of graph.nodes.keys()) if (opIdSchema.safeParse(name).success) taken.add(name);
  const ops = new Map<string, ReadOp>();
  for (const node of graph.nodes.values()) {
    const own = opIdSchema.safeParse(node.name);
    const id = own.success ? own.data : freshOpId(taken, node.name);
    taken.add(id);
    const read = readOp(node, id, faults);
    if (read !== null) ops.set(node.name, read);
  }
  return ops;
}

function readMeta(graph: DotGraph, faults: DotFault[]): { name: string; description: string } {
  for (const [name, attribute] of graph.attributes) {
    if (name === 'name' || name === 'description' || isDrawingAttribute(name)) continue;
    faults.push({
      offset: attribute.nameOffset,
      message: `A kernel has no attribute “${name}”.`,
      expected: 'name, description or an attribute of Graphviz',
    });
  }
  const given = graph.attributes.get('name');
  const ownName = given === undefined ? (graph.name ?? '') : readText(given.content);
  const named = given === undefined && NAMES_WITHOUT_MEANING.has(ownName) ? UNNAMED_KERNEL : ownName;
  const name = named.trim().slice(0, KERNEL_LIMITS.nameLength).trim() || UNNAMED_KERNEL;
  const described = graph.attributes.get('description');
  const description = kernelSchema.shape.description.safeParse(readText(described?.content ?? ''));
  if (!description.success && described !== undefined) {
    const message = 'The description is longer than 2000 characters: shorten it.';
    faults.push({ offset: described.valueOffset, message, expected: 'at most 2000 characters' });
  }
  return { name, description: description.success ? description.data : '' };
}
