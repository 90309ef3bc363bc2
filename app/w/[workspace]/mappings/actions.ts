'use server';

import { revalidatePath } from 'next/cache';
import { z } from 'zod';
import { audit } from '@/app/_server/audit';
import { defineAction } from '@/app/_server/define-action';
import { type AppResult, appError, notFound, refuse } from '@/app/_server/errors';
import { database } from '@/db/client';
import {
  archiveMappingDraft,
  createMappingDraft,
  getMappingDraft,
  renameMappingDraft,
  saveMappingDraft,
} from '@/db/queries/mapping-drafts';
import { archiveMapping, getMapping, keepMapping, renameMapping } from '@/db/queries/mappings';
import { listSolves } from '@/db/queries/solve-jobs';
import { compileFabric } from '@/lib/fabric/compile';
import { idSchema } from '@/lib/ids';
import { type BenchDocument, benchDocumentSchema } from '@/lib/mapping/bench-document';
import { honestProvenance } from '@/lib/mapping/honest-provenance';
import { type Provenance, provenanceSchema } from '@/lib/mapping/mapping';
import { measureMapping } from '@/lib/mapping/metrics';
import { verifyMapping } from '@/lib/mapping/verify';
import { err, ok } from '@/lib/result';
import { benchFigures, keptFigures } from './bench-figures';
import { draftProblem } from './draft-problem';
import { knownMakings } from './known-makings';
import { versionsForBench } from './versions-for-bench';

const MAX_BENCH_BYTES = 900 * 1024;
const editor = { role: 'editor' } as const;
const name = z.string().trim().min(1, 'Give it a name').max(80, 'At most 80 letters');
const inWorkspace = z.object({ workspace: z.string() });
const oneDraft = inWorkspace.extend({ draftId: idSchema('draft') });
const oneMapping = inWorkspace.extend({ mappingId: idSchema('mapping') });
const content = { document: benchDocumentSchema, provenance: provenanceSchema };

type BenchSaved =
  | { type: 'saved'; revision: number; atMs: number }
  | {
      type: 'conflict';
      theirs: { document: BenchDocument; provenance: Provenance; revision: number; changedBy: string };
    };

/** A new bench for a kernel and a fabric, each at its newest state that has no errors. */
export const createBench = defineAction({
  name: 'bench.create',
  access: editor,
  input: inWorkspace.extend({ name, kernelId: idSchema('kernel'), fabricId: idSchema('fabric') }),
  run: async ({ input, ...member }) =>
    database().transaction(async (tx) => {
      const owner = { workspaceId: member.workspace.id, userId: member.user.id };
      const versions = await versionsForBench(tx, { ...owner, ...input });
      if (!versions.ok) return versions;
      const made = await createMappingDraft(tx, { ...owner, name: input.name, ...versions.value });
      if (!made.ok) return err(notFound('kernel or fabric'));
      await audit(tx, member, {
        action: 'bench created',
        subjectType: 'draft',
        subjectId: made.value.id,
        detail: { name: input.name },
      });
      return ok({ draftId: made.value.id });
    }),
});

/** Saves what the bench holds when nobody saved in between; a conflict comes with what is stored. */
export const saveBench = defineAction({
  name: 'bench.save',
  access: editor,
  maxBytes: MAX_BENCH_BYTES,
  input: oneDraft.extend({ revision: z.number().int().min(1), ...content }),
  run: async ({ input, workspace, user }): Promise<AppResult<BenchSaved>> => {
    const draft = { workspaceId: workspace.id, draftId: input.draftId };
    const stored = await getMappingDraft(database(), draft);
    if (!stored) return err(notFound('bench'));
    const solves =
      input.provenance.by === 'solver' ? await listSolves(database(), { ...draft, limit: 50 }) : [];
    const graph = compileFabric(stored.fabric.document);
    const saved = await saveMappingDraft(database(), {
      ...draft,
      userId: user.id,
      revision: input.revision,
      document: input.document,
      provenance: honestProvenance(input.provenance, input.document.placement, knownMakings(stored, solves)),
      figures: benchFigures(measureMapping(stored.kernel.document, graph, input.document)),
    });
    if (saved.ok) {
      return ok({
        type: 'saved',
        revision: saved.value.revision,
        atMs: saved.value.updatedAt.getTime(),
      });
    }
    if (saved.error.code !== 'conflict') return err(draftProblem(saved.error));
    const theirs = await getMappingDraft(database(), draft);
    if (!theirs) return err(notFound('bench'));
    return ok({
      type: 'conflict',
      theirs: {
        document: theirs.document,
        provenance: theirs.provenance,
        revision: theirs.revision,
        changedBy: theirs.updatedByName,
      },
    });
  },
});

/** Saves a bench's content beside the stored one, as a bench of its own. */
export const saveBenchAsNew = defineAction({
  name: 'bench.save as new',
  access: editor,
  maxBytes: MAX_BENCH_BYTES,
  input: oneDraft.extend({ name, ...content }),
  run: async ({ input, ...member }) =>
    database().transaction(async (tx) => {
      const from = { workspaceId: member.workspace.id, draftId: input.draftId };
      const stored = await getMappingDraft(tx, from);
      if (!stored) return err(notFound('bench'));
      const solves = await listSolves(tx, { ...from, limit: 50 });
      const graph = compileFabric(stored.fabric.document);
      const made = await createMappingDraft(tx, {
        workspaceId: member.workspace.id,
        userId: member.user.id,
        name: input.name,
        kernelVersionId: stored.kernel.versionId,
        fabricVersionId: stored.fabric.versionId,
        start: {
          document: input.document,
          provenance: honestProvenance(
            input.provenance,
            input.document.placement,
            knownMakings(stored, solves),
          ),
          figures: benchFigures(measureMapping(stored.kernel.document, graph, input.document)),
        },
      });
      if (!made.ok) return err(notFound('bench'));
      await audit(tx, member, {
        action: 'bench created',
        subjectType: 'draft',
        subjectId: made.value.id,
        detail: { name: input.name, from: stored.name },
      });
      return ok({ draftId: made.value.id });
    }),
});

