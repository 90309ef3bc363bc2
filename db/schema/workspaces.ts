import { sql } from 'drizzle-orm';
import { check, pgTable, text, unique } from 'drizzle-orm/pg-core';
import type { Id } from '../../lib/ids';
import { createdAt } from './columns';

export const workspaces = pgTable(
  'workspaces',
  {
    id: text('id').$type<Id<'workspace'>>().primaryKey(),
    name: text('name').notNull(),
    /** The name in addresses. It stays when the workspace is renamed, so links keep working. */
    slug: text('slug').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    unique('workspaces_slug_unique').on(t.slug),
    check('workspaces_slug_form', sql`${t.slug} ~ '^[a-z0-9]([a-z0-9-]{0,46}[a-z0-9])?$'`),
    check('workspaces_name_length', sql`length(btrim(${t.name})) between 1 and 80`),
  ],
);
