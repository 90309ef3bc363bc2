import { sql } from 'drizzle-orm';
import { check, index, integer, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core';
import type { Kernel } from '../../lib/graph/kernel';
import type { Id } from '../../lib/ids';
import { createdAt, instant, updatedAt } from './columns';
import { users } from './users';
import { workspaces } from './workspaces';

/** A kernel with its draft. The draft is one document; `revision` grows by one with every save. */
export const kernels = pgTable(
  'kernels',
  {
    id: text('id').$type<Id<'kernel'>>().primaryKey(),
    workspaceId: text('workspace_id')
      .$type<Id<'workspace'>>()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    /** The same as the draft's name; a column for lists. */
    name: text('name').notNull(),
    draft: jsonb('draft').$type<Kernel>().notNull(),
    revision: integer('revision').notNull().default(1),
    opCount: integer('op_count').notNull(),
    edgeCount: integer('edge_count').notNull(),
    /** Problems of severity error in the draft. */
    errorCount: integer('error_count').notNull(),
    createdBy: text('created_by')
      .$type<Id<'user'>>()
      .notNull()
      .references(() => users.id),
    updatedBy: text('updated_by')
      .$type<Id<'user'>>()
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
    /** Null while in use. */
    archivedAt: instant('archived_at'),
  },
  (t) => [
    unique('kernels_workspace_id_unique').on(t.workspaceId, t.id),
    index('kernels_list').on(t.workspaceId, t.updatedAt),
    check('kernels_name_length', sql`length(btrim(${t.name})) between 1 and 80`),
    check(
      'kernels_counts',
      sql`${t.revision} >= 1 and ${t.opCount} >= 0 and ${t.edgeCount} >= 0 and ${t.errorCount} >= 0`,
    ),
    check('kernels_draft_object', sql`jsonb_typeof(${t.draft}) = 'object'`),
  ],
);
