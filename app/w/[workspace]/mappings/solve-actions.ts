'use server';

import { z } from 'zod';
import { audit } from '@/app/_server/audit';
import { defineAction } from '@/app/_server/define-action';
import { appError, notFound } from '@/app/_server/errors';
import { enqueueSolve } from '@/app/_server/jobs';
import { database } from '@/db/client';
import { getMappingDraft } from '@/db/queries/mapping-drafts';
import { createSolve, noteQueued, requestCancel } from '@/db/queries/solve-jobs';
import { idSchema } from '@/lib/ids';
import { objectives, pinsSchema, placementSchema } from '@/lib/mapping/mapping';
import { err, ok } from '@/lib/result';
import { engineChoices, SOLVE_LIMITS } from '@/lib/solver/options';
import { checkProblem } from '@/lib/solver/problem';

const MAX_SOLVE_BYTES = 400 * 1024;
const LONGEST_MS = 600_000;
const editor = { role: 'editor' } as const;

/** Asks for a solve of a bench. A bench has one at a time: while one runs, its id is the answer. */
export const startSolve = defineAction({
  name: 'solve.start',
  access: editor,
  maxBytes: MAX_SOLVE_BYTES,
  input: z.object({
    workspace: z.string(),
    draftId: idSchema('draft'),
    settings: z.strictObject({
      engine: z.enum(engineChoices),
      objective: z.enum(objectives),
      timeLimitMs: z.number().int().min(1000, 'At least 1 second').max(LONGEST_MS, 'At most 10 minutes'),
      seed: z.number().int().min(0).max(SOLVE_LIMITS.seed),
    }),
    pins: pinsSchema,
    startPlacement: placementSchema.nullable(),
  }),
  run: async ({ input, ...member }) => {
    const { draftId, settings, pins, startPlacement } = input;
    const of = { workspaceId: member.workspace.id, draftId };
    const draft = await getMappingDraft(database(), of);
    if (!draft) return err(notFound('bench'));
    const problem = checkProblem({
      kernel: draft.kernel.document,
      fabric: draft.fabric.document,
      pins,
      objective: settings.objective,
      ...(startPlacement ? { start: startPlacement } : {}),
    });
    if (!problem.ok) return err(appError('invalid', problem.error.messages.join(' ')));
    const made = await database().transaction(async (tx) => {
      const solve = await createSolve(tx, { ...of, userId: member.user.id, settings, pins, startPlacement });
      if (solve.ok && solve.value.created) {
        await audit(tx, member, {
          action: 'solve started',
          subjectType: 'solve',
          subjectId: solve.value.id,
          detail: { bench: draft.name, timeLimitMs: settings.timeLimitMs },
        });
      }
      return solve;
    });
    if (!made.ok)
      return err(appError('conflict', 'A solve of this bench ended at this very moment. Press again.'));
    const { id, created } = made.value;
    if (created) {
      const bossJobId = await enqueueSolve({ id, timeLimitMs: settings.timeLimitMs });
      if (bossJobId) await noteQueued(database(), { workspaceId: of.workspaceId, solveId: id, bossJobId });
    }
    return ok({ solveId: id, created });
  },
});

/** Asks a solve to end; the best that it found stays. */
export const stopSolve = defineAction({
  name: 'solve.stop',
  access: editor,
  input: z.object({ workspace: z.string(), solveId: idSchema('solve') }),
  run: async ({ input, workspace }) => {
    const done = await requestCancel(database(), { workspaceId: workspace.id, solveId: input.solveId });
    return done.ok ? ok({ state: done.value.state }) : err(notFound('solve'));
  },
});
