import { sql } from 'drizzle-orm';
import { check, index, pgTable, text, unique } from 'drizzle-orm/pg-core';
import type { Id } from '../../lib/ids';
import { createdAt, instant } from './columns';

/** A link that lets the holder of an address make an account, once. The account is made only by the link. */
export const signUps = pgTable(
  'sign_ups',
  {
    id: text('id').$type<Id<'signup'>>().primaryKey(),
    email: text('email').notNull(),
    /** SHA-256 of the token in the link, hex. */
    tokenHash: text('token_hash').notNull(),
    createdAt: createdAt(),
    expiresAt: instant('expires_at').notNull(),
    /** Null until the link was used. */
    usedAt: instant('used_at'),
  },
  (t) => [
    unique('sign_ups_token_unique').on(t.tokenHash),
    index('sign_ups_expiry').on(t.expiresAt),
    check('sign_ups_email_lower', sql`${t.email} = lower(${t.email}) and length(${t.email}) <= 254`),
  ],
);
