/** DOT text to its syntax tree, with bounds on what is read and errors that say where and what was expected. */
import { type DotASTNode, type GraphASTNode, parse } from '@ts-graphviz/ast';
import { prepareDot } from './dot-prepare';
import { describeAt } from './json-cursor';
import { type FormatError, formatErrorAt, type ParseResult, refuse } from './parse-result';

/** Longest text that is read, in UTF-16 units. */
export const MAX_DOT_LENGTH = 2_000_000;
/** Statements, ids and attributes together: enough for 2,000 ops with two operands each. */
const MAX_DOT_NODES = 160_000;
const MAX_EDGE_CHAIN = 500;

const TOO_LARGE = `The graph is too large to read as DOT: more than ${MAX_DOT_NODES} ids, attributes and statements. Use the JSON format.`;

/** The one directed graph of the text. */
export function parseDotSyntax(text: string): ParseResult<GraphASTNode> {
  if (text.length > MAX_DOT_LENGTH) {
    const message = `The text has ${text.length} characters; at most ${MAX_DOT_LENGTH} are read.`;
    return refuse({ line: 1, column: 1, message });
  }
  const prepared = prepareDot(text);
  if (!prepared.ok) return refuse(formatErrorAt(text, prepared.offset, prepared.message));
  let tree: DotASTNode;
  try {
    tree = parse(prepared.text, { maxASTNodes: MAX_DOT_NODES, maxEdgeChainDepth: MAX_EDGE_CHAIN });
  } catch (error) {
    return refuse(syntaxError(text, error));
  }
  const graph = tree.children.find((child) => child.type === 'Graph');
  return graph === undefined
    ? refuse({ line: 1, column: 1, message: 'There is no graph in this text.', expected: 'digraph' })
    : { ok: true, value: graph };
}

/** What the parser throws as the cause: the fault's place and what could have stood there. */
interface ParserFault {
  location: { start: { offset: number } };
  expected: readonly { type: string; text?: string; description?: string }[] | null;
}

function isParserFault(cause: unknown): cause is ParserFault {
  if (typeof cause !== 'object' || cause === null || !('location' in cause) || !('expected' in cause))
    return false;
  const { location, expected } = cause;
  return (
    typeof location === 'object' &&
    location !== null &&
    'start' in location &&
    (expected === null || Array.isArray(expected))
  );
}

function syntaxError(text: string, error: unknown): FormatError {
  const cause = error instanceof Error ? error.cause : undefined;
  if (!isParserFault(cause)) {
    return { line: 1, column: 1, message: TOO_LARGE };
  }
  const { offset } = cause.location.start;
  if (cause.expected === null) return formatErrorAt(text, offset, ruleFault(text, offset, error));
  const expected = expectedText(cause.expected);
  return formatErrorAt(text, offset, `Found ${describeAt(text, offset)}, expected ${expected}.`, {
    expected,
  });
}

/** Faults that the parser finds by itself and not by its grammar. */
function ruleFault(text: string, offset: number, error: unknown): string {
  if (error instanceof Error && /depth/.test(error.message)) {
    return `This chain of connections or label goes on for too long: break it up after ${MAX_EDGE_CHAIN} parts at most.`;
  }
  return text.startsWith('--', offset)
    ? 'In a digraph, connections are written with ->.'
    : 'Connections with a direction need a digraph: write “digraph” in place of “graph”.';
}

const RULE_NAMES: Partial<Record<string, string>> = {
  UNICODE_STRING: 'a name',
  NUMBER: 'a number',
  port: ':',
  '"': 'a quoted string',
};
const COMMENT_STARTS: ReadonlySet<string> = new Set(['/*', '//', '#']);

function expectedText(expected: NonNullable<ParserFault['expected']>): string {
  const names = expected.flatMap((one) => {
    const name = one.text ?? one.description;
    // Classes of characters stand for separators, which may always be left out; markup is refused in any case.
    if (name === undefined || name === '<' || COMMENT_STARTS.has(name)) return [];
    return [RULE_NAMES[name] ?? name];
  });
  const distinct = [...new Set(names)].sort();
  return distinct.length === 0 ? 'the end of the text' : distinct.join(', ').replace(/, ([^,]*)$/, ' or $1');
}
