import { eq, sql } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { newId } from '../../db/ids';
import { migrateDatabase } from '../../db/migrate';
import { recordAudit } from '../../db/queries/audit';
import {
  auditEntries,
  fabricVersions,
  kernelVersions,
  mappingDrafts,
  members,
  sessions,
  solveJobs,
  users,
  workspaces,
} from '../../db/schema';
import { testDatabase } from '../helpers/database';
import { newBench } from '../helpers/documents';
import { newWorkspace } from '../helpers/people';
import { refusedWith } from '../helpers/refused';

// Codes of PostgreSQL 15, appendix A.
const CHECK_VIOLATION = '23514';
const FOREIGN_KEY_VIOLATION = '23503';
const RESTRICT_VIOLATION = '23001';
const UNIQUE_VIOLATION = '23505';
const box = testDatabase();

describe('the schema', () => {
  it('migrates again without a change, also twice at once', async () => {
    await Promise.all([migrateDatabase(box.url), migrateDatabase(box.url)]);
    const applied = await box.db.execute(sql`select count(*)::int as n from drizzle.__drizzle_migrations`);
    expect(applied[0]?.n).toBeGreaterThanOrEqual(3);
  });

  it('takes addresses in lower case only, and each once', async () => {
    const person = { id: newId('user'), name: 'Architect', passwordHash: 'x' };
    expect(
      await refusedWith(box.db.insert(users).values({ ...person, email: 'Architect@tarnbrook.example' })),
    ).toEqual({ code: CHECK_VIOLATION, constraint: 'users_email_lower' });
    await box.db.insert(users).values({ ...person, email: 'architect@tarnbrook.example' });
    expect(
      await refusedWith(
        box.db.insert(users).values({ ...person, id: newId('user'), email: 'architect@tarnbrook.example' }),
      ),
    ).toEqual({ code: UNIQUE_VIOLATION, constraint: 'users_email_unique' });
  });

  it('stores no session whose id is not a digest', async () => {
    const { userId } = await newWorkspace(box.db);
    const session = { id: 'plain-token', userId, expiresAt: new Date('2030-01-01') };
    expect(await refusedWith(box.db.insert(sessions).values(session))).toEqual({
      code: CHECK_VIOLATION,
      constraint: 'sessions_id_is_digest',
    });
  });

  it('refuses to change or delete a version', async () => {
    const of = await newWorkspace(box.db);
    const bench = await newBench(box.db, of);
    const relabel = box.db
      .update(kernelVersions)
      .set({ label: 'other' })
      .where(eq(kernelVersions.id, bench.kernelVersionId));
    expect((await refusedWith(relabel)).code).toBe(RESTRICT_VIOLATION);
    const remove = box.db.delete(fabricVersions).where(eq(fabricVersions.id, bench.fabricVersionId));
    expect((await refusedWith(remove)).code).toBe(RESTRICT_VIOLATION);
  });

  it('refuses to change the record of who did what', async () => {
    const { workspaceId, userId } = await newWorkspace(box.db);
    await recordAudit(box.db, {
      workspaceId,
      actorId: userId,
      action: 'kernel created',
      subjectType: 'kernel',
      subjectId: 'kernel_x',
    });
    const forge = box.db
      .update(auditEntries)
      .set({ action: 'nothing' })
      .where(eq(auditEntries.workspaceId, workspaceId));
    expect((await refusedWith(forge)).code).toBe(RESTRICT_VIOLATION);
  });

  it('lets no bench mix the versions of two workspaces', async () => {
    const mine = await newWorkspace(box.db);
    const theirs = await newWorkspace(box.db);
    const bench = await newBench(box.db, mine);
    const other = await newBench(box.db, theirs);
    const mixed = box.db.insert(mappingDrafts).values({
      id: newId('draft'),
      workspaceId: mine.workspaceId,
      name: 'Mixed',
      kernelVersionId: other.kernelVersionId,
      fabricVersionId: bench.fabricVersionId,
      document: { placement: {}, pins: {}, routes: {} },
      provenance: { by: 'hand' },
      opCount: 2,
      createdBy: mine.userId,
      updatedBy: mine.userId,
    });
    expect(await refusedWith(mixed)).toEqual({
      code: FOREIGN_KEY_VIOLATION,
      constraint: 'mapping_drafts_kernel_version_fk',
    });
  });

  it('keeps an owner even when the last one is demoted past all queries', async () => {
    const { workspaceId } = await newWorkspace(box.db);
    const demote = box.db.update(members).set({ role: 'viewer' }).where(eq(members.workspaceId, workspaceId));
    expect(await refusedWith(demote)).toEqual({
      code: RESTRICT_VIOLATION,
      constraint: 'members_keep_an_owner',
    });
  });

  it('lets a whole workspace go with its members', async () => {
    const { workspaceId } = await newWorkspace(box.db);
    await box.db.delete(workspaces).where(eq(workspaces.id, workspaceId));
    expect(await box.db.select().from(members).where(eq(members.workspaceId, workspaceId))).toEqual([]);
  });

  it('ties the lease of a solve to its state', async () => {
    const of = await newWorkspace(box.db);
    const { draftId, kernelVersionId, fabricVersionId } = await newBench(box.db, of);
    const running = box.db.insert(solveJobs).values({
      id: newId('solve'),
      workspaceId: of.workspaceId,
      mappingDraftId: draftId,
      kernelVersionId,
      fabricVersionId,
      requestedBy: of.userId,
      state: 'running',
      settings: { engine: 'auto', objective: 'wire', timeLimitMs: 1000, seed: 1 },
      pins: {},
    });
    expect(await refusedWith(running)).toEqual({ code: CHECK_VIOLATION, constraint: 'solve_jobs_lease' });
  });
});
