import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { mailSinkOn } from '@/app/_server/settings';
import { Brand } from '@/components/shell/brand';
import { EmptyState } from '@/components/ui/notice';
import { database } from '@/db/client';
import { listLetters } from '@/db/queries/captured-mail';
import { LinkedText } from './linked-text';

export const metadata: Metadata = { title: 'Caught letters', robots: { index: false } };

/** Letters that the local mail server caught. Only there where one is used. */
export default async function MailPage() {
  if (!mailSinkOn()) notFound();
  const letters = await listLetters(database());
  return (
    <main className="mx-auto max-w-3xl px-4 py-8">
      <Brand />
      <h1 className="mt-6 mb-1 text-xl font-semibold">Caught letters</h1>
      <p className="mb-6 text-sm text-quiet">
        On this machine nothing is sent. The newest letter is first; reload the page to look again.
      </p>
      {letters.length === 0 ? (
        <EmptyState title="No letters yet">
          Invite somebody, sign up or ask for a new password, and the letter is here.
        </EmptyState>
      ) : (
        <ol className="space-y-4">
          {letters.map((letter) => (
            <li key={letter.id} className="rounded-md border border-rule bg-surface p-4">
              <article aria-label={letter.subject}>
                <h2 className="font-semibold">{letter.subject}</h2>
                <p className="mb-3 text-sm text-quiet">
                  To {letter.to},{' '}
                  <time dateTime={letter.receivedAt.toISOString()}>
                    {letter.receivedAt.toLocaleString('en-GB')}
                  </time>
                </p>
                <LinkedText text={letter.text} />
              </article>
            </li>
          ))}
        </ol>
      )}
    </main>
  );
}
