'use client';

import { type ComponentProps, type ReactNode, useId, useState } from 'react';

const control =
  'w-full min-h-8 rounded border border-edge! bg-surface px-2 py-1 text-sm text-ink placeholder:text-quiet aria-invalid:border-madder!';

interface FieldFrameProps {
  label: string;
  hint?: ReactNode;
  error?: string | null;
  className?: string;
  /** Keeps the label for screen readers only, where the place makes it plain. */
  labelHidden?: boolean;
}

function Frame({
  id,
  label,
  hint,
  error,
  className,
  labelHidden,
  children,
}: FieldFrameProps & { id: string; children: ReactNode }) {
  return (
    <div className={className}>
      <label htmlFor={id} className={labelHidden ? 'sr-only' : 'mb-1 block text-sm font-semibold'}>
        {label}
      </label>
      {children}
      {hint ? (
        <p id={`${id}-hint`} className="mt-1 text-sm text-quiet">
          {hint}
        </p>
      ) : null}
      {error ? (
        <p id={`${id}-error`} className="mt-1 text-sm text-madder" role="alert">
          {error}
        </p>
      ) : null}
    </div>
  );
}

const describedBy = (id: string, hint: unknown, error: unknown) =>
  [hint ? `${id}-hint` : '', error ? `${id}-error` : ''].filter(Boolean).join(' ') || undefined;

function useFrame(props: FieldFrameProps) {
  const id = useId();
  const aria = {
    id,
    'aria-invalid': props.error ? true : undefined,
    'aria-describedby': describedBy(id, props.hint, props.error),
  };
  return { id, aria };
}

export function TextField({
  label,
  hint,
  error,
  className,
  labelHidden,
  ...input
}: FieldFrameProps & ComponentProps<'input'>) {
  const { id, aria } = useFrame({ label, hint, error });
  return (
    <Frame {...{ id, label, hint, error, className, labelHidden }}>
      <input className={control} {...input} {...aria} />
    </Frame>
  );
}

/** A password that may be pasted, kept by a manager and shown. */
export function PasswordField({
  label,
  hint,
  error,
  className,
  ...input
}: FieldFrameProps & ComponentProps<'input'>) {
  const { id, aria } = useFrame({ label, hint, error });
  const [shown, setShown] = useState(false);
  return (
    <Frame {...{ id, label, hint, error, className }}>
      <div className="flex gap-1">
        <input className={control} {...input} {...aria} type={shown ? 'text' : 'password'} />
        <button
          type="button"
          className="min-w-14 rounded border border-edge! px-2 text-sm"
          aria-pressed={shown}
          aria-label={shown ? `Hide ${label.toLowerCase()}` : `Show ${label.toLowerCase()}`}
          onClick={() => setShown(!shown)}
        >
          {shown ? 'Hide' : 'Show'}
        </button>
      </div>
    </Frame>
  );
}

export function TextAreaField({
  label,
  hint,
  error,
  className,
  labelHidden,
  ...input
}: FieldFrameProps & ComponentProps<'textarea'>) {
  const { id, aria } = useFrame({ label, hint, error });
  return (
    <Frame {...{ id, label, hint, error, className, labelHidden }}>
      <textarea className={control} {...input} {...aria} />
    </Frame>
  );
}

export interface Choice {
  value: string;
  label: string;
}

export function SelectField({
  label,
  hint,
  error,
  className,
  labelHidden,
  choices,
  ...input
}: FieldFrameProps & ComponentProps<'select'> & { choices: readonly Choice[] }) {
  const { id, aria } = useFrame({ label, hint, error });
  return (
    <Frame {...{ id, label, hint, error, className, labelHidden }}>
      <select className={control} {...input} {...aria}>
        {choices.map((choice) => (
          <option key={choice.value} value={choice.value}>
            {choice.label}
          </option>
        ))}
      </select>
    </Frame>
  );
}

export function CheckboxField({
  label,
  hint,
  className,
  ...input
}: Omit<FieldFrameProps, 'error'> & ComponentProps<'input'>) {
  const { id, aria } = useFrame({ label, hint });
  return (
    <div className={`flex items-start gap-2 ${className ?? ''}`}>
      <input type="checkbox" className="mt-0.5 size-4.5 accent-(--indigo)" {...input} {...aria} />
      <div>
        <label htmlFor={id} className="text-sm">
          {label}
        </label>
        {hint ? (
          <p id={`${id}-hint`} className="text-sm text-quiet">
            {hint}
          </p>
        ) : null}
      </div>
    </div>
  );
}
