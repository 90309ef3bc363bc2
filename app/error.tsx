'use client';

import { Brand } from '@/components/shell/brand';
import { Button } from '@/components/ui/button';

interface ErrorPageProps {
  error: Error & { digest?: string };
  reset: () => void;
}

/** What a page shows when it could not be made; the digest finds the cause in the log. */
export default function ErrorPage({ error, reset }: ErrorPageProps) {
  return (
    <div className="mx-auto flex min-h-[70dvh] max-w-md flex-col items-start justify-center gap-4 px-6">
      <Brand />
      <h1 className="text-2xl font-semibold">This page could not be shown</h1>
      <p className="text-quiet">
        The fault is on our side and what you saved is safe. Try again in a moment
        {error.digest ? `; if it stays, tell whoever runs this server the number ${error.digest}` : ''}.
      </p>
      <Button look="primary" onClick={reset}>
        Try again
      </Button>
    </div>
  );
}
