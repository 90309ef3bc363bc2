'use client';

import { useState, useTransition } from 'react';
import type { Result } from '@/lib/result';

/** What a server action refuses with, as far as a form shows it. */
export interface Refusal {
  code: string;
  message: string;
  fields?: Record<string, string>;
}

/** Calls a server action from a form or a button: busy while it runs, and the refusal to show when it has ended. */
export function useAction<Input, Value>(action: (input: Input) => Promise<Result<Value, Refusal>>) {
  const [busy, startTransition] = useTransition();
  const [refusal, setRefusal] = useState<Refusal | null>(null);
  const run = (input: Input, onDone: (value: Value) => void) => {
    setRefusal(null);
    startTransition(async () => {
      try {
        const result = await action(input);
        if (result.ok) onDone(result.value);
        else setRefusal(result.error);
      } catch {
        setRefusal({
          code: 'unavailable',
          message: 'The server could not be reached. What you entered is still here; try again.',
        });
      }
    });
  };
  /** The message of a field, or null. */
  const fieldError = (name: string) => refusal?.fields?.[name] ?? null;
  /** The message that belongs to no field that is shown. */
  const formError = refusal && Object.keys(refusal.fields ?? {}).length === 0 ? refusal.message : null;
  return { run, busy, refusal, fieldError, formError };
}
