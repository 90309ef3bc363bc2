/** Options of a command: known names only, each with a value; those of `lists` may be given again and again. */
import { parseArgs } from 'node:util';
import { err, ok, type Result } from '../../lib/result';
import type { Faults } from './read-document';

export function readArguments<Name extends string, List extends string = never>(
  args: readonly string[],
  names: readonly Name[],
  required: readonly Name[],
  lists: readonly List[] = [],
): Result<Partial<Record<Name, string>> & Partial<Record<List, string[]>> & { help?: boolean }, Faults> {
  try {
    const options = Object.fromEntries([
      ...names.map((name) => [name, { type: 'string' as const }]),
      ...lists.map((name) => [name, { type: 'string' as const, multiple: true }]),
    ]);
    const { values } = parseArgs({
      args: [...args],
      options: { ...options, help: { type: 'boolean', short: 'h' } },
    });
    const given = values as Partial<Record<Name, string>> &
      Partial<Record<List, string[]>> & { help?: boolean };
    const missing = given.help ? [] : required.filter((name) => given[name] === undefined);
    return missing.length > 0 ? err(missing.map((name) => `--${name} is missing`)) : ok(given);
  } catch (error) {
    return err([error instanceof Error ? error.message : String(error)]);
  }
}

/** A whole number of an option's text; null where it is none. */
export const wholeNumber = (text: string): number | null => (/^\d{1,10}$/.test(text) ? Number(text) : null);
