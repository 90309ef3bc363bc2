import type { Metadata } from 'next';
import { Brand } from '@/components/shell/brand';
import { ButtonLink } from '@/components/ui/button';

export const metadata: Metadata = { title: 'Not found' };

export default function NotFound() {
  return (
    <main className="mx-auto flex min-h-dvh max-w-md flex-col items-start justify-center gap-4 px-6">
      <Brand />
      <h1 className="text-2xl font-semibold">There is nothing at this address</h1>
      <p className="text-quiet">
        It may have been removed, or it belongs to a workspace that you are not a member of. Ask whoever sent
        you the link, or go on from your own workspace.
      </p>
      <ButtonLink href="/" look="primary">
        Go to my workspace
      </ButtonLink>
    </main>
  );
}
