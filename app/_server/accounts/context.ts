/** What the account functions get from outside, so that they run without a web request. */
import type { Database } from '@/db/client';
import type { Letter } from '../mail';

export interface AccountContext {
  db: Database;
  now: Date;
  /** The caller's network address; a key of limits. */
  address: string;
  /** Sends a letter; called after the transaction that it tells of. */
  send(letter: Letter): Promise<void>;
  /** The full address of a path of ours. */
  link(path: string): string;
}

export const MINUTE_MS = 60_000;
export const later = (now: Date, ms: number): Date => new Date(now.getTime() + ms);
