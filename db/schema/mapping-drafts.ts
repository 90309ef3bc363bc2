import { sql } from 'drizzle-orm';
import { check, foreignKey, index, integer, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core';
import type { Id } from '../../lib/ids';
import type { BenchDocument } from '../../lib/mapping/bench-document';
import type { Provenance } from '../../lib/mapping/mapping';
import { createdAt, instant, updatedAt } from './columns';
import { fabricVersions } from './fabric-versions';
import { kernelVersions } from './kernel-versions';
import { users } from './users';
import { workspaces } from './workspaces';

/** The bench: a placement that people and the solver work on until it is kept as a mapping. */
export const mappingDrafts = pgTable(
  'mapping_drafts',
  {
    id: text('id').$type<Id<'draft'>>().primaryKey(),
    workspaceId: text('workspace_id')
      .$type<Id<'workspace'>>()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    name: text('name').notNull(),
    kernelVersionId: text('kernel_version_id').$type<Id<'kernelversion'>>().notNull(),
    fabricVersionId: text('fabric_version_id').$type<Id<'fabricversion'>>().notNull(),
    document: jsonb('document').$type<BenchDocument>().notNull(),
    provenance: jsonb('provenance').$type<Provenance>().notNull(),
    revision: integer('revision').notNull().default(1),
    opCount: integer('op_count').notNull(),
    placedOps: integer('placed_ops').notNull().default(0),
    wireHops: integer('wire_hops').notNull().default(0),
    pathHops: integer('path_hops').notNull().default(0),
    longestPathHops: integer('longest_path_hops').notNull().default(0),
    linksUsed: integer('links_used').notNull().default(0),
    fullestLinkNets: integer('fullest_link_nets').notNull().default(0),
    /** The mapping that was last kept from this draft; null until then. No reference: mappings refer to drafts. */
    keptAs: text('kept_as').$type<Id<'mapping'>>(),
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
    archivedAt: instant('archived_at'),
  },
  (t) => [
    foreignKey({
      name: 'mapping_drafts_kernel_version_fk',
      columns: [t.workspaceId, t.kernelVersionId],
      foreignColumns: [kernelVersions.workspaceId, kernelVersions.id],
    }),
    foreignKey({
      name: 'mapping_drafts_fabric_version_fk',
      columns: [t.workspaceId, t.fabricVersionId],
      foreignColumns: [fabricVersions.workspaceId, fabricVersions.id],
    }),
    unique('mapping_drafts_workspace_id_unique').on(t.workspaceId, t.id),
    index('mapping_drafts_list').on(t.workspaceId, t.updatedAt),
    index('mapping_drafts_kernel_version').on(t.kernelVersionId),
    index('mapping_drafts_fabric_version').on(t.fabricVersionId),
    check('mapping_drafts_name_length', sql`length(btrim(${t.name})) between 1 and 80`),
    check(
      'mapping_drafts_counts',
      sql`${t.revision} >= 1 and ${t.opCount} >= 0 and ${t.placedOps} between 0 and ${t.opCount}`,
    ),
    check(
      'mapping_drafts_figures',
      sql`least(${t.wireHops}, ${t.pathHops}, ${t.longestPathHops}, ${t.linksUsed}, ${t.fullestLinkNets}) >= 0`,
    ),
  ],
);
