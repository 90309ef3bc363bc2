import { redirect } from 'next/navigation';
import { database } from '@/db/client';
import { listMemberships } from '@/db/queries/members';
import { currentSession } from './_server/session';

/** The door: to the workspace opened last, to a first workspace, or to the sign-in page. */
export default async function Home() {
  const signedIn = await currentSession();
  if (!signedIn) redirect('/sign-in');
  const [last] = await listMemberships(database(), { userId: signedIn.user.id });
  redirect(last ? `/w/${last.workspace.slug}` : '/welcome');
}
