import type { AccountContext } from '../../app/_server/accounts/context';
import type { Letter } from '../../app/_server/mail';
import type { Database } from '../../db/client';
import { newToken } from '../../db/tokens';

/** A context with a clock of its own and an outbox; each has another network address unless told otherwise. */
export function accountContext(
  db: Database,
  over: { now?: Date; address?: string; mailDown?: boolean } = {},
) {
  const outbox: Letter[] = [];
  const context: AccountContext = {
    db,
    now: over.now ?? new Date(),
    address: over.address ?? `address ${newToken()}`,
    send: async (letter) => over.mailDown !== true && outbox.push(letter) > 0,
    link: (path) => `https://pinloom.example${path}`,
  };
  /** The token at the end of the link in the last letter. */
  const lastToken = () => outbox.at(-1)?.text.match(/\/([A-Za-z0-9_-]{43})\b/)?.[1] ?? '';
  return { context, outbox, lastToken, at: (now: Date): AccountContext => ({ ...context, now }) };
}

export const GOOD_PASSWORD = 'woven under a grey sky';
