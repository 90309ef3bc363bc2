import type { Metadata } from 'next';
import { cookies } from 'next/headers';
import Link from 'next/link';
import { requireMember } from '@/app/_server/access';
import { currentSession } from '@/app/_server/session';
import { SignOutButton } from '@/app/(auth)/sign-out-button';
import { parseTheme, THEME_COOKIE } from '@/components/shell/theme';
import { database } from '@/db/client';
import { listMemberships } from '@/db/queries/members';
import { listSessions } from '@/db/queries/sessions';
import { Section } from '../section';
import { SettingsBar } from '../settings-bar';
import { browserName } from './browser-name';
import { NameForm } from './name-form';
import { PasswordForm } from './password-form';
import { SessionList } from './session-list';
import { ThemeForm } from './theme-form';

export const metadata: Metadata = { title: 'Account' };

export default async function AccountPage({ params }: { params: Promise<{ workspace: string }> }) {
  const { user, workspace } = await requireMember((await params).workspace);
  const here = await currentSession();
  const sessions = await listSessions(database(), { userId: user.id, now: new Date() });
  const memberships = await listMemberships(database(), { userId: user.id });
  const theme = parseTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <>
      <SettingsBar workspaceSlug={workspace.slug} title="Account" actions={<SignOutButton />} />
      <div className="px-4">
        <Section title="You" text={`Signed in as ${user.email}.`}>
          <NameForm name={user.name} />
        </Section>
        <Section title="Look" text="For this browser.">
          <ThemeForm theme={theme} />
        </Section>
        <Section title="Password" text="We send you a letter when it was changed.">
          <PasswordForm email={user.email} />
        </Section>
        <Section
          title="Sessions"
          text="Where you are signed in. A session ends after 7 days without use, and at the latest after 30 days."
        >
          <SessionList
            sessions={sessions.map((session) => ({
              id: session.id,
              browser: browserName(session.userAgent),
              network: session.addressPrefix,
              since: session.createdAt.toISOString(),
              lastSeen: session.lastSeenAt.toISOString(),
              isThis: session.id === here?.session.id,
            }))}
          />
        </Section>
        <Section title="Your workspaces">
          <ul className="space-y-1 text-sm">
            {memberships.map((membership) => (
              <li key={membership.workspace.id}>
                <Link
                  href={`/w/${membership.workspace.slug}`}
                  className="text-indigo underline"
                  aria-current={membership.workspace.id === workspace.id ? 'true' : undefined}
                >
                  {membership.workspace.name}
                </Link>{' '}
                <span className="text-quiet">
                  as {membership.role}
                  {membership.workspace.id === workspace.id ? ', open here' : ''}
                </span>
              </li>
            ))}
          </ul>
          <p className="mt-3 text-sm">
            <Link href="/welcome" className="text-indigo underline">
              Make a further workspace
            </Link>
          </p>
        </Section>
      </div>
    </>
  );
}
