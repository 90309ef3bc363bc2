/** Reads JSON text (RFC 8259) token by token from a position that moves. */

export interface JsonFault {
  offset: number;
  message: string;
  expected?: string;
}

export interface JsonCursor {
  readonly text: string;
  /** Offset of the next character. */
  at: number;
}

// The ranges are every character from the space on but the quotation mark and the backslash.
const CHARACTERS = String.raw`(?:[ -!#-[\]-\uffff]|\\(?:["\\/bfnrt]|u[0-9a-fA-F]{4}))*`;
const STRING = new RegExp(`"${CHARACTERS}"`, 'y');
const BROKEN_STRING = new RegExp(`"${CHARACTERS}`, 'y');
const SPACE = /[ \t\n\r]*/y;
const NUMBER = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y;
const WORD = /true|false|null/y;

/** A name that would reach into the prototype of a plain object. */
const FORBIDDEN_NAME = '__proto__';

function take(cursor: JsonCursor, pattern: RegExp): string | null {
  pattern.lastIndex = cursor.at;
  const found = pattern.exec(cursor.text)?.[0] ?? null;
  if (found !== null) cursor.at += found.length;
  return found;
}

export const skipSpace = (cursor: JsonCursor): void => {
  take(cursor, SPACE);
};

export const unexpected = (cursor: JsonCursor, expected: string): JsonFault => ({
  offset: cursor.at,
  message: `Found ${describeAt(cursor.text, cursor.at)}, expected ${expected}.`,
  expected,
});

/** Passes over a string, a number or a word; the fault if there is none. */
export function skipScalar(cursor: JsonCursor): JsonFault | null {
  if (cursor.text[cursor.at] === '"') return take(cursor, STRING) === null ? stringFault(cursor) : null;
  if (take(cursor, NUMBER) !== null || take(cursor, WORD) !== null) return null;
  return unexpected(cursor, 'a value');
}

function stringFault(cursor: JsonCursor): JsonFault {
  const { text, at: start } = cursor;
  take(cursor, BROKEN_STRING);
  if (cursor.at >= text.length) {
    return { offset: start, message: 'This string has no closing quotation mark.', expected: '"' };
  }
  const found = describeAt(text, cursor.at);
  return { offset: cursor.at, message: `A string cannot hold ${found} as it stands: write it as an escape.` };
}

/** Reads the name of a member and the colon after it; adds it to the names seen in this object. */
export function takeName(
  cursor: JsonCursor,
  seen: Set<string>,
): JsonFault | { name: string; offset: number } {
  const offset = cursor.at;
  if (cursor.text[offset] !== '"') return unexpected(cursor, 'a name in quotation marks');
  const quoted = take(cursor, STRING);
  if (quoted === null) return stringFault(cursor);
  const name: string = JSON.parse(quoted);
  if (name === FORBIDDEN_NAME) return { offset, message: `The name “${name}” is not allowed.` };
  if (seen.has(name)) return { offset, message: `The name “${name}” occurs twice in one object.` };
  seen.add(name);
  skipSpace(cursor);
  if (cursor.text[cursor.at] !== ':') return unexpected(cursor, 'a colon');
  cursor.at++;
  return { name, offset };
}

/** What stands at an offset, for messages: one character, or the end of the text. */
export function describeAt(text: string, offset: number): string {
  const code = text.codePointAt(offset);
  if (code === undefined) return 'the end of the text';
  if (code >= 0x20 && code !== 0x7f) return `“${String.fromCodePoint(code)}”`;
  return `the control character U+${code.toString(16).toUpperCase().padStart(4, '0')}`;
}
