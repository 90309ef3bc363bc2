import { sql } from 'drizzle-orm';
import { check, index, jsonb, pgTable, text } from 'drizzle-orm/pg-core';
import type { Id } from '../../lib/ids';
import { createdAt } from './columns';
import { users } from './users';
import { workspaces } from './workspaces';

/** Who did what in a workspace. Rows are only added. */
export const auditEntries = pgTable(
  'audit_entries',
  {
    id: text('id').$type<Id<'audit'>>().primaryKey(),
    workspaceId: text('workspace_id')
      .$type<Id<'workspace'>>()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    actorId: text('actor_id')
      .$type<Id<'user'>>()
      .notNull()
      .references(() => users.id),
    /** `<noun> <past participle>`, such as "kernel created". */
    action: text('action').notNull(),
    subjectType: text('subject_type').notNull(),
    subjectId: text('subject_id').notNull(),
    /** Names and small facts for the list, never a document or a secret. */
    detail: jsonb('detail').$type<Record<string, string | number | boolean | null>>().notNull().default({}),
    createdAt: createdAt(),
  },
  (t) => [
    index('audit_entries_list').on(t.workspaceId, t.createdAt),
    index('audit_entries_subject').on(t.workspaceId, t.subjectId),
    check('audit_entries_detail_small', sql`pg_column_size(${t.detail}) < 4096`),
  ],
);
