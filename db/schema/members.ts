import { sql } from 'drizzle-orm';
import { check, index, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import type { Id } from '../../lib/ids';
import type { Role } from '../../lib/roles';
import { createdAt, instant } from './columns';
import { users } from './users';
import { workspaces } from './workspaces';

/** Who belongs to a workspace. A trigger keeps at least one owner (migration 0001). */
export const members = pgTable(
  'members',
  {
    workspaceId: text('workspace_id')
      .$type<Id<'workspace'>>()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    userId: text('user_id')
      .$type<Id<'user'>>()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    role: text('role').$type<Role>().notNull(),
    createdAt: createdAt(),
    /** When the member last opened the workspace; "/" leads to the newest. */
    lastOpenedAt: instant('last_opened_at'),
  },
  (t) => [
    primaryKey({ columns: [t.workspaceId, t.userId] }),
    index('members_user').on(t.userId),
    check('members_role', sql`${t.role} in ('viewer', 'reviewer', 'editor', 'owner')`),
  ],
);
