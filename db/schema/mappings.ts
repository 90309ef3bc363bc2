import { sql } from 'drizzle-orm';
import {
  bigint,
  boolean,
  check,
  doublePrecision,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  text,
  unique,
} from 'drizzle-orm/pg-core';
import type { Id } from '../../lib/ids';
import type { MappingDocument, Objective } from '../../lib/mapping/mapping';
import { createdAt, instant } from './columns';
import { fabricVersions } from './fabric-versions';
import { kernelVersions } from './kernel-versions';
import { mappingDrafts } from './mapping-drafts';
import { users } from './users';
import { workspaces } from './workspaces';

export type SolveStatus = 'by hand' | 'optimal' | 'feasible';

/**
 * A kept mapping: a complete, verified placement with its routes. Only its name and `archivedAt` may change
 * afterwards; a trigger refuses the rest (migration 0001).
 */
export const mappings = pgTable(
  'mappings',
  {
    id: text('id').$type<Id<'mapping'>>().primaryKey(),
    workspaceId: text('workspace_id')
      .$type<Id<'workspace'>>()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    name: text('name').notNull(),
    kernelVersionId: text('kernel_version_id').$type<Id<'kernelversion'>>().notNull(),
    fabricVersionId: text('fabric_version_id').$type<Id<'fabricversion'>>().notNull(),
    /** The bench it was kept from; null when it came from a file. */
    mappingDraftId: text('mapping_draft_id').$type<Id<'draft'>>(),
    document: jsonb('document').$type<MappingDocument>().notNull(),
    madeBy: text('made_by')
      .$type<Id<'user'>>()
      .notNull()
      .references(() => users.id),
    solveStatus: text('solve_status').$type<SolveStatus>().notNull(),
    /** The next six are null for a mapping made by hand. */
    engine: text('engine'),
    objective: text('objective').$type<Objective>(),
    seed: bigint('seed', { mode: 'number' }),
    timeLimitMs: integer('time_limit_ms'),
    objectiveValue: doublePrecision('objective_value'),
    bound: doublePrecision('bound'),
    /** Placed by the solver and then changed by hand, so status and bound speak of the solve only. */
    changedByHand: boolean('changed_by_hand').notNull().default(false),
    opCount: integer('op_count').notNull(),
    wireHops: integer('wire_hops').notNull(),
    pathHops: integer('path_hops').notNull(),
    longestPathHops: integer('longest_path_hops').notNull(),
    linksUsed: integer('links_used').notNull(),
    fullestLinkNets: integer('fullest_link_nets').notNull(),
    createdAt: createdAt(),
    archivedAt: instant('archived_at'),
  },
  (t) => [
    foreignKey({
      name: 'mappings_kernel_version_fk',
      columns: [t.workspaceId, t.kernelVersionId],
      foreignColumns: [kernelVersions.workspaceId, kernelVersions.id],
    }),
    foreignKey({
      name: 'mappings_fabric_version_fk',
      columns: [t.workspaceId, t.fabricVersionId],
      foreignColumns: [fabricVersions.workspaceId, fabricVersions.id],
    }),
    foreignKey({
      name: 'mappings_draft_fk',
      columns: [t.workspaceId, t.mappingDraftId],
      foreignColumns: [mappingDrafts.workspaceId, mappingDrafts.id],
    }),
    unique('mappings_workspace_id_unique').on(t.workspaceId, t.id),
    index('mappings_list').on(t.workspaceId, t.createdAt),
    index('mappings_kernel_version').on(t.kernelVersionId),
    index('mappings_fabric_version').on(t.fabricVersionId),
    check('mappings_name_length', sql`length(btrim(${t.name})) between 1 and 80`),
    check('mappings_status', sql`${t.solveStatus} in ('by hand', 'optimal', 'feasible')`),
    check(
      'mappings_solver_columns',
      sql`case when ${t.solveStatus} = 'by hand'
        then num_nonnulls(${t.engine}, ${t.objective}, ${t.seed}, ${t.timeLimitMs}, ${t.objectiveValue}, ${t.bound}) = 0
        else num_nulls(${t.engine}, ${t.objective}, ${t.seed}, ${t.timeLimitMs}, ${t.objectiveValue}, ${t.bound}) = 0 end`,
    ),
    check('mappings_bound_below_value', sql`${t.bound} is null or ${t.bound} <= ${t.objectiveValue} + 1e-6`),
    check(
      'mappings_figures',
      sql`least(${t.opCount}, ${t.wireHops}, ${t.pathHops}, ${t.longestPathHops}, ${t.linksUsed}, ${t.fullestLinkNets}) >= 0`,
    ),
  ],
);
