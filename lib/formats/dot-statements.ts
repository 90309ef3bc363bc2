/** The statements of a DOT graph brought to lists of nodes and connections, with defaults and subgraphs resolved. */
import type {
  AttributeASTNode,
  ClusterStatementASTNode,
  EdgeASTNode,
  EdgeTargetASTNode,
  GraphASTNode,
  LiteralASTNode,
  NodeRefASTNode,
} from '@ts-graphviz/ast';
import { KERNEL_LIMITS } from '../graph/kernel';
import { readPlain } from './dot-text';

export interface DotAttribute {
  /** The content of the value as written, escapes and all. */
  content: string;
  nameOffset: number;
  valueOffset: number;
}
export type DotAttributes = ReadonlyMap<string, DotAttribute>;

export interface DotNode {
  name: string;
  /** Where the node is first mentioned. */
  offset: number;
  attributes: Map<string, DotAttribute>;
}

export interface DotEdge {
  from: string;
  to: string;
  /** Where the statement, and the target's name in it, begin. */
  offset: number;
  targetOffset: number;
  /** The port written behind the target's name, as in `a -> b:port`. */
  port: { name: string; offset: number } | null;
  attributes: DotAttributes;
}

export interface DotFault {
  offset: number;
  message: string;
  expected?: string;
}

export interface DotGraph {
  name: string | null;
  attributes: Map<string, DotAttribute>;
  nodes: Map<string, DotNode>;
  edges: DotEdge[];
  faults: DotFault[];
}

/** Attributes of one node, connection or list. No kind of op has a tenth of them. */
const MAX_ATTRIBUTES = 100;

interface Scope {
  node: DotAttributes;
  edge: DotAttributes;
}

const offsetOf = (node: { location?: { start: { offset: number } } }): number =>
  node.location?.start.offset ?? 0;

/** Defaults hold from their statement to the end of their braces, as in Graphviz. Recursion is bounded by the syntax. */
export function resolveStatements(tree: GraphASTNode): DotGraph {
  const graph: DotGraph = {
    name: tree.id === undefined ? null : readPlain(tree.id.value),
    attributes: new Map(),
    nodes: new Map(),
    edges: [],
    faults: [],
  };
  if (!tree.directed) {
    graph.faults.push({
      offset: offsetOf(tree),
      message: 'Connections of a kernel have a direction: write “digraph” and “->”.',
      expected: 'digraph',
    });
  } else if (tree.strict) {
    graph.faults.push({
      offset: offsetOf(tree),
      message:
        'A strict graph has one connection at most between two ops, which a kernel may need more of: remove the word “strict”.',
      expected: 'digraph',
    });
  } else {
    resolveBlock(graph, tree.children, { node: new Map(), edge: new Map() }, true);
  }
  return graph;
}

function resolveBlock(
  graph: DotGraph,
  statements: readonly ClusterStatementASTNode[],
  outer: Scope,
  isRoot: boolean,
): void {
  const scope = { ...outer };
  for (const statement of statements) {
    switch (statement.type) {
      case 'Attribute':
        if (isRoot) addAttributes(graph, graph.attributes, [statement]);
        break;
      case 'AttributeList': {
        const list = attributesOf(graph, statement.children);
        if (statement.kind === 'Node') scope.node = withDefaults(scope.node, list);
        else if (statement.kind === 'Edge') scope.edge = withDefaults(scope.edge, list);
        else if (isRoot) for (const [name, value] of list) graph.attributes.set(name, value);
        break;
      }
      case 'Node': {
        const node = mention(graph, statement.id, scope);
        for (const [name, value] of attributesOf(graph, statement.children))
          node?.attributes.set(name, value);
        break;
      }
      case 'Edge':
        resolveEdge(graph, statement, scope);
        break;
      case 'Subgraph':
        resolveBlock(graph, statement.children, scope, false);
        break;
      case 'Comment':
        break;
    }
  }
}

