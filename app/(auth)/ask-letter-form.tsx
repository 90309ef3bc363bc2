'use client';

import { useState } from 'react';
import { type Refusal, useAction } from '@/app/use-action';
import { Button } from '@/components/ui/button';
import { TextField } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import type { Result } from '@/lib/result';

interface AskLetterFormProps {
  action: (input: { email: string }) => Promise<Result<null, Refusal>>;
  submitLabel: string;
  /** Follows "We have sent a letter to …": what is in it. */
  sentText: string;
}

/** Asks for an address to send a letter to. What is shown afterwards does not depend on who has an account. */
export function AskLetterForm({ action, submitLabel, sentText }: AskLetterFormProps) {
  const { run, busy, fieldError, formError } = useAction(action);
  const [sentTo, setSentTo] = useState<string | null>(null);
  if (sentTo !== null) {
    return (
      <Notice tone="proven" live>
        We have sent a letter to {sentTo}. {sentText} If it does not come within a few minutes, look in the
        spam folder or ask again later.
      </Notice>
    );
  }
  return (
    <form
      method="post"
      className="space-y-4"
      onSubmit={(event) => {
        event.preventDefault();
        const email = String(new FormData(event.currentTarget).get('email'));
        run({ email }, () => setSentTo(email.trim()));
      }}
    >
      {formError ? (
        <Notice tone="broken" live>
          {formError}
        </Notice>
      ) : null}
      <TextField
        label="E-mail address"
        name="email"
        type="email"
        autoComplete="email"
        required
        error={fieldError('email')}
      />
      <div className="flex justify-end">
        <Button type="submit" look="primary" busy={busy}>
          {submitLabel}
        </Button>
      </div>
    </form>
  );
}
