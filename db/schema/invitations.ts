import { sql } from 'drizzle-orm';
import { check, index, pgTable, text, unique, uniqueIndex } from 'drizzle-orm/pg-core';
import type { Id } from '../../lib/ids';
import type { Role } from '../../lib/roles';
import { createdAt, instant } from './columns';
import { users } from './users';
import { workspaces } from './workspaces';

/** A letter that lets the holder of an address join a workspace, once. */
export const invitations = pgTable(
  'invitations',
  {
    id: text('id').$type<Id<'invitation'>>().primaryKey(),
    workspaceId: text('workspace_id')
      .$type<Id<'workspace'>>()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    email: text('email').notNull(),
    role: text('role').$type<Role>().notNull(),
    /** SHA-256 of the token in the link, hex. Sending again replaces it, so the older link ends. */
    tokenHash: text('token_hash').notNull(),
    invitedBy: text('invited_by')
      .$type<Id<'user'>>()
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
    expiresAt: instant('expires_at').notNull(),
    /** Null until accepted. */
    acceptedAt: instant('accepted_at'),
    /** Null until revoked by an owner. */
    revokedAt: instant('revoked_at'),
  },
  (t) => [
    unique('invitations_token_unique').on(t.tokenHash),
    uniqueIndex('invitations_one_pending')
      .on(t.workspaceId, t.email)
      .where(sql`accepted_at is null and revoked_at is null`),
    index('invitations_workspace').on(t.workspaceId, t.createdAt),
    check('invitations_email_lower', sql`${t.email} = lower(${t.email}) and length(${t.email}) <= 254`),
    check('invitations_role', sql`${t.role} in ('viewer', 'reviewer', 'editor', 'owner')`),
    check('invitations_one_end', sql`${t.acceptedAt} is null or ${t.revokedAt} is null`),
  ],
);
