/**
 * How passwords are stored: Argon2id with the parameters of OWASP ASVS 5.0, appendix C (m = 47104 KiB, t = 1, p = 1).
 * The parameters stand in the hash, so they can be raised later without a migration.
 */
import { hash, verify } from '@node-rs/argon2';

// Argon2id is the package's default variant; a test looks at the stored form.
const parameters = { memoryCost: 47_104, timeCost: 1, parallelism: 1 } as const;

/** Composed (NFC), as NIST SP 800-63B advises, so that one key sequence is one password on every keyboard. */
const composed = (password: string) => password.normalize('NFC');

export const hashPassword = (password: string): Promise<string> => hash(composed(password), parameters);

let dummy: Promise<string> | undefined;

/**
 * True when the password is the stored one. With `stored` null (no such account) it spends the same time on a hash
 * of nobody's, so the time tells nothing about who has an account.
 */
export async function verifyPassword(stored: string | null, password: string): Promise<boolean> {
  if (stored !== null) return verify(stored, composed(password));
  dummy ??= hashPassword('the password of nobody at all');
  await verify(await dummy, composed(password));
  return false;
}
