import { sql } from 'drizzle-orm';
import { check, index, pgTable, text, unique } from 'drizzle-orm/pg-core';
import type { Id } from '../../lib/ids';
import { createdAt, instant } from './columns';
import { users } from './users';

/** A link that lets its holder choose a new password, once. */
export const passwordResets = pgTable(
  'password_resets',
  {
    id: text('id').$type<Id<'reset'>>().primaryKey(),
    userId: text('user_id')
      .$type<Id<'user'>>()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    /** SHA-256 of the token in the link, hex. */
    tokenHash: text('token_hash').notNull(),
    createdAt: createdAt(),
    expiresAt: instant('expires_at').notNull(),
    /** Null until the link was used or a newer one replaced it. */
    usedAt: instant('used_at'),
  },
  (t) => [
    unique('password_resets_token_unique').on(t.tokenHash),
    index('password_resets_user').on(t.userId),
    check('password_resets_expiry_later', sql`${t.expiresAt} > ${t.createdAt}`),
  ],
);
