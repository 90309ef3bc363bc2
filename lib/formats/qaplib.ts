/**
 * Reads quadratic assignment instances in the text format of QAPLIB (Burkard, Karisch and Rendl 1997): n, then two
 * n × n matrices row by row. White space separates; how the numbers are spread over lines does not matter.
 */
import { type FormatError, formatErrorAt, MAX_FORMAT_ERRORS, type ParseResult, refuse } from './parse-result';

/** The objective is the least Σ first[i, j] · second[p(i), p(j)] over all i and j, i = j included. */
export interface QaplibDocument {
  n: number;
  /** Whole numbers at [i · n + j], rows first. */
  first: Float64Array;
  second: Float64Array;
}

export const QAPLIB_LIMITS = {
  n: 200,
  /** In UTF-16 units; 80,001 numbers of the longest kind fit. */
  textLength: 4_000_000,
  /** n² times the largest entries of both matrices: below, every sum that a solver forms is exact in a double. */
  sum: Number.MAX_SAFE_INTEGER / 16,
} as const;

interface Token {
  text: string;
  offset: number;
}

/** A text with any fault is refused as a whole; each bad entry is named, up to `MAX_FORMAT_ERRORS`. */
export function parseQaplib(text: string): ParseResult<QaplibDocument> {
  if (text.length > QAPLIB_LIMITS.textLength) {
    const message = `The text has ${text.length} characters; at most ${QAPLIB_LIMITS.textLength} are read.`;
    return refuse({ line: 1, column: 1, message });
  }
  const tokens = text.matchAll(/\S+/g);
  const n = readSize(text, next(tokens));
  if (typeof n !== 'number') return refuse(n);
  const entries = new Float64Array(2 * n * n);
  const errors: FormatError[] = [];
  for (let at = 0; at < entries.length && errors.length < MAX_FORMAT_ERRORS; at++) {
    const token = next(tokens);
    if (token === null) return refuse(...errors, tooFew(text, n, at));
    const value = wholeNumber(token.text);
    if (value === null) errors.push(badEntry(text, token, n, at));
    else entries[at] = value;
  }
  const extra = errors.length < MAX_FORMAT_ERRORS ? next(tokens) : null;
  if (extra) errors.push(tooMany(text, extra, n));
  if (errors.length > 0) return refuse(...errors);
  const document = { n, first: entries.slice(0, n * n), second: entries.slice(n * n) };
  return largeSums(text, document) ?? { ok: true, value: document };
}

function next(tokens: IterableIterator<RegExpExecArray>): Token | null {
  const found = tokens.next();
  return found.done ? null : { text: found.value[0], offset: found.value.index };
}

/** Null unless the text is a whole number that a double holds exactly. */
function wholeNumber(text: string): number | null {
  if (!/^[+-]?\d{1,20}$/.test(text)) return null;
  const value = Number(text);
  // −0 is 0.
  return Number.isSafeInteger(value) ? value + 0 : null;
}

function readSize(text: string, token: Token | null): number | FormatError {
  const expected = `a whole number from 1 to ${QAPLIB_LIMITS.n}, the number of facilities`;
  if (token === null) {
    return formatErrorAt(text, text.length, 'The text is empty.', { path: 'size', expected });
  }
  const n = wholeNumber(token.text);
  if (n !== null && n >= 1 && n <= QAPLIB_LIMITS.n) return n;
  return formatErrorAt(text, token.offset, `Found ${shown(token.text)}.`, { path: 'size', expected });
}

/** Where in the document the entry stands, rows and columns counted from 1. */
function placeOf(n: number, at: number): string {
  const within = at % (n * n);
  const matrix = at < n * n ? 'first matrix' : 'second matrix';
  return `${matrix}, row ${Math.floor(within / n) + 1}, column ${(within % n) + 1}`;
}

function badEntry(text: string, token: Token, n: number, at: number): FormatError {
  return formatErrorAt(text, token.offset, `Found ${shown(token.text)}.`, {
    path: placeOf(n, at),
    expected: `a whole number from -${Number.MAX_SAFE_INTEGER} to ${Number.MAX_SAFE_INTEGER}`,
  });
}

function tooFew(text: string, n: number, at: number): FormatError {
  return formatErrorAt(text, text.length, `The text ends after ${at} of ${2 * n * n} entries.`, {
    path: placeOf(n, at),
    expected: 'a whole number',
  });
}

function tooMany(text: string, token: Token, n: number): FormatError {
  const message = `Found ${shown(token.text)} after the last entry: size ${n} means ${2 * n * n} entries.`;
  return formatErrorAt(text, token.offset, message, { expected: 'the end of the text' });
}

/** Refuses entries so large that sums would be rounded, at the largest entry of all. */
function largeSums(text: string, { n, first, second }: QaplibDocument): ParseResult<QaplibDocument> | null {
  const [inFirst, inSecond] = [largest(first), largest(second)];
  const sum = n * n * inFirst.size * inSecond.size;
  if (sum <= QAPLIB_LIMITS.sum) return null;
  const at = inFirst.size >= inSecond.size ? inFirst.at : n * n + inSecond.at;
  const token = [...text.matchAll(/\S+/g)][at + 1];
  const message = `The entries are too large together: size² · ${inFirst.size} · ${inSecond.size} is about ${sum.toExponential(1)}.`;
  return refuse(
    formatErrorAt(text, token?.index ?? 0, message, {
      path: placeOf(n, at),
      expected: `entries for which it is at most ${QAPLIB_LIMITS.sum.toExponential(1)}`,
    }),
  );
}

function largest(entries: Float64Array): { at: number; size: number } {
  let [at, size] = [0, 0];
  entries.forEach((entry, i) => {
    if (Math.abs(entry) > size) [at, size] = [i, Math.abs(entry)];
  });
  return { at, size };
}

/** A token as a message shows it: short, and without control characters. */
function shown(token: string): string {
  const short = token.length > 24 ? `${token.slice(0, 24)}…` : token;
  const plain = short.replace(
    /\p{C}/gu,
    (c) => `U+${(c.codePointAt(0) as number).toString(16).toUpperCase()}`,
  );
  return `“${plain}”`;
}
