/** Texts in DOT: quoting and escapes, so that any text comes back as it was and Graphviz shows it as it is. */

const LINE_CONTINUATION = /\\\r?\n/g;

/**
 * A quoted string that stands for the text. Backslashes are doubled, line feeds become `\n`, ampersands and control
 * characters become character references, as Graphviz reads them in labels.
 */
export const quoteText = (text: string): string =>
  `"${text
    .replaceAll('\\', '\\\\')
    .replaceAll('"', '\\"')
    .replaceAll('&', '&amp;')
    .replaceAll('\n', '\\n')
    .replace(/\p{Cc}|\p{Cs}|\u2028|\u2029/gu, (one) => `&#${one.charCodeAt(0)};`)}"`;

const PLAIN = /^(?:[A-Za-z_][A-Za-z0-9_]*|-?\d+)$/;
const KEYWORDS: ReadonlySet<string> = new Set(['node', 'edge', 'graph', 'digraph', 'subgraph', 'strict']);

/** A name or integer as it is, anything else quoted. */
export const plainOrQuoted = (text: string): string =>
  PLAIN.test(text) && !KEYWORDS.has(text.toLowerCase()) ? text : quoteText(text);

const NAMED_CHARACTERS: ReadonlyMap<string, string> = new Map([
  ['amp', '&'],
  ['lt', '<'],
  ['gt', '>'],
  ['quot', '"'],
]);

/** The text that the content of a string stands for. `\N` is the node's name, other escaped letters themselves. */
export function readText(content: string, nodeName = ''): string {
  const unescaped = content
    .replace(LINE_CONTINUATION, '')
    .replace(/\\([\s\S])/g, (_, letter: string) =>
      letter === 'N' ? nodeName : letter === 'n' || letter === 'l' || letter === 'r' ? '\n' : letter,
    );
  return unescaped.replace(/&(?:#(\d{1,7})|#x([0-9a-fA-F]{1,6})|([a-z]+));/g, (whole, decimal, hex, name) => {
    if (name !== undefined) return NAMED_CHARACTERS.get(name) ?? whole;
    const code = decimal === undefined ? Number.parseInt(hex, 16) : Number(decimal);
    return code <= 0x10ffff ? String.fromCodePoint(code) : whole;
  });
}

/** The content of an id or plain value: only line continuations are resolved. */
export const readPlain = (content: string): string => content.replace(LINE_CONTINUATION, '');
