/** Secrets that travel in cookies and links. The database holds only their digest. */
import { createHash, randomBytes } from 'node:crypto';

/** 256 random bits as base64url. */
export const newToken = (): string => randomBytes(32).toString('base64url');

/** SHA-256 in hex. Enough without salt, since a token has 256 bits of its own. */
export const tokenDigest = (token: string): string => createHash('sha256').update(token).digest('hex');
