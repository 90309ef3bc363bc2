import { sql } from 'drizzle-orm';
import { check, index, pgTable, text } from 'drizzle-orm/pg-core';
import type { Id } from '../../lib/ids';
import { createdAt, instant } from './columns';
import { users } from './users';

/** A signed-in browser. */
export const sessions = pgTable(
  'sessions',
  {
    /** SHA-256 of the cookie's token in hex: reading this table signs nobody in. */
    id: text('id').primaryKey(),
    userId: text('user_id')
      .$type<Id<'user'>>()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    /** Moved ahead while the session is used; never past the absolute limit counted from `createdAt`. */
    expiresAt: instant('expires_at').notNull(),
    createdAt: createdAt(),
    lastSeenAt: instant('last_seen_at').notNull().defaultNow(),
    userAgent: text('user_agent').notNull().default(''),
    /** The network part of the address (/24 or /48): enough to recognise, not to locate. */
    addressPrefix: text('address_prefix').notNull().default(''),
  },
  (t) => [
    index('sessions_user').on(t.userId),
    index('sessions_expiry').on(t.expiresAt),
    check('sessions_id_is_digest', sql`${t.id} ~ '^[0-9a-f]{64}$'`),
  ],
);
