import { beforeAll, describe, expect, it } from 'vitest';
import { createFabricVersion, getFabricVersionByNumber } from '../../db/queries/fabric-versions';
import { createFabric, getFabricDraft, listFabrics, saveFabricDraft } from '../../db/queries/fabrics';
import {
  createKernelVersion,
  getKernelVersionByNumber,
  listKernelVersions,
} from '../../db/queries/kernel-versions';
import {
  archiveKernel,
  createKernel,
  getKernelDraft,
  listKernels,
  saveKernelDraft,
} from '../../db/queries/kernels';
import { testDatabase } from '../helpers/database';
import { gaugeKernel, smallFabric, value } from '../helpers/documents';
import { newMember, newWorkspace } from '../helpers/people';

const box = testDatabase();
let of: Awaited<ReturnType<typeof newWorkspace>>;
beforeAll(async () => {
  of = await newWorkspace(box.db);
});

const newKernel = () => createKernel(box.db, { ...of, document: gaugeKernel(), errorCount: 0 });

describe('a kernel draft', () => {
  it('comes back as it was saved, with the figures of its document', async () => {
    const { id } = await newKernel();
    const draft = await getKernelDraft(box.db, { ...of, kernelId: id });
    expect(draft?.document).toEqual(gaugeKernel());
    const [item] = await listKernels(box.db, { ...of, archived: false });
    expect(item).toMatchObject({ id, opCount: 2, edgeCount: 1, errorCount: 0, latestVersion: null });
  });

  it('grows its revision by one with a save', async () => {
    const { id } = await newKernel();
    const save = { ...of, kernelId: id, revision: 1, document: gaugeKernel('Second name'), errorCount: 3 };
    expect(value(await saveKernelDraft(box.db, save)).revision).toBe(2);
    expect(await getKernelDraft(box.db, { ...of, kernelId: id })).toMatchObject({
      name: 'Second name',
      revision: 2,
    });
  });

  it('tells the second of two who save one revision who was first, and keeps the first', async () => {
    const { id } = await newKernel();
    const other = await newMember(box.db, of, 'editor');
    const base = { ...of, kernelId: id, revision: 1, errorCount: 0 };
    const results = await Promise.all([
      saveKernelDraft(box.db, { ...base, document: gaugeKernel('Mine') }),
      saveKernelDraft(box.db, { ...base, userId: other.id, document: gaugeKernel('Theirs') }),
    ]);
    expect(results.filter((result) => result.ok)).toHaveLength(1);
    const refused = results.find((result) => !result.ok);
    expect(refused).toMatchObject({ ok: false, error: { code: 'conflict', revision: 2 } });
    const stored = await getKernelDraft(box.db, { ...of, kernelId: id });
    expect(stored?.name).toBe(results[0]?.ok ? 'Mine' : 'Theirs');
  });

  it('is not saved while the kernel is archived', async () => {
    const { id } = await newKernel();
    value(await archiveKernel(box.db, { ...of, kernelId: id, archived: true }));
    const save = { ...of, kernelId: id, revision: 1, document: gaugeKernel(), errorCount: 0 };
    expect(await saveKernelDraft(box.db, save)).toEqual({ ok: false, error: { code: 'archived' } });
    value(await archiveKernel(box.db, { ...of, kernelId: id, archived: false }));
    expect((await saveKernelDraft(box.db, save)).ok).toBe(true);
  });

  it('stands in one of the two lists', async () => {
    const { id } = await newKernel();
    value(await archiveKernel(box.db, { ...of, kernelId: id, archived: true }));
    const ids = async (archived: boolean) =>
      (await listKernels(box.db, { ...of, archived })).map((k) => k.id);
    expect(await ids(true)).toContain(id);
    expect(await ids(false)).not.toContain(id);
  });
});

describe('kernel versions', () => {
  it('are numbered 1, 2, … and keep their document when the draft goes on', async () => {
    const { id } = await newKernel();
    const first = value(
      await createKernelVersion(box.db, { ...of, kernelId: id, revision: 1, label: 'as measured' }),
    );
    value(
      await saveKernelDraft(box.db, {
        ...of,
        kernelId: id,
        revision: 1,
        document: gaugeKernel('Later'),
        errorCount: 0,
      }),
    );
    const second = value(await createKernelVersion(box.db, { ...of, kernelId: id, revision: 2, label: '' }));
    expect([first.number, second.number]).toEqual([1, 2]);
    const stored = await getKernelVersionByNumber(box.db, { ...of, kernelId: id, number: 1 });
    expect(stored).toMatchObject({ document: gaugeKernel(), label: 'as measured', number: 1 });
    expect((await getKernelVersionByNumber(box.db, { ...of, kernelId: id, number: 2 }))?.id).toBe(second.id);
    const listed = await listKernelVersions(box.db, { ...of, kernelId: id });
    expect(listed.map((version) => version.number)).toEqual([2, 1]);
  });

  it('are not made twice of the same content', async () => {
    const { id } = await newKernel();
    const make = () => createKernelVersion(box.db, { ...of, kernelId: id, revision: 1, label: '' });
    const both = await Promise.all([make(), make()]);
    expect(both.map(value).map((version) => version.number)).toEqual([1, 1]);
    expect(both.map(value).filter((version) => version.created)).toHaveLength(1);
  });

  it('are not made of a draft that somebody has changed since', async () => {
    const { id } = await newKernel();
    const save = { ...of, kernelId: id, revision: 1, document: gaugeKernel('New'), errorCount: 0 };
    value(await saveKernelDraft(box.db, save));
    expect(await createKernelVersion(box.db, { ...of, kernelId: id, revision: 1, label: '' })).toEqual({
      ok: false,
      error: 'conflict',
    });
  });
});

describe('a fabric', () => {
  it('has its grid and its number of PEs in the list: 4 tiles, 1 without a unit, 3 PEs', async () => {
    const { id } = await createFabric(box.db, { ...of, document: smallFabric(), errorCount: 0 });
    const item = (await listFabrics(box.db, { ...of, archived: false })).find((one) => one.id === id);
    expect(item).toMatchObject({ rows: 2, cols: 2, topology: 'mesh', peCount: 3, latestVersion: null });
    const draft = await getFabricDraft(box.db, { ...of, fabricId: id });
    expect(draft?.document).toEqual(smallFabric());
  });

  it('is saved by revision and fixed as a version', async () => {
    const { id } = await createFabric(box.db, { ...of, document: smallFabric(), errorCount: 0 });
    const save = { ...of, fabricId: id, revision: 1, document: smallFabric('Four'), errorCount: 0 };
    value(await saveFabricDraft(box.db, save));
    expect(await saveFabricDraft(box.db, save)).toMatchObject({
      error: { code: 'conflict', revision: 2, updatedByName: 'Owner' },
    });
    value(await createFabricVersion(box.db, { ...of, fabricId: id, revision: 2, label: '' }));
    expect(await getFabricVersionByNumber(box.db, { ...of, fabricId: id, number: 1 })).toMatchObject({
      document: smallFabric('Four'),
      peCount: 3,
    });
  });
});
