'use client';

import { PasswordField } from '@/components/ui/field';

/** A password being chosen. The server has the rule; this names its one demand. */
export function NewPasswordField({ label = 'Password', error }: { label?: string; error?: string | null }) {
  return (
    <PasswordField
      label={label}
      name="password"
      autoComplete="new-password"
      required
      hint="At least 15 characters. Several words are easier to remember than symbols; a password manager may fill it in."
      error={error}
    />
  );
}
