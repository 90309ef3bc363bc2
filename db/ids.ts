/** Makes new ids. The pure half (kinds, schema, parsing) is lib/ids.ts, which the browser may load too. */
import { randomBytes } from 'node:crypto';
import { type Id, type IdKind, idAlphabet, idLength } from '../lib/ids';

/** A fresh id: 26 characters of 5 random bits each, 130 bits. */
export function newId<K extends IdKind>(kind: K): Id<K> {
  const text = Array.from(randomBytes(idLength), (byte) => idAlphabet[byte & 31]).join('');
  return `${kind}_${text}`;
}
