'use server';

import { z } from 'zod';
import { audit } from '@/app/_server/audit';
import { defineAction } from '@/app/_server/define-action';
import { appError, notFound } from '@/app/_server/errors';
import { fabricOfForm } from '@/components/fabric-form/fabric-of-form';
import { fabricFormSchema } from '@/components/fabric-form/form-values';
import { database } from '@/db/client';
import { createFabricVersion } from '@/db/queries/fabric-versions';
import { archiveFabric, getFabricDraft, renameFabric } from '@/db/queries/fabrics';
import { FABRIC_LIMITS } from '@/lib/fabric/fabric';
import { validateFabric } from '@/lib/fabric/validate-fabric';
import { parseFabricJson } from '@/lib/formats/fabric-json';
import { idSchema } from '@/lib/ids';
import { err, ok } from '@/lib/result';
import { addFabric } from './add-fabric';

const slug = z.string().min(1).max(80);
const fabricId = idSchema('fabric');
const FILE_MAX_BYTES = 900 * 1024;

export const createFabricAction = defineAction({
  name: 'fabric.create',
  access: { role: 'editor' },
  input: z.strictObject({ workspace: slug, form: fabricFormSchema }),
  run: async (member) => ok(await addFabric(member, fabricOfForm(member.input.form), 'fabric created')),
});

export const importFabricAction = defineAction({
  name: 'fabric.import',
  access: { role: 'editor' },
  input: z.strictObject({ workspace: slug, text: z.string().max(FILE_MAX_BYTES) }),
  maxBytes: 2 * FILE_MAX_BYTES,
  run: async (member) => {
    const parsed = parseFabricJson(member.input.text);
    if (!parsed.ok) {
      const [first] = parsed.errors;
      const where = first ? `Line ${first.line}, column ${first.column}: ${first.message}` : '';
      return err(appError('invalid', `The file was not imported. ${where}`.trim()));
    }
    const wrong = validateFabric(parsed.value).find((problem) => problem.severity === 'error');
    if (wrong) return err(appError('invalid', `The file was not imported. ${wrong.message}`));
    return ok(await addFabric(member, parsed.value, 'fabric imported'));
  },
});

export const duplicateFabricAction = defineAction({
  name: 'fabric.duplicate',
  access: { role: 'editor' },
  input: z.strictObject({ workspace: slug, fabricId }),
  run: async (member) => {
    const source = await getFabricDraft(database(), {
      workspaceId: member.workspace.id,
      fabricId: member.input.fabricId,
    });
    if (!source) return err(notFound('fabric'));
    const name = `${source.name.slice(0, FABRIC_LIMITS.nameLength - ' (copy)'.length)} (copy)`;
    return ok(await addFabric(member, { ...source.document, name }, 'fabric duplicated'));
  },
});

export const renameFabricAction = defineAction({
  name: 'fabric.rename',
  access: { role: 'editor' },
  input: z.strictObject({
    workspace: slug,
    fabricId,
    name: z
      .string()
      .trim()
      .min(1, 'Give the fabric a name')
      .max(FABRIC_LIMITS.nameLength, `Use at most ${FABRIC_LIMITS.nameLength} characters`),
  }),
  run: ({ user, workspace, input }) =>
    database().transaction(async (tx) => {
      const change = { workspaceId: workspace.id, userId: user.id, fabricId: input.fabricId };
      const renamed = await renameFabric(tx, { ...change, name: input.name });
      if (!renamed.ok) return err(notFound('fabric'));
      await audit(
        tx,
        { user, workspace },
        {
          action: 'fabric renamed',
          subjectType: 'fabric',
          subjectId: input.fabricId,
          detail: { name: input.name },
        },
      );
      return ok(null);
    }),
});

export const archiveFabricAction = defineAction({
  name: 'fabric.archive',
  access: { role: 'editor' },
  input: z.strictObject({ workspace: slug, fabricId, archived: z.boolean() }),
  run: ({ user, workspace, input }) =>
    database().transaction(async (tx) => {
      const changed = await archiveFabric(tx, { ...input, workspaceId: workspace.id });
      if (!changed.ok) return err(notFound('fabric'));
      await audit(
        tx,
        { user, workspace },
        {
          action: input.archived ? 'fabric archived' : 'fabric restored',
          subjectType: 'fabric',
          subjectId: input.fabricId,
          detail: { name: changed.value.name },
        },
      );
      return ok({ name: changed.value.name });
    }),
});

export const keepFabricVersionAction = defineAction({
  name: 'fabric.keepVersion',
  access: { role: 'editor' },
  input: z.strictObject({
    workspace: slug,
    fabricId,
    revision: z.number().int().min(1),
    label: z.string().trim().max(80, 'Use at most 80 characters'),
  }),
  run: ({ user, workspace, input }) =>
    database().transaction(async (tx) => {
      const { fabricId: id, revision, label } = input;
      const kept = await createFabricVersion(tx, {
        workspaceId: workspace.id,
        userId: user.id,
        fabricId: id,
        revision,
        label,
      });
      if (!kept.ok) {
        return err(
          kept.error === 'not_found'
            ? notFound('fabric')
            : appError('conflict', 'Somebody changed this fabric meanwhile. Load the page again to see it.'),
        );
      }
      if (kept.value.created) {
        await audit(
          tx,
          { user, workspace },
          {
            action: 'fabric version kept',
            subjectType: 'fabric',
            subjectId: id,
            detail: { number: kept.value.number },
          },
        );
      }
      return ok({ number: kept.value.number, created: kept.value.created });
    }),
});
