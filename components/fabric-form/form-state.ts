'use client';

import { type FormEvent, useRef, useState } from 'react';
import type { Result } from '@/lib/result';
import {
  clockOf,
  errorsByField,
  type FabricFormErrors,
  type FabricFormField,
  type FabricFormInput,
  type FabricFormValues,
  fabricFormFields,
  fabricFormInput,
  parseFabricForm,
} from './form-values';

export interface FormRefusal {
  message: string;
  fields?: Record<string, string>;
}
export type CreateFabric = (input: FabricFormInput) => Promise<Result<{ fabricId: string }, FormRefusal>>;

const first = (errors: FabricFormErrors): FabricFormField | undefined =>
  fabricFormFields.find((field) => errors[field] !== undefined);

/**
 * The form's values and errors. A field complains once it has been left or the form was sent; what the server
 * refused stays beside its field until that field is changed. Values are never cleared.
 */
export function useFabricForm(
  initial: FabricFormValues,
  create: CreateFabric,
  onCreated: (id: string) => void,
) {
  const [values, setValues] = useState(initial);
  const [left, setLeft] = useState<ReadonlySet<FabricFormField>>(new Set());
  const [refused, setRefused] = useState<FabricFormErrors>({});
  const [failure, setFailure] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const form = useRef<HTMLFormElement>(null);

  const parsed = parseFabricForm(values);
  const found = parsed.ok ? {} : parsed.errors;
  const errorOf = (field: FabricFormField) =>
    refused[field] ?? (left.has(field) ? (found[field] ?? null) : null);

  const set = <F extends FabricFormField>(field: F, value: FabricFormValues[F]) => {
    setValues((now) => ({ ...now, [field]: value }));
    setRefused(({ [field]: _, ...rest }) => rest);
  };
  const leave = (field: FabricFormField) => setLeft((now) => new Set(now).add(field));
  const focusOn = (field: FabricFormField | undefined) =>
    form.current?.querySelector<HTMLElement>(`[name="${field}"]`)?.focus();

  const submit = async (event: FormEvent) => {
    event.preventDefault();
    setLeft(new Set(fabricFormFields));
    setFailure(null);
    if (!parsed.ok) {
      focusOn(first(parsed.errors));
      return;
    }
    setBusy(true);
    const answer = await create(fabricFormInput(values)).catch(() => null);
    if (answer?.ok) {
      onCreated(answer.value.fabricId);
      return;
    }
    setBusy(false);
    setFailure(
      answer?.error.message ?? 'The server could not be reached. What you entered is still here; try again.',
    );
    const errors = errorsByField(answer?.error.fields ?? {});
    setRefused(errors);
    focusOn(first(errors));
  };
  // The clock's own fields decide about it, whatever else on the screen is still wrong.
  const clock = values.clocked ? (clockOf(values) ?? undefined) : null;
  return { values, clock, errorOf, set, leave, submit, busy, failure, form };
}
export type FabricFormState = ReturnType<typeof useFabricForm>;
