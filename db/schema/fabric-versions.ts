import { sql } from 'drizzle-orm';
import { check, foreignKey, integer, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core';
import type { Fabric, Topology } from '../../lib/fabric/fabric';
import type { Id } from '../../lib/ids';
import { createdAt } from './columns';
import { fabrics } from './fabrics';
import { users } from './users';

/** A numbered state of a fabric that never changes; a trigger refuses it (migration 0001). */
export const fabricVersions = pgTable(
  'fabric_versions',
  {
    id: text('id').$type<Id<'fabricversion'>>().primaryKey(),
    workspaceId: text('workspace_id').$type<Id<'workspace'>>().notNull(),
    fabricId: text('fabric_id').$type<Id<'fabric'>>().notNull(),
    /** 1, 2, 3 … within the fabric. */
    number: integer('number').notNull(),
    label: text('label').notNull().default(''),
    document: jsonb('document').$type<Fabric>().notNull(),
    /** SHA-256 of the document as jsonb text, hex: the same content makes no second version. */
    contentHash: text('content_hash').notNull(),
    rows: integer('rows').notNull(),
    cols: integer('cols').notNull(),
    topology: text('topology').$type<Topology>().notNull(),
    peCount: integer('pe_count').notNull(),
    createdBy: text('created_by')
      .$type<Id<'user'>>()
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({
      name: 'fabric_versions_fabric_fk',
      columns: [t.workspaceId, t.fabricId],
      foreignColumns: [fabrics.workspaceId, fabrics.id],
    }).onDelete('cascade'),
    unique('fabric_versions_number_unique').on(t.fabricId, t.number),
    unique('fabric_versions_workspace_id_unique').on(t.workspaceId, t.id),
    check('fabric_versions_number', sql`${t.number} >= 1`),
    check('fabric_versions_label_length', sql`length(${t.label}) <= 80`),
    check('fabric_versions_grid', sql`${t.rows} between 1 and 64 and ${t.cols} between 1 and 64`),
  ],
);
