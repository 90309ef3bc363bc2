/** Ids of stored things: the kind, an underscore and 26 characters of base 32 (at least 128 random bits). */
import { z } from 'zod';

export const idKinds = [
  'user',
  'workspace',
  'invitation',
  'reset',
  'signup',
  'kernel',
  'kernelversion',
  'fabric',
  'fabricversion',
  'draft',
  'mapping',
  'solve',
  'audit',
  'mail',
  'worker',
] as const;

export type IdKind = (typeof idKinds)[number];
export type Id<K extends IdKind> = `${K}_${string}`;

/** Crockford's base 32 in lower case: no i, l, o or u, so an id that is read aloud stays right. */
export const idAlphabet = '0123456789abcdefghjkmnpqrstvwxyz';
export const idLength = 26;

const body = z.string().regex(/^[0-9a-hjkmnp-tv-z]{26}$/, 'not an id');

/** The schema of one kind's ids, for inputs of actions and routes. */
export const idSchema = <K extends IdKind>(kind: K) =>
  z.templateLiteral([z.literal(`${kind}_` as const), body]);

/** The id when `text` is one of this kind, else null. A page answers null with "not found". */
export function parseId<K extends IdKind>(kind: K, text: string): Id<K> | null {
  const parsed = idSchema(kind).safeParse(text);
  return parsed.success ? (parsed.data as Id<K>) : null;
}
