'use client';

import { useState } from 'react';
import { TextField } from '@/components/ui/field';

interface CommitTextFieldProps {
  label: string;
  value: string;
  maxLength?: number;
  disabled?: boolean;
  className?: string;
  labelHidden?: boolean;
  hint?: string;
  /** Returns what is wrong with the text, or null when it was taken. */
  onCommit: (text: string) => string | null;
  inputMode?: 'text' | 'numeric';
}

/** A field whose text is taken when it is left or Enter is pressed: one step to undo. Escape gives it up. */
export function CommitTextField({ value, onCommit, ...rest }: CommitTextFieldProps) {
  const [draft, setDraft] = useState<{ text: string; error: string | null } | null>(null);
  const commit = () => {
    if (draft === null) return;
    const error = draft.text === value ? null : onCommit(draft.text);
    setDraft(error === null ? null : { text: draft.text, error });
  };
  return (
    <TextField
      {...rest}
      value={draft?.text ?? value}
      error={draft?.error}
      onChange={(event) => setDraft({ text: event.target.value, error: null })}
      onBlur={commit}
      onKeyDown={(event) => {
        if (event.key === 'Enter') commit();
        else if (event.key === 'Escape' && draft !== null) {
          event.stopPropagation();
          setDraft(null);
        }
      }}
    />
  );
}

interface IntegerFieldProps extends Omit<CommitTextFieldProps, 'value' | 'onCommit'> {
  value: number | null;
  min: number;
  max: number;
  /** Whether an empty field is an answer (null). */
  optional?: boolean;
  onCommit: (value: number | null) => void;
}

export function IntegerField({ value, min, max, optional = false, onCommit, ...rest }: IntegerFieldProps) {
  return (
    <CommitTextField
      {...rest}
      inputMode="numeric"
      value={value === null ? '' : String(value)}
      onCommit={(text) => {
        const parsed = parseInteger(text);
        if (parsed === null && optional && text.trim() === '') {
          onCommit(null);
          return null;
        }
        if (parsed === null || parsed < min || parsed > max) {
          return `Give an integer from ${min} to ${max}${optional ? ', or nothing' : ''}.`;
        }
        onCommit(parsed);
        return null;
      }}
    />
  );
}

/** The integer that a text says, with either kind of minus sign; null for anything else. */
export function parseInteger(text: string): number | null {
  const plain = text.trim().replace('−', '-');
  return /^-?\d{1,15}$/.test(plain) ? Number(plain) : null;
}

/** Integers between commas or spaces; null when anything else is there. */
export function parseIntegers(text: string): number[] | null {
  const parts = text.split(/[\s,;]+/).filter(Boolean);
  const values = parts.map(parseInteger);
  return values.includes(null) ? null : (values as number[]);
}
