'use server';

import { z } from 'zod';
import { audit } from '@/app/_server/audit';
import { defineAction } from '@/app/_server/define-action';
import { appError, notFound } from '@/app/_server/errors';
import type { SaveOutcome } from '@/components/kernel-editor/server-calls';
import { database } from '@/db/client';
import { createKernelVersion } from '@/db/queries/kernel-versions';
import { archiveKernel, getKernelDraft, saveKernelDraft } from '@/db/queries/kernels';
import { KERNEL_LIMITS, kernelSchema } from '@/lib/graph';
import { idSchema } from '@/lib/ids';
import { err, ok } from '@/lib/result';
import { countErrors, storeKernel } from './store-kernel';

const slug = z.string().min(1).max(80);
const kernelId = idSchema('kernel');
/** A kernel at its limits of ops and connections takes about half of this. */
const DOCUMENT_MAX_BYTES = 4 * 1024 * 1024;

export const createKernelAction = defineAction({
  name: 'kernel.create',
  access: { role: 'editor' },
  input: z.strictObject({ workspace: slug, document: kernelSchema }),
  maxBytes: DOCUMENT_MAX_BYTES,
  run: (member) => storeKernel(member, member.input.document, 'kernel created'),
});

export const saveKernelDraftAction = defineAction({
  name: 'kernel.save',
  access: { role: 'editor' },
  input: z.strictObject({
    workspace: slug,
    kernelId,
    revision: z.number().int().min(1),
    document: kernelSchema,
  }),
  maxBytes: DOCUMENT_MAX_BYTES,
  run: async ({ user, workspace, input }) => {
    const counted = countErrors(input.document);
    if (!counted.ok) return counted;
    const draft = { workspaceId: workspace.id, kernelId: input.kernelId };
    const saved = await saveKernelDraft(database(), {
      ...draft,
      userId: user.id,
      revision: input.revision,
      document: input.document,
      errorCount: counted.value,
    });
    if (saved.ok) {
      const { revision, updatedAt } = saved.value;
      return ok<SaveOutcome>({ outcome: 'saved', revision, savedAt: updatedAt.toISOString() });
    }
    if (saved.error.code === 'archived') {
      return err(appError('invalid', 'This kernel is archived. Restore it in the list of kernels to go on.'));
    }
    const theirs = saved.error.code === 'conflict' ? await getKernelDraft(database(), draft) : null;
    if (!theirs) return err(notFound('kernel'));
    const { revision, document, updatedByName } = theirs;
    return ok<SaveOutcome>({ outcome: 'conflict', revision, document, changedByName: updatedByName });
  },
});

export const duplicateKernelAction = defineAction({
  name: 'kernel.duplicate',
  access: { role: 'editor' },
  input: z.strictObject({ workspace: slug, kernelId }),
  run: async (member) => {
    const source = await getKernelDraft(database(), {
      workspaceId: member.workspace.id,
      kernelId: member.input.kernelId,
    });
    if (!source) return err(notFound('kernel'));
    const name = `${source.name.slice(0, KERNEL_LIMITS.nameLength - ' (copy)'.length)} (copy)`;
    return storeKernel(member, { ...source.document, name }, 'kernel duplicated');
  },
});

export const archiveKernelAction = defineAction({
  name: 'kernel.archive',
  access: { role: 'editor' },
  input: z.strictObject({ workspace: slug, kernelId, archived: z.boolean() }),
  run: ({ user, workspace, input }) =>
    database().transaction(async (tx) => {
      const changed = await archiveKernel(tx, { ...input, workspaceId: workspace.id });
      if (!changed.ok) return err(notFound('kernel'));
      await audit(
        tx,
        { user, workspace },
        {
          action: input.archived ? 'kernel archived' : 'kernel restored',
          subjectType: 'kernel',
          subjectId: input.kernelId,
          detail: { name: changed.value.name },
        },
      );
      return ok(changed.value);
    }),
});

export const keepKernelVersionAction = defineAction({
  name: 'kernel.keepVersion',
  access: { role: 'editor' },
  input: z.strictObject({
    workspace: slug,
    kernelId,
    revision: z.number().int().min(1),
    label: z.string().trim().max(80, 'Use at most 80 characters'),
  }),
  run: ({ user, workspace, input }) =>
    database().transaction(async (tx) => {
      const kept = await createKernelVersion(tx, {
        workspaceId: workspace.id,
        userId: user.id,
        kernelId: input.kernelId,
        revision: input.revision,
        label: input.label,
      });
      if (!kept.ok) {
        const changed =
          'Somebody saved another state meanwhile. Choose between the states first, then keep it.';
        return err(kept.error === 'not_found' ? notFound('kernel') : appError('conflict', changed));
      }
      const { number, created } = kept.value;
      if (created) {
        await audit(
          tx,
          { user, workspace },
          {
            action: 'kernel version kept',
            subjectType: 'kernel',
            subjectId: input.kernelId,
            detail: { number },
          },
        );
      }
      return ok({ number, created });
    }),
});
