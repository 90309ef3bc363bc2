import { beforeAll, describe, expect, it } from 'vitest';
import { listAudit, recordAudit } from '../../db/queries/audit';
import {
  createFabricVersion,
  getFabricVersionByNumber,
  listFabricVersions,
} from '../../db/queries/fabric-versions';
import {
  archiveFabric,
  getFabricDraft,
  listFabrics,
  renameFabric,
  saveFabricDraft,
} from '../../db/queries/fabrics';
import {
  createInvitation,
  listPendingInvitations,
  renewInvitation,
  revokeInvitation,
} from '../../db/queries/invitations';
import {
  createKernelVersion,
  getKernelVersionByNumber,
  listKernelVersions,
} from '../../db/queries/kernel-versions';
import { archiveKernel, getKernelDraft, listKernels, saveKernelDraft } from '../../db/queries/kernels';
import {
  archiveMappingDraft,
  createMappingDraft,
  getMappingDraft,
  listMappingDrafts,
  renameMappingDraft,
  saveMappingDraft,
} from '../../db/queries/mapping-drafts';
import {
  archiveMapping,
  getMapping,
  keepMapping,
  listMappings,
  renameMapping,
} from '../../db/queries/mappings';
import { changeRole, findMembership, listMembers, removeMember } from '../../db/queries/members';
import { createSolve, getSolve, listSolves, requestCancel } from '../../db/queries/solve-jobs';
import { tokenDigest } from '../../db/tokens';
import { testDatabase } from '../helpers/database';
import { gaugeKernel, newBench, smallFabric, value } from '../helpers/documents';
import { figures, handDocument } from '../helpers/kept-mapping';
import { newWorkspace } from '../helpers/people';

const box = testDatabase();
const settings = { engine: 'auto', objective: 'wire', timeLimitMs: 1000, seed: 1 } as const;
const NOT_FOUND = { ok: false, error: 'not_found' };
const SAVE_NOT_FOUND = { ok: false, error: { code: 'not_found' } };

let theirs: Awaited<ReturnType<typeof setUp>>;
/** Another workspace with its own owner, who asks for everything of the first one. */
let me: Awaited<ReturnType<typeof newWorkspace>>;

async function setUp() {
  const of = await newWorkspace(box.db);
  const bench = await newBench(box.db, of);
  const kept = value(
    await keepMapping(box.db, {
      ...of,
      draftId: bench.draftId,
      revision: 1,
      document: handDocument(),
      figures,
    }),
  );
  const solve = value(
    await createSolve(box.db, { ...of, draftId: bench.draftId, settings, pins: {}, startPlacement: null }),
  );
  const invitation = value(
    await createInvitation(box.db, {
      workspaceId: of.workspaceId,
      email: 'guest@tarnbrook.example',
      role: 'editor',
      tokenHash: tokenDigest('guest'),
      invitedBy: of.userId,
      now: new Date(),
      expiresAt: new Date(Date.now() + 86_400_000),
    }),
  );
  await recordAudit(box.db, {
    workspaceId: of.workspaceId,
    actorId: of.userId,
    action: 'kernel created',
    subjectType: 'kernel',
    subjectId: bench.kernelId,
  });
  return { of, ...bench, mappingId: kept.id, solveId: solve.id, invitationId: invitation.id };
}

beforeAll(async () => {
  theirs = await setUp();
  me = await newWorkspace(box.db);
});

describe('reading what belongs to another workspace', () => {
  it('finds nothing by id', async () => {
    const { kernelId, fabricId, draftId, mappingId, solveId } = theirs;
    const found = await Promise.all([
      getKernelDraft(box.db, { ...me, kernelId }),
      getFabricDraft(box.db, { ...me, fabricId }),
      getKernelVersionByNumber(box.db, { ...me, kernelId, number: 1 }),
      getFabricVersionByNumber(box.db, { ...me, fabricId, number: 1 }),
      getMappingDraft(box.db, { ...me, draftId }),
      getMapping(box.db, { ...me, mappingId }),
      getSolve(box.db, { ...me, solveId }),
      findMembership(box.db, { slug: theirs.of.slug, userId: me.userId }),
    ]);
    expect(found).toEqual(found.map(() => null));
  });

  it('lists nothing of it', async () => {
    const { kernelId, fabricId, draftId } = theirs;
    const lists = await Promise.all([
      listKernels(box.db, { ...me, archived: false }),
      listFabrics(box.db, { ...me, archived: false }),
      listKernelVersions(box.db, { ...me, kernelId }),
      listFabricVersions(box.db, { ...me, fabricId }),
      listMappingDrafts(box.db, { ...me, archived: false }),
      listMappings(box.db, { ...me, archived: false, kernelId }),
      listSolves(box.db, { ...me, draftId }),
      listPendingInvitations(box.db, me),
      listAudit(box.db, me),
    ]);
    expect(lists).toEqual(lists.map(() => []));
    expect((await listMembers(box.db, me)).map((member) => member.userId)).toEqual([me.userId]);
  });

  it('finds it all for its own members', async () => {
    const { of, kernelId, mappingId, solveId, draftId } = theirs;
    expect(await getKernelDraft(box.db, { ...of, kernelId })).not.toBeNull();
    expect(await getMapping(box.db, { ...of, mappingId })).toMatchObject({
      solveStatus: 'by hand',
      ...figures,
    });
    expect(await getSolve(box.db, { ...of, solveId })).not.toBeNull();
    expect(await getMappingDraft(box.db, { ...of, draftId })).toMatchObject({
      keptAs: mappingId,
    });
    expect(await listPendingInvitations(box.db, of)).toHaveLength(1);
    expect(await listAudit(box.db, of)).toHaveLength(1);
  });
});

