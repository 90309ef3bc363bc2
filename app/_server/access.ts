/** Who may do what in a workspace. Pages ask here; actions and routes ask through defineAction and defineRoute. */
import 'server-only';
import { notFound as notFoundPage, redirect } from 'next/navigation';
import { cache } from 'react';
import { database } from '@/db/client';
import { findMembership, noteOpened, type WorkspaceView } from '@/db/queries/members';
import { err, ok } from '@/lib/result';
import { type Role, roleReaches, roleSummaries } from '@/lib/roles';
import { type AppResult, appError, notFound } from './errors';
import { currentSession, type SignedIn } from './session';

export interface Member {
  user: SignedIn['user'];
  workspace: WorkspaceView;
  role: Role;
}

/** What a slug can look like at all (db/schema/workspaces.ts); anything else is not worth a question. */
const slugPattern = /^[a-z0-9-]{1,60}$/;

/** The signed-in person as a member of the workspace, or null. Asked once per request. */
export const currentMember = cache(async (workspaceSlug: string): Promise<Member | null> => {
  const signedIn = await currentSession();
  if (!signedIn || !slugPattern.test(workspaceSlug)) return null;
  const membership = await findMembership(database(), { slug: workspaceSlug, userId: signedIn.user.id });
  return membership && { user: signedIn.user, ...membership };
});

/** For pages: the member; else the sign-in page, or "not found" for somebody else's workspace or a lesser role. */
export async function requireMember(workspaceSlug: string, needed: Role = 'viewer'): Promise<Member> {
  const member = await currentMember(workspaceSlug);
  if (!member) {
    if (await currentSession()) notFoundPage();
    redirect(`/sign-in?next=${encodeURIComponent(`/w/${workspaceSlug}`)}`);
  }
  if (!roleReaches(member.role, needed)) notFoundPage();
  return member;
}

/** For the workspace's layout: as requireMember, and "/" will lead here next time. */
export async function openWorkspace(workspaceSlug: string): Promise<Member> {
  const member = await requireMember(workspaceSlug);
  await noteOpened(database(), { workspaceId: member.workspace.id, userId: member.user.id, now: new Date() });
  return member;
}

/** For actions and routes: the member, or why not. */
export async function checkMember(workspaceSlug: string, needed: Role): Promise<AppResult<Member>> {
  if (!(await currentSession())) {
    return err(
      appError('not_signed_in', 'You are signed out. Sign in again in another tab, then repeat this.'),
    );
  }
  const member = await currentMember(workspaceSlug);
  if (!member) return err(notFound('workspace'));
  if (!roleReaches(member.role, needed)) {
    return err(
      appError(
        'forbidden',
        `Your role here is ${member.role} (${roleSummaries[member.role]}). This needs the role ${needed}; ask an owner of the workspace.`,
      ),
    );
  }
  return ok(member);
}
