import { sql } from 'drizzle-orm';
import { check, pgTable, text, unique } from 'drizzle-orm/pg-core';
import type { Id } from '../../lib/ids';
import { createdAt } from './columns';

/** A person. The same person may be a member of several workspaces. */
export const users = pgTable(
  'users',
  {
    id: text('id').$type<Id<'user'>>().primaryKey(),
    /** Lower case, as the check demands, so that one address is one person. */
    email: text('email').notNull(),
    name: text('name').notNull(),
    /** Argon2id in PHC form, parameters included. */
    passwordHash: text('password_hash').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    unique('users_email_unique').on(t.email),
    check(
      'users_email_lower',
      sql`${t.email} = lower(${t.email}) and ${t.email} like '%_@_%' and length(${t.email}) <= 254`,
    ),
    check('users_name_length', sql`length(btrim(${t.name})) between 1 and 80`),
  ],
);
