/** Writes documents as JSON that people read and version control compares: one line per op, tile row or short list. */

type Json = string | number | boolean | null | readonly Json[] | { readonly [name: string]: Json };

const LINE_LENGTH = 110;
const INDENT = '  ';

/**
 * Objects and arrays that fit on a line stay on it, others take a line for each member. Members keep their order, so
 * equal documents in canonical order give equal text. Ends in a line feed. Recursion is as deep as the document,
 * which its schema bounds.
 */
export const jsonText = (value: Json): string => `${lines(value, '', 0)}\n`;

function lines(value: Json, indent: string, before: number): string {
  const flat = oneLine(value, LINE_LENGTH - indent.length - before);
  if (flat !== null || typeof value !== 'object' || value === null) return flat ?? JSON.stringify(value);
  const inner = indent + INDENT;
  if (isList(value)) {
    return `[\n${value.map((item) => inner + lines(item, inner, 1)).join(',\n')}\n${indent}]`;
  }
  const members = Object.entries(value).map(([name, item]) => {
    const head = `${JSON.stringify(name)}: `;
    return inner + head + lines(item, inner, head.length + 1);
  });
  return `{\n${members.join(',\n')}\n${indent}}`;
}

const isList = (value: object): value is readonly Json[] => Array.isArray(value);

/** The value on one line, or null when that line would be longer than `room`. */
function oneLine(value: Json, room: number): string | null {
  if (typeof value !== 'object' || value === null) return JSON.stringify(value);
  const parts: string[] = [];
  let length = 0;
  for (const [name, item] of Object.entries(value)) {
    const head = isList(value) ? '' : `${JSON.stringify(name)}: `;
    const text = oneLine(item, room - length - head.length);
    if (text === null) return null;
    parts.push(head + text);
    length += head.length + text.length + 2;
    if (length > room) return null;
  }
  if (isList(value)) return `[${parts.join(', ')}]`;
  return parts.length === 0 ? '{}' : `{ ${parts.join(', ')} }`;
}

/** A record with its names in code-unit order. */
export function sortedRecord<T>(record: Readonly<Record<string, T>>): Record<string, T> {
  const names = Object.keys(record).sort((a, b) => (a < b ? -1 : a > b ? 1 : 0));
  return Object.fromEntries(names.map((name) => [name, record[name] as T]));
}
