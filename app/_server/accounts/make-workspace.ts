/** A further workspace for somebody who has an account. */
import { createWorkspace } from '@/db/queries/accounts';
import { recordAudit } from '@/db/queries/audit';
import { ok } from '@/lib/result';
import type { AppResult } from '../errors';
import { takeAttempt } from '../rate-limit';
import type { SignedIn } from '../session-store';
import type { AccountContext } from './context';
import { newWorkspace } from './limits';
import { slugOf } from './slug';

export async function makeWorkspace(
  context: AccountContext,
  who: Pick<SignedIn, 'user'>,
  input: { name: string },
): Promise<AppResult<{ slug: string }>> {
  const taken = await takeAttempt(context.db, newWorkspace, who.user.id);
  if (!taken.ok) return taken;
  return context.db.transaction(async (tx) => {
    const made = await createWorkspace(tx, {
      name: input.name,
      wantedSlug: slugOf(input.name),
      ownerId: who.user.id,
    });
    await recordAudit(tx, {
      workspaceId: made.id,
      actorId: who.user.id,
      action: 'workspace created',
      subjectType: 'workspace',
      subjectId: made.id,
      detail: { name: input.name },
    });
    return ok({ slug: made.slug });
  });
}
