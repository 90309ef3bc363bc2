/** Removes what has ended. Nothing depends on it being prompt: ended sessions, links and windows count for nothing. */
import type { Database } from './client';
import { removeEndedResets } from './queries/accounts';
import { removeEndedInvitations } from './queries/invitations';
import { removeEndedWindows } from './queries/rate-limits';
import { removeExpiredSessions } from './queries/sessions';
import { removeEndedSignUps } from './queries/sign-ups';

/** For the worker, once an hour or so. */
export async function tidy(db: Database, now: Date): Promise<void> {
  await removeExpiredSessions(db, now);
  await removeEndedWindows(db, now);
  await removeEndedResets(db, now);
  await removeEndedSignUps(db, now);
  await removeEndedInvitations(db, now);
}
