/** What every reader of a file returns: the document, or the places where the text is wrong. Never both. */
export interface FormatError {
  /** Counted from 1. */
  line: number;
  /** Counted from 1, in UTF-16 units, as editors count. */
  column: number;
  /** Where in the document, such as `ops[3].widthBits`. */
  path?: string;
  /** What is wrong and what to do, as one sentence. */
  message: string;
  /** What may stand there, where that is known. */
  expected?: string;
}

export type ParseResult<T> = { ok: true; value: T } | { ok: false; errors: FormatError[] };

/** A reader reports at most this many errors of one text. */
export const MAX_FORMAT_ERRORS = 20;

/** The line and column of an offset; CR, LF and CR LF end lines. */
export function positionAt(text: string, offset: number): { line: number; column: number } {
  const before = text.slice(0, offset);
  let line = 1;
  let lineStart = 0;
  for (const match of before.matchAll(/\r\n|\n|\r/g)) {
    // A CR LF that the offset splits is not over yet.
    if (match[0] === '\r' && text[match.index + 1] === '\n') continue;
    line++;
    lineStart = match.index + match[0].length;
  }
  return { line, column: offset - lineStart + 1 };
}

export const formatErrorAt = (
  text: string,
  offset: number,
  message: string,
  more: { path?: string; expected?: string } = {},
): FormatError => ({ ...positionAt(text, offset), message, ...more });

export const refuse = (...errors: FormatError[]): { ok: false; errors: FormatError[] } => ({
  ok: false,
  errors: errors.slice(0, MAX_FORMAT_ERRORS),
});
