'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { TextField } from '@/components/ui/field';

interface NameDialogProps {
  open: boolean;
  title: string;
  text: string;
  confirmLabel: string;
  initial: string;
  onClose: () => void;
  /** Null when it was done; else what is wrong. */
  onConfirm: (name: string) => Promise<string | null>;
}

/** Asks for a name and carries out what it is for; an error stays beside the field. */
export function NameDialog(props: NameDialogProps) {
  return (
    <Dialog open={props.open} title={props.title} onClose={props.onClose}>
      <NameForm {...props} />
    </Dialog>
  );
}

function NameForm({ text, confirmLabel, initial, onClose, onConfirm }: NameDialogProps) {
  const [name, setName] = useState(initial);
  const [error, setError] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  return (
    <form
      onSubmit={async (event) => {
        event.preventDefault();
        if (name.trim() === '') {
          setError('Give it a name.');
          return;
        }
        setBusy(true);
        setError(await onConfirm(name.trim()));
        setBusy(false);
      }}
    >
      <p className="mb-3 text-sm text-quiet">{text}</p>
      <TextField
        label="Name"
        value={name}
        maxLength={80}
        error={error}
        onChange={(event) => setName(event.target.value)}
      />
      <div className="mt-4 flex justify-end gap-2">
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
