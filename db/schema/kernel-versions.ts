import { sql } from 'drizzle-orm';
import { check, foreignKey, integer, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core';
import type { Kernel } from '../../lib/graph/kernel';
import type { Id } from '../../lib/ids';
import { createdAt } from './columns';
import { kernels } from './kernels';
import { users } from './users';

/** A numbered state of a kernel that never changes; a trigger refuses it (migration 0001). */
export const kernelVersions = pgTable(
  'kernel_versions',
  {
    id: text('id').$type<Id<'kernelversion'>>().primaryKey(),
    workspaceId: text('workspace_id').$type<Id<'workspace'>>().notNull(),
    kernelId: text('kernel_id').$type<Id<'kernel'>>().notNull(),
    /** 1, 2, 3 … within the kernel. */
    number: integer('number').notNull(),
    /** What the person called it; may be empty. */
    label: text('label').notNull().default(''),
    document: jsonb('document').$type<Kernel>().notNull(),
    /** SHA-256 of the document as jsonb text, hex: the same content makes no second version. */
    contentHash: text('content_hash').notNull(),
    opCount: integer('op_count').notNull(),
    edgeCount: integer('edge_count').notNull(),
    createdBy: text('created_by')
      .$type<Id<'user'>>()
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({
      name: 'kernel_versions_kernel_fk',
      columns: [t.workspaceId, t.kernelId],
      foreignColumns: [kernels.workspaceId, kernels.id],
    }).onDelete('cascade'),
    unique('kernel_versions_number_unique').on(t.kernelId, t.number),
    unique('kernel_versions_workspace_id_unique').on(t.workspaceId, t.id),
    check('kernel_versions_number', sql`${t.number} >= 1`),
    check('kernel_versions_label_length', sql`length(${t.label}) <= 80`),
  ],
);
