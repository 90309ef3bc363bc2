import { eq } from 'drizzle-orm';
import { beforeAll, describe, expect, it } from 'vitest';
import { getMappingDraft, listMappingDrafts, saveMappingDraft } from '../../db/queries/mapping-drafts';
import {
  archiveMapping,
  getMapping,
  keepMapping,
  listMappings,
  renameMapping,
} from '../../db/queries/mappings';
import { mappings } from '../../db/schema';
import { testDatabase } from '../helpers/database';
import { gaugeKernel, newBench, smallFabric, value } from '../helpers/documents';
import { figures, handDocument } from '../helpers/kept-mapping';
import { newWorkspace } from '../helpers/people';
import { refusedWith } from '../helpers/refused';

const box = testDatabase();
let of: Awaited<ReturnType<typeof newWorkspace>>;
beforeAll(async () => {
  of = await newWorkspace(box.db);
});

describe('a bench', () => {
  it('comes with both documents and begins empty and by hand', async () => {
    const bench = await newBench(box.db, of);
    expect(await getMappingDraft(box.db, { ...of, draftId: bench.draftId })).toMatchObject({
      revision: 1,
      document: { placement: {}, pins: {}, routes: {} },
      provenance: { by: 'hand' },
      kernel: { name: 'Gauge reading', number: 1, document: gaugeKernel() },
      fabric: { name: 'Two by two', number: 1, document: smallFabric() },
    });
  });

  it('is saved by revision, with its figures in the list', async () => {
    const { draftId } = await newBench(box.db, of);
    const { placement, pins, routes, provenance } = handDocument();
    const save = {
      ...of,
      draftId,
      revision: 1,
      document: { placement, pins, routes },
      provenance,
      figures: { ...figures, placedOps: 2 },
    };
    expect(value(await saveMappingDraft(box.db, save)).revision).toBe(2);
    expect(await saveMappingDraft(box.db, save)).toMatchObject({ error: { code: 'conflict', revision: 2 } });
    const item = (await listMappingDrafts(box.db, { ...of, archived: false })).find((d) => d.id === draftId);
    expect(item).toMatchObject({ placedOps: 2, opCount: 2, wireHops: 1, kernelVersion: 1, keptAs: null });
  });
});

describe('keeping a mapping', () => {
  it('stores document, versions and figures, and the bench remembers it', async () => {
    const bench = await newBench(box.db, of);
    const keep = { ...of, draftId: bench.draftId, revision: 1, document: handDocument(), figures };
    const { id } = value(await keepMapping(box.db, keep));
    expect(await getMapping(box.db, { ...of, mappingId: id })).toMatchObject({
      name: 'By hand',
      solveStatus: 'by hand',
      engine: null,
      madeByName: 'Owner',
      kernelVersionId: bench.kernelVersionId,
      fabricVersionId: bench.fabricVersionId,
      document: handDocument(),
      opCount: 2,
      ...figures,
    });
    expect((await getMappingDraft(box.db, { ...of, draftId: bench.draftId }))?.keptAs).toBe(id);
  });

  it('stores what the solver proved in columns', async () => {
    const { draftId } = await newBench(box.db, of);
    const document = {
      ...handDocument('Solved'),
      provenance: {
        by: 'solver' as const,
        engine: 'highs',
        objective: 'wire' as const,
        timeLimitMs: 10_000,
        seed: 7,
        status: 'optimal' as const,
        objectiveValue: 1,
        bound: 1,
        elapsedMs: 12,
        changedByHand: false,
      },
    };
    const { id } = value(await keepMapping(box.db, { ...of, draftId, revision: 1, document, figures }));
    expect(await getMapping(box.db, { ...of, mappingId: id })).toMatchObject({
      solveStatus: 'optimal',
      engine: 'highs',
      objective: 'wire',
      seed: 7,
      timeLimitMs: 10_000,
      objectiveValue: 1,
      bound: 1,
      changedByHand: false,
    });
  });

  it('is refused when the bench has moved on', async () => {
    const { draftId } = await newBench(box.db, of);
    const keep = { ...of, draftId, revision: 2, document: handDocument(), figures };
    expect(await keepMapping(box.db, keep)).toMatchObject({ error: { code: 'conflict', revision: 1 } });
  });

  it('leaves nothing changeable but the name and the archive mark', async () => {
    const { draftId } = await newBench(box.db, of);
    const { id } = value(
      await keepMapping(box.db, { ...of, draftId, revision: 1, document: handDocument(), figures }),
    );
    value(await renameMapping(box.db, { ...of, mappingId: id, name: 'Final' }));
    value(await archiveMapping(box.db, { ...of, mappingId: id, archived: true }));
    const better = box.db.update(mappings).set({ wireHops: 0 }).where(eq(mappings.id, id));
    // restrict_violation, PostgreSQL 15 appendix A
    expect((await refusedWith(better)).code).toBe('23001');
    const archived = await listMappings(box.db, { ...of, archived: true });
    expect(archived).toContainEqual(expect.objectContaining({ id, name: 'Final', wireHops: 1 }));
  });

  it('lists by kernel', async () => {
    const bench = await newBench(box.db, of);
    const { id } = value(
      await keepMapping(box.db, {
        ...of,
        draftId: bench.draftId,
        revision: 1,
        document: handDocument(),
        figures,
      }),
    );
    const listed = await listMappings(box.db, { ...of, archived: false, kernelId: bench.kernelId });
    expect(listed.map((mapping) => mapping.id)).toEqual([id]);
  });
});
