/** What actions and routes have in common: who is calling, and what becomes of an exception. */
import 'server-only';
import { unstable_rethrow } from 'next/navigation';
import type { z } from 'zod';
import { err, ok } from '@/lib/result';
import type { Role } from '@/lib/roles';
import { checkMember, type Member } from './access';
import { type AppError, type AppResult, appError, refusalOf } from './errors';
import { logIncident } from './log';
import { currentSession, type SignedIn } from './session';

/** `public`: anybody. `signed in`: any account. `{ role }`: a member of the workspace that the input names. */
export type Access = 'public' | 'signed in' | { role: Role };

export type Caller<A extends Access> = A extends { role: Role }
  ? Member
  : A extends 'signed in'
    ? { user: SignedIn['user']; session: SignedIn['session'] }
    : { user: SignedIn['user'] | null };

/** The caller, when `access` lets it in. `workspaceSlug` is read for `{ role }` only. */
export async function admit<A extends Access>(
  access: A,
  workspaceSlug: string,
): Promise<AppResult<Caller<A>>> {
  // The compiler cannot tie a narrowed value to its type parameter: each branch builds what Caller says for it.
  if (typeof access === 'object')
    return (await checkMember(workspaceSlug, access.role)) as AppResult<Caller<A>>;
  const signedIn = await currentSession();
  if (access === 'public') return ok({ user: signedIn?.user ?? null } as Caller<A>);
  if (!signedIn)
    return err(appError('not_signed_in', 'You are signed out. Sign in again, then repeat this.'));
  return ok(signedIn as Caller<A>);
}

export function invalidInput(error: z.ZodError): AppError {
  const fields: Record<string, string> = {};
  for (const issue of error.issues.slice(0, 20)) fields[issue.path.join('.')] ??= issue.message;
  const first = error.issues[0];
  const where = first?.path.length ? ` (${first.path.join('.')})` : '';
  return appError('invalid', `${first?.message ?? 'The input was refused'}${where}.`.replace(/\.\.$/, '.'), {
    fields,
  });
}

/** Turns an exception into an error for the caller; Next's own (redirect, not found) pass through. */
export async function asAppError(thrown: unknown, where: string): Promise<AppError> {
  unstable_rethrow(thrown);
  const refused = refusalOf(thrown);
  if (refused) return refused;
  const incidentId = await logIncident(thrown, where);
  return appError(
    'internal',
    `Something went wrong on our side; nothing was changed. Try again, and if it stays, quote incident ${incidentId}.`,
    { incidentId },
  );
}
