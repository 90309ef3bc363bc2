'use server';

import { z } from 'zod';
import { audit } from '@/app/_server/audit';
import { defineAction } from '@/app/_server/define-action';
import { appError, notFound } from '@/app/_server/errors';
import { enqueueSolve } from '@/app/_server/jobs';
import { database } from '@/db/client';
import { getMappingDraft } from '@/db/queries/mapping-drafts';
import { createSolve, listSolves, noteQueued, requestCancel } from '@/db/queries/solve-jobs';
import { idSchema } from '@/lib/ids';
import { err, ok } from '@/lib/result';
import { checkProblem } from '@/lib/solver/problem';
import { askedSolve } from './solve-ask';
import { solveInput } from './solve-input';

const MAX_SOLVE_BYTES = 400 * 1024;
/** Earlier solves of a bench that are asked what they have shown. */
const SOLVES_KNOWN = 100;
const editor = { role: 'editor' } as const;

/**
 * Asks for a solve of a bench, for its best mapping or with a question of its own. A bench has one at a time: while one
 * runs, its id is the answer, and `asks` says what that one was asked.
 */
export const startSolve = defineAction({
  name: 'solve.start',
  access: editor,
  maxBytes: MAX_SOLVE_BYTES,
  input: solveInput,
  run: async ({ input, ...member }) => {
    const { draftId, settings } = input;
    const of = { workspaceId: member.workspace.id, draftId };
    const draft = await getMappingDraft(database(), of);
    if (!draft) return err(notFound('bench'));
    const { ask, ...plain } = settings;
    const problem = checkProblem({
      kernel: draft.kernel.document,
      fabric: draft.fabric.document,
      pins: ask?.kind === 'pin price' ? { ...input.pins, [ask.op]: ask.tile } : input.pins,
      objective: settings.objective,
      weights: settings.weights,
      ...(input.startPlacement ? { start: input.startPlacement } : {}),
      ...(ask?.kind === 'another' ? { another: { objectiveValue: ask.objectiveValue, than: ask.than } } : {}),
    });
    if (!problem.ok) return err(appError('invalid', problem.error.messages.join(' ')));
    const made = await database().transaction(async (tx) => {
      const solves = ask ? await listSolves(tx, { ...of, limit: SOLVES_KNOWN }) : [];
      const asked = ask && askedSolve(draft, solves, { ...input, ask, ...plain });
      const solve = await createSolve(tx, {
        ...of,
        userId: member.user.id,
        settings: asked ? { ...plain, ask: asked.ask } : plain,
        pins: asked?.pins ?? input.pins,
        startPlacement: asked ? asked.startPlacement : input.startPlacement,
      });
      if (solve.ok && solve.value.created) {
        await audit(tx, member, {
          action: 'solve started',
          subjectType: 'solve',
          subjectId: solve.value.id,
          detail: { bench: draft.name, timeLimitMs: settings.timeLimitMs, ...(ask && { asks: ask.kind }) },
        });
      }
      return solve;
    });
    if (!made.ok)
      return err(appError('conflict', 'A solve of this bench ended at this very moment. Press again.'));
    const { id, created, asks } = made.value;
    if (created) {
      const bossJobId = await enqueueSolve({ id, timeLimitMs: settings.timeLimitMs });
      if (bossJobId) await noteQueued(database(), { workspaceId: of.workspaceId, solveId: id, bossJobId });
    }
    return ok({ solveId: id, created, asks });
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
