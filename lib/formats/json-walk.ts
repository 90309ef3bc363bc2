/**
 * Walks JSON text and tells where each value stands. It finds what the built-in parser does not say: the exact place of
 * a syntax error, names that occur twice, and the place of a path. Linear, no recursion.
 */
import { type JsonCursor, type JsonFault, skipScalar, skipSpace, takeName, unexpected } from './json-cursor';

export type JsonPath = readonly PropertyKey[];

/** Called for each value with the path to it; `nameOffset` is where its name in an object begins, −1 if it has none. */
export type JsonVisit = (path: JsonPath, offset: number, nameOffset: number) => void;

/** Objects and arrays may nest this deep; no document of ours comes near. */
export const MAX_JSON_DEPTH = 32;

/** Values in one text; a schema would otherwise complain about millions of them before it gives up. */
export const MAX_JSON_VALUES = 600_000;

/** An object that is open, with the names it has had, or an array. */
type Frame = { closing: '}'; names: Set<string> } | { closing: ']' };

interface Walk {
  cursor: JsonCursor;
  frames: Frame[];
  path: PropertyKey[];
  /** Where the name of the value that comes next begins. */
  nameOffset: number;
  values: number;
}

/** What a step found: a value comes next, the text is over, or it is faulty. */
type Step = 'value' | 'end' | JsonFault;

/** The first fault of the text, or null when it is well-formed and within the limits. */
export function walkJson(text: string, visit: JsonVisit = () => {}): JsonFault | null {
  const walk: Walk = { cursor: { text, at: 0 }, frames: [], path: [], nameOffset: -1, values: 0 };
  for (;;) {
    skipSpace(walk.cursor);
    if (++walk.values > MAX_JSON_VALUES) {
      return { offset: walk.cursor.at, message: `The text has more than ${MAX_JSON_VALUES} values.` };
    }
    visit(walk.path, walk.cursor.at, walk.nameOffset);
    const begun = beginValue(walk);
    if (begun === 'value') continue;
    if (begun !== 'end') return begun;
    const ended = endValue(walk);
    if (ended === 'end') return null;
    if (ended !== 'value') return ended;
  }
}

/** Passes over a scalar or an empty object or array ('end'), or enters one ('value'). */
function beginValue(walk: Walk): Step {
  const { cursor, frames, path } = walk;
  const opening = cursor.text[cursor.at];
  if (opening !== '{' && opening !== '[') return skipScalar(cursor) ?? 'end';
  if (frames.length >= MAX_JSON_DEPTH) {
    return { offset: cursor.at, message: `Objects and arrays nest deeper than ${MAX_JSON_DEPTH} levels.` };
  }
  const frame: Frame = opening === '{' ? { closing: '}', names: new Set() } : { closing: ']' };
  cursor.at++;
  skipSpace(cursor);
  if (cursor.text[cursor.at] === frame.closing) {
    cursor.at++;
    return 'end';
  }
  frames.push(frame);
  path.push(-1);
  return nextMember(walk, frame);
}

/** Closes whatever ends after a value; stops at the next value or the end of the text. */
function endValue(walk: Walk): Step {
  const { cursor, frames, path } = walk;
  for (;;) {
    skipSpace(cursor);
    const frame = frames.at(-1);
    if (frame === undefined) {
      return cursor.at === cursor.text.length ? 'end' : unexpected(cursor, 'the end of the text');
    }
    const next = cursor.text[cursor.at];
    if (next !== ',' && next !== frame.closing) return unexpected(cursor, `a comma or ${frame.closing}`);
    cursor.at++;
    if (next === ',') {
      skipSpace(cursor);
      return nextMember(walk, frame);
    }
    frames.pop();
    path.pop();
  }
}

function nextMember(walk: Walk, frame: Frame): Step {
  const { cursor, path } = walk;
  if (frame.closing === ']') {
    path[path.length - 1] = Number(path.at(-1)) + 1;
    walk.nameOffset = -1;
    return 'value';
  }
  const taken = takeName(cursor, frame.names);
  if (!('name' in taken)) return taken;
  path[path.length - 1] = taken.name;
  walk.nameOffset = taken.offset;
  return 'value';
}
