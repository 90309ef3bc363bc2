'use client';

import { type FormEvent, useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { TextField } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import { useToast } from '@/components/ui/toast';
import { type Refusal, UNREACHABLE_SERVER } from '../fabric-list/fabric-commands';

type Outcome = { ok: true; said: string } | { ok: false; error: Refusal };

interface AskTextProps {
  label: string;
  hint?: string;
  initial: string;
  maxLength: number;
  required?: boolean;
  confirmLabel: string;
  onConfirm: (text: string) => Promise<Outcome>;
  /** After it was done, before the dialog closes. */
  onDone: () => void;
  onClose: () => void;
}

/** Asks for one line of text; what was typed stays when the server refuses it. */
export function AskTextDialog({ open, title, ...rest }: AskTextProps & { open: boolean; title: string }) {
  return (
    <Dialog open={open} title={title} onClose={rest.onClose}>
      <AskText {...rest} />
    </Dialog>
  );
}

function AskText(props: AskTextProps) {
  const { label, hint, initial, maxLength, required, confirmLabel, onConfirm, onDone, onClose } = props;
  const say = useToast();
  const [text, setText] = useState(initial);
  const [failure, setFailure] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const trimmed = text.trim();
    if (required && trimmed === '') return setFailure('Enter at least one character.');
    if (trimmed.length > maxLength) return setFailure(`Use at most ${maxLength} characters.`);
    setBusy(true);
    const outcome = await onConfirm(trimmed).catch(() => null);
    setBusy(false);
    if (!outcome?.ok) return setFailure(outcome?.error.message ?? UNREACHABLE_SERVER);
    say(outcome.said);
    onDone();
    onClose();
  };
  return (
    <form onSubmit={send} noValidate className="space-y-4">
      <TextField
        label={label}
        hint={hint}
        value={text}
        autoComplete="off"
        onChange={(event) => {
          setText(event.target.value);
          setFailure(null);
        }}
      />
      {failure ? (
        <Notice tone="broken" live>
          {failure}
        </Notice>
      ) : null}
      <div className="flex justify-end gap-2">
        <Button look="quiet" onClick={onClose}>
          Cancel
        </Button>
        <Button type="submit" look="primary" busy={busy}>
          {confirmLabel}
        </Button>
      </div>
    </form>
  );
}