describe('changing what belongs to another workspace', () => {
  it('is not_found for kernels', async () => {
    const { kernelId } = theirs;
    const save = { ...me, kernelId, revision: 1, document: gaugeKernel(), errorCount: 0 };
    expect(await saveKernelDraft(box.db, save)).toEqual(SAVE_NOT_FOUND);
    expect(await archiveKernel(box.db, { ...me, kernelId, archived: true })).toEqual(NOT_FOUND);
    expect(await createKernelVersion(box.db, { ...me, kernelId, revision: 1, label: '' })).toEqual(NOT_FOUND);
  });

  it('is not_found for fabrics', async () => {
    const { fabricId } = theirs;
    const save = { ...me, fabricId, revision: 1, document: smallFabric(), errorCount: 0 };
    expect(await saveFabricDraft(box.db, save)).toEqual(SAVE_NOT_FOUND);
    expect(await renameFabric(box.db, { ...me, fabricId, name: 'x' })).toEqual(NOT_FOUND);
    expect(await archiveFabric(box.db, { ...me, fabricId, archived: true })).toEqual(NOT_FOUND);
    expect(await createFabricVersion(box.db, { ...me, fabricId, revision: 1, label: '' })).toEqual(NOT_FOUND);
  });

  it('is not_found for benches and mappings', async () => {
    const { draftId, mappingId, kernelVersionId, fabricVersionId } = theirs;
    const { placedOps: _, ...benchFigures } = { ...figures, placedOps: 0 };
    expect(await createMappingDraft(box.db, { ...me, name: 'x', kernelVersionId, fabricVersionId })).toEqual(
      NOT_FOUND,
    );
    expect(
      await saveMappingDraft(box.db, {
        ...me,
        draftId,
        revision: 1,
        document: { placement: {}, pins: {}, routes: {} },
        provenance: { by: 'hand' },
        figures: { ...benchFigures, placedOps: 0 },
      }),
    ).toEqual(SAVE_NOT_FOUND);
    expect(
      await keepMapping(box.db, { ...me, draftId, revision: 1, document: handDocument(), figures }),
    ).toEqual(SAVE_NOT_FOUND);
    expect(await renameMappingDraft(box.db, { ...me, draftId, name: 'x' })).toEqual(NOT_FOUND);
    expect(await archiveMappingDraft(box.db, { ...me, draftId, archived: true })).toEqual(NOT_FOUND);
    expect(await renameMapping(box.db, { ...me, mappingId, name: 'x' })).toEqual(NOT_FOUND);
    expect(await archiveMapping(box.db, { ...me, mappingId, archived: true })).toEqual(NOT_FOUND);
  });

  it('is not_found for a bench that mixes an own version with theirs', async () => {
    const mine = await newBench(box.db, me);
    const theirKernel = { kernelVersionId: theirs.kernelVersionId, fabricVersionId: mine.fabricVersionId };
    const theirFabric = { kernelVersionId: mine.kernelVersionId, fabricVersionId: theirs.fabricVersionId };
    expect(await createMappingDraft(box.db, { ...me, name: 'x', ...theirKernel })).toEqual(NOT_FOUND);
    expect(await createMappingDraft(box.db, { ...me, name: 'x', ...theirFabric })).toEqual(NOT_FOUND);
  });

  it('is not_found for solves', async () => {
    const { draftId, solveId } = theirs;
    expect(await createSolve(box.db, { ...me, draftId, settings, pins: {}, startPlacement: null })).toEqual(
      NOT_FOUND,
    );
    expect(await requestCancel(box.db, { ...me, solveId })).toEqual(NOT_FOUND);
  });

  it('is not_found for members and invitations', async () => {
    const { workspaceId } = me;
    const { invitationId, of } = theirs;
    expect(await changeRole(box.db, { workspaceId, userId: of.userId, role: 'viewer' })).toEqual(NOT_FOUND);
    expect(await removeMember(box.db, { workspaceId, userId: of.userId })).toEqual(NOT_FOUND);
    expect(
      await renewInvitation(box.db, {
        workspaceId,
        invitationId,
        tokenHash: tokenDigest('x'),
        expiresAt: new Date(),
      }),
    ).toEqual(NOT_FOUND);
    expect(await revokeInvitation(box.db, { workspaceId, invitationId, now: new Date() })).toEqual(NOT_FOUND);
  });
});