/** Keeps the bench's stored content as a mapping, after verifying and measuring it afresh. */
export const keepAsMapping = defineAction({
  name: 'mapping.keep',
  access: editor,
  input: oneDraft.extend({ name, revision: z.number().int().min(1) }),
  run: async ({ input, ...member }) =>
    database().transaction(async (tx) => {
      const of = { workspaceId: member.workspace.id, draftId: input.draftId };
      const draft = await getMappingDraft(tx, of);
      if (!draft) return err(notFound('bench'));
      const { kernel, fabric, document, provenance } = draft;
      const broken = verifyMapping(kernel.document, fabric.document, document);
      const first = broken[0];
      if (first) {
        const more = broken.length > 1 ? ` and ${broken.length - 1} more` : '';
        return err(
          appError('invalid', `This is no legal mapping yet. ${first.rule}: ${first.message}${more}.`),
        );
      }
      const metrics = measureMapping(kernel.document, compileFabric(fabric.document), document);
      const { placedOps: _, ...figures } = benchFigures(metrics);
      const kept = await keepMapping(tx, {
        ...of,
        userId: member.user.id,
        revision: input.revision,
        document: {
          format: 'pinloom.mapping',
          formatVersion: 1,
          name: input.name,
          kernel: { name: kernel.name, version: kernel.number },
          fabric: { name: fabric.name, version: fabric.number },
          ...document,
          provenance,
        },
        figures,
      });
      if (!kept.ok) return refuse(draftProblem(kept.error));
      await audit(tx, member, {
        action: 'mapping kept',
        subjectType: 'mapping',
        subjectId: kept.value.id,
        detail: { name: input.name, wireHops: figures.wireHops },
      });
      revalidatePath(`/w/${input.workspace}/mappings`);
      return ok({ mappingId: kept.value.id });
    }),
});

/** A new bench that begins with a kept mapping. */
export const continueFromMapping = defineAction({
  name: 'bench.continue',
  access: editor,
  input: oneMapping,
  run: async ({ input, ...member }) =>
    database().transaction(async (tx) => {
      const mapping = await getMapping(tx, { workspaceId: member.workspace.id, mappingId: input.mappingId });
      if (!mapping) return err(notFound('mapping'));
      const { placement, pins, routes, provenance } = mapping.document;
      const made = await createMappingDraft(tx, {
        workspaceId: member.workspace.id,
        userId: member.user.id,
        name: `${mapping.name.slice(0, 68)}, continued`,
        kernelVersionId: mapping.kernelVersionId,
        fabricVersionId: mapping.fabricVersionId,
        start: {
          document: { placement, pins, routes },
          provenance,
          figures: keptFigures(mapping),
        },
      });
      if (!made.ok) return err(notFound('mapping'));
      await audit(tx, member, {
        action: 'bench created',
        subjectType: 'draft',
        subjectId: made.value.id,
        detail: { from: mapping.name },
      });
      return ok({ draftId: made.value.id });
    }),
});

export const renameBench = defineAction({
  name: 'bench.rename',
  access: editor,
  input: oneDraft.extend({ name }),
  run: async ({ input, workspace, user }) => {
    const of = { workspaceId: workspace.id, draftId: input.draftId, userId: user.id, name: input.name };
    const done = await renameMappingDraft(database(), of);
    return done.ok ? ok({ name: input.name }) : err(notFound('bench'));
  },
});

export const renameKeptMapping = defineAction({
  name: 'mapping.rename',
  access: editor,
  input: oneMapping.extend({ name }),
  run: async ({ input, workspace }) => {
    const of = { workspaceId: workspace.id, mappingId: input.mappingId, name: input.name };
    const done = await renameMapping(database(), of);
    return done.ok ? ok({ name: input.name }) : err(notFound('mapping'));
  },
});

/** Puts a bench or a kept mapping away, or takes it out again. */
export const setArchived = defineAction({
  name: 'mapping.archive',
  access: editor,
  input: inWorkspace.extend({
    id: z.union([idSchema('draft'), idSchema('mapping')]),
    archived: z.boolean(),
  }),
  run: async ({ input, ...member }) =>
    database().transaction(async (tx) => {
      const workspaceId = member.workspace.id;
      const { archived } = input;
      const draftId = idSchema('draft').safeParse(input.id);
      const mappingId = idSchema('mapping').safeParse(input.id);
      const done = draftId.success
        ? await archiveMappingDraft(tx, { workspaceId, draftId: draftId.data, archived })
        : mappingId.success
          ? await archiveMapping(tx, { workspaceId, mappingId: mappingId.data, archived })
          : err('not_found' as const);
      if (!done.ok) return err(notFound('mapping'));
      await audit(tx, member, {
        action: `${draftId.success ? 'bench' : 'mapping'} ${archived ? 'archived' : 'restored'}`,
        subjectType: draftId.success ? 'draft' : 'mapping',
        subjectId: input.id,
        detail: { name: done.value.name },
      });
      revalidatePath(`/w/${input.workspace}/mappings`);
      return ok({ name: done.value.name });
    }),
});