/** Defaults are copied to every node or connection they hold for, so their number is kept small. */
function withDefaults(old: DotAttributes, added: DotAttributes): DotAttributes {
  const all = [...old, ...added];
  // The newest ones of a name win; beyond the limit the oldest names go.
  return new Map([...new Map(all)].slice(-MAX_ATTRIBUTES));
}

/** The node of a name; a new one takes the defaults that hold here. Null beyond the largest kernel. */
function mention(graph: DotGraph, id: LiteralASTNode, scope: Scope): DotNode | null {
  const name = readPlain(id.value);
  const known = graph.nodes.get(name);
  if (known !== undefined) return known;
  const offset = offsetOf(id);
  if (id.quoted === 'html') {
    graph.faults.push({
      offset,
      message: 'A name cannot be HTML: write a plain or quoted name.',
      expected: 'a name',
    });
    return null;
  }
  if (graph.nodes.size >= KERNEL_LIMITS.ops) {
    const already = graph.faults.some((fault) => fault.message === TOO_MANY_OPS);
    if (!already) graph.faults.push({ offset, message: TOO_MANY_OPS });
    return null;
  }
  const node = { name, offset, attributes: new Map(scope.node) };
  graph.nodes.set(name, node);
  return node;
}

const TOO_MANY_OPS = `A kernel has at most ${KERNEL_LIMITS.ops} ops.`;
const TOO_MANY_EDGES = `A kernel has at most ${KERNEL_LIMITS.edges} connections.`;

const endsOf = (target: EdgeTargetASTNode): readonly NodeRefASTNode[] =>
  target.type === 'NodeRef' ? [target] : target.children;

function resolveEdge(graph: DotGraph, statement: EdgeASTNode, scope: Scope): void {
  const attributes = new Map([...scope.edge, ...attributesOf(graph, statement.children)]);
  const groups = statement.targets.map(endsOf);
  for (const ref of groups.flat()) mention(graph, ref.id, scope);
  for (let i = 0; i + 1 < groups.length; i++) {
    for (const from of groups[i]!) {
      for (const to of groups[i + 1]!) {
        if (graph.edges.length >= KERNEL_LIMITS.edges) {
          graph.faults.push({ offset: offsetOf(statement), message: TOO_MANY_EDGES });
          return;
        }
        graph.edges.push({
          from: readPlain(from.id.value),
          to: readPlain(to.id.value),
          offset: offsetOf(statement),
          targetOffset: offsetOf(to),
          port: operandPort(to),
          attributes,
        });
      }
    }
  }
}

const COMPASS: ReadonlySet<string> = new Set(['n', 'ne', 'e', 'se', 's', 'sw', 'w', 'nw', 'c', '_']);

/** Compass points say where a line ends in the drawing and are no operands. */
function operandPort({ port }: NodeRefASTNode): DotEdge['port'] {
  if (port === undefined || COMPASS.has(port.value)) return null;
  return { name: readPlain(port.value), offset: offsetOf(port) };
}

function attributesOf(
  graph: DotGraph,
  children: readonly (AttributeASTNode | { type: 'Comment' })[],
): Map<string, DotAttribute> {
  const found = new Map<string, DotAttribute>();
  addAttributes(
    graph,
    found,
    children.filter((child): child is AttributeASTNode => child.type === 'Attribute'),
  );
  return found;
}

function addAttributes(
  graph: DotGraph,
  target: Map<string, DotAttribute>,
  attributes: readonly AttributeASTNode[],
): void {
  for (const { key, value } of attributes) {
    if (target.size >= MAX_ATTRIBUTES && !target.has(readPlain(key.value))) {
      const message = `There are more than ${MAX_ATTRIBUTES} attributes in one place.`;
      graph.faults.push({ offset: offsetOf(key), message });
      return;
    }
    if (value.quoted === 'html') {
      graph.faults.push({
        offset: offsetOf(value),
        message: `The value of “${key.value}” is HTML, which is not read: write a plain or quoted text.`,
        expected: 'a plain or quoted text',
      });
      continue;
    }
    target.set(readPlain(key.value), {
      content: value.value,
      nameOffset: offsetOf(key),
      valueOffset: offsetOf(value),
    });
  }
}
