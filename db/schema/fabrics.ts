import { sql } from 'drizzle-orm';
import { check, index, integer, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core';
import type { Fabric, Topology } from '../../lib/fabric/fabric';
import type { Id } from '../../lib/ids';
import { createdAt, instant, updatedAt } from './columns';
import { users } from './users';
import { workspaces } from './workspaces';

/** A fabric with its draft. The draft is one document; `revision` grows by one with every save. */
export const fabrics = pgTable(
  'fabrics',
  {
    id: text('id').$type<Id<'fabric'>>().primaryKey(),
    workspaceId: text('workspace_id')
      .$type<Id<'workspace'>>()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    name: text('name').notNull(),
    draft: jsonb('draft').$type<Fabric>().notNull(),
    revision: integer('revision').notNull().default(1),
    rows: integer('rows').notNull(),
    cols: integer('cols').notNull(),
    topology: text('topology').$type<Topology>().notNull(),
    /** Tiles with a unit. */
    peCount: integer('pe_count').notNull(),
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
    unique('fabrics_workspace_id_unique').on(t.workspaceId, t.id),
    index('fabrics_list').on(t.workspaceId, t.updatedAt),
    check('fabrics_name_length', sql`length(btrim(${t.name})) between 1 and 80`),
    check('fabrics_grid', sql`${t.rows} between 1 and 64 and ${t.cols} between 1 and 64`),
    check(
      'fabrics_counts',
      sql`${t.revision} >= 1 and ${t.errorCount} >= 0 and ${t.peCount} between 0 and ${t.rows} * ${t.cols}`,
    ),
    check('fabrics_topology', sql`${t.topology} in ('mesh', 'torus', 'diagonal')`),
    check('fabrics_draft_object', sql`jsonb_typeof(${t.draft}) = 'object'`),
  ],
);
