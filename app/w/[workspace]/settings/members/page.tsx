import type { Metadata } from 'next';
import { requireMember } from '@/app/_server/access';
import { database } from '@/db/client';
import { listPendingInvitations } from '@/db/queries/invitations';
import { listMembers } from '@/db/queries/members';
import { roleReaches, roleSummaries, roles } from '@/lib/roles';
import { Section } from '../section';
import { SettingsBar } from '../settings-bar';
import { InvitationList } from './invitation-list';
import { InviteForm } from './invite-form';
import { LeaveButton } from './leave-button';
import { MemberList } from './member-list';

export const metadata: Metadata = { title: 'Members' };

export default async function MembersPage({ params }: { params: Promise<{ workspace: string }> }) {
  const { user, workspace, role } = await requireMember((await params).workspace);
  const manages = roleReaches(role, 'owner');
  const members = await listMembers(database(), { workspaceId: workspace.id });
  const invitations = manages ? await listPendingInvitations(database(), { workspaceId: workspace.id }) : [];
  const now = Date.now();
  return (
    <>
      <SettingsBar
        workspaceSlug={workspace.slug}
        title="Members"
        actions={<LeaveButton workspaceSlug={workspace.slug} workspaceName={workspace.name} />}
      />
      <div className="px-4">
        <Section
          title={`Members of ${workspace.name}`}
          text={manages ? 'A change counts at once.' : 'Only owners change members and roles.'}
        >
          <MemberList
            workspaceSlug={workspace.slug}
            manages={manages}
            members={members.map((member) => ({
              userId: member.userId,
              name: member.name,
              email: member.email,
              role: member.role,
              isYou: member.userId === user.id,
            }))}
          />
        </Section>
        {manages ? (
          <Section
            title="Invite by e-mail"
            text="The link in the letter is good for 7 days and for that address only."
          >
            <InviteForm workspaceSlug={workspace.slug} />
          </Section>
        ) : null}
        {invitations.length > 0 ? (
          <Section title="Invitations not yet accepted">
            <InvitationList
              workspaceSlug={workspace.slug}
              invitations={invitations.map((invitation) => ({
                id: invitation.id,
                email: invitation.email,
                role: invitation.role,
                invitedByName: invitation.invitedByName,
                expiresAt: invitation.expiresAt.toISOString(),
                expired: invitation.expiresAt.getTime() <= now,
              }))}
            />
          </Section>
        ) : null}
        <Section title="What the roles may do">
          <dl className="grid grid-cols-[auto_1fr] gap-x-4 gap-y-1 text-sm">
            {roles.map((name) => (
              <div key={name} className="contents">
                <dt className="font-semibold">{name}</dt>
                <dd>{roleSummaries[name]}</dd>
              </div>
            ))}
          </dl>
          <p className="mt-2 text-sm text-quiet">Each role may also do all that the ones above it may.</p>
        </Section>
      </div>
    </>
  );
}
