/** Finds the places of paths in JSON text, so that a schema's complaint can point at them. */
import { type JsonPath, walkJson } from './json-walk';

export interface PathWanted {
  path: JsonPath;
  /** Point at the name of the member and not at its value: for names that should not be there. */
  atName?: boolean;
}

/**
 * The offset of each path in well-formed text; of the nearest object or array around it when the path does not exist.
 * One walk for all of them.
 */
export function locatePaths(text: string, wanted: readonly PathWanted[]): number[] {
  const found = wanted.map(() => ({ depth: -1, offset: 0 }));
  walkJson(text, (path, offset, nameOffset) => {
    for (const [i, want] of wanted.entries()) {
      const best = found[i]!;
      if (path.length <= best.depth || path.length > want.path.length) continue;
      if (!isPrefix(path, want.path)) continue;
      best.depth = path.length;
      best.offset = want.atName && path.length === want.path.length && nameOffset >= 0 ? nameOffset : offset;
    }
  });
  return found.map((best) => best.offset);
}

function isPrefix(path: JsonPath, whole: JsonPath): boolean {
  // From the end: that is where paths of one document differ.
  for (let i = path.length - 1; i >= 0; i--) {
    if (path[i] !== whole[i]) return false;
  }
  return true;
}

/** A path as it is written in code: `ops[3].params.base`. */
export const pathText = (path: JsonPath): string =>
  path.reduce<string>((text, part) => {
    if (typeof part === 'number') return `${text}[${part}]`;
    return text === '' ? String(part) : `${text}.${String(part)}`;
  }, '');
