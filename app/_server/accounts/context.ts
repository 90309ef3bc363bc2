/** What the account functions get from outside, so that they run without a web request. */
import type { Database } from '@/db/client';
import { appError } from '../errors';
import type { Letter } from '../mail';

export interface AccountContext {
  db: Database;
  now: Date;
  /** The caller's network address; a key of limits. */
  address: string;
  /** Sends a letter, after the transaction that it tells of; false when the mail server does not take it. */
  send(letter: Letter): Promise<boolean>;
  /** The full address of a path of ours. */
  link(path: string): string;
}

/** Where the letter is all that was asked for. */
export const notSent = appError(
  'unavailable',
  'The letter could not be sent. Wait a few minutes and try again.',
);

export const MINUTE_MS = 60_000;
export const later = (now: Date, ms: number): Date => new Date(now.getTime() + ms);
