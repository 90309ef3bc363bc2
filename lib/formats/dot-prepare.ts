/**
 * Looks over DOT text before it is parsed: bounds how deep it nests, and blanks separators that the language allows but
 * the parser does not know (a semicolon after a closing brace, semicolons and commas within `-> { }`, `] [` between two
 * attribute lists). The text keeps its length, so places stay true. Linear.
 */
export const MAX_DOT_DEPTH = 48;
/** Attributes in one text; the parser takes its time over each, so more are refused before it begins. */
export const MAX_DOT_ATTRIBUTES = 60_000;

type Prepared = { ok: true; text: string } | { ok: false; offset: number; message: string };

/**
 * A comment, a quoted string, an arrow, white space, or any one character. Comments and strings that are not closed run
 * to the end of the text, so that no part of it is looked at twice.
 */
const TOKEN = /\/\*[\s\S]*?\*\/|\/\*[\s\S]*|\/\/[^\r\n]*|"(?:[^"\\]|\\[\s\S])*"?|->|\s+|[\s\S]/g;
const LINE_COMMENT = /#[^\r\n]*/y;

export function prepareDot(text: string): Prepared {
  const blanks: number[] = [];
  /** Whether each open brace groups the ends of a connection. */
  const groups: boolean[] = [];
  let last = { token: '', offset: 0 };
  let attributes = 0;
  TOKEN.lastIndex = 0;
  for (let found = TOKEN.exec(text); found !== null; found = TOKEN.exec(text)) {
    const token = found[0];
    const offset = found.index;
    if (token === '#' && startsLine(text, offset)) {
      LINE_COMMENT.lastIndex = offset;
      TOKEN.lastIndex = offset + (LINE_COMMENT.exec(text)?.[0].length ?? 1);
      continue;
    }
    if (isBetween(token)) continue;
    if (token === '=' && ++attributes > MAX_DOT_ATTRIBUTES) {
      const message = `The graph has more than ${MAX_DOT_ATTRIBUTES} attributes: use the JSON format.`;
      return { ok: false, offset, message };
    }
    if (token === '{') {
      if (groups.length >= MAX_DOT_DEPTH) {
        return { ok: false, offset, message: `Subgraphs nest deeper than ${MAX_DOT_DEPTH} levels.` };
      }
      groups.push(last.token === '->');
    } else if (token === '}') {
      groups.pop();
    } else if (token === ';' && (last.token === '}' || groups.at(-1))) {
      blanks.push(offset);
      continue;
    } else if (token === ',' && groups.at(-1)) {
      blanks.push(offset);
    } else if (token === '[' && last.token === ']') {
      blanks.push(last.offset, offset);
    }
    last = { token, offset };
  }
  return { ok: true, text: withBlanks(text, blanks) };
}

const isBetween = (token: string): boolean =>
  token.startsWith('/*') || token.startsWith('//') || token.trim() === '';

const startsLine = (text: string, offset: number): boolean =>
  offset === 0 || text[offset - 1] === '\n' || text[offset - 1] === '\r';

function withBlanks(text: string, offsets: readonly number[]): string {
  // A byte order mark is no part of the language.
  const body = text.startsWith('\ufeff') ? ` ${text.slice(1)}` : text;
  if (offsets.length === 0) return body;
  const parts: string[] = [];
  let from = 0;
  for (const offset of [...offsets].sort((a, b) => a - b)) {
    parts.push(body.slice(from, offset));
    from = offset + 1;
  }
  parts.push(body.slice(from));
  return parts.join(' ');
}
