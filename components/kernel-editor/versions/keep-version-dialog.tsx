'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { TextField } from '@/components/ui/field';
import { useToast } from '@/components/ui/toast';
import { firstFocus } from '../panels/first-focus';
import type { SaveState } from '../save/autosave';
import type { EditorCalls, KernelPlaces } from '../server-calls';
import { useEditor, useKernelState } from '../store/editor-context';
import { problemsOf } from '../store/kernel-facts';

interface KeepVersionDialogProps {
  places: KernelPlaces;
  save: SaveState;
  keepVersion: EditorCalls['keepVersion'];
  onKept: () => void;
}

/** Fixes the draft as a numbered version that never changes. */
export function KeepVersionDialog(props: KeepVersionDialogProps) {
  const { store } = useEditor();
  const open = useKernelState((state) => state.dialog === 'keepVersion');
  const close = () => store.getState().openDialog(null);
  return (
    <Dialog open={open} title="Keep version" onClose={close}>
      <KeepVersionForm {...props} onClose={close} />
    </Dialog>
  );
}

function KeepVersionForm(props: KeepVersionDialogProps & { onClose: () => void }) {
  const { places, save, keepVersion, onKept, onClose } = props;
  const errors = useKernelState(
    ({ kernel }) => problemsOf(kernel).filter(({ severity }) => severity === 'error').length,
  );
  const say = useToast();
  const [label, setLabel] = useState('');
  const [busy, setBusy] = useState(false);
  const [error, setError] = useState<string | null>(null);
  const saved = save.phase === 'clean';
  const keep = async () => {
    setBusy(true);
    try {
      const kept = await keepVersion({ ...places, revision: save.revision, label: label.trim() });
      if (kept.ok) {
        const { number, created } = kept.value;
        say(created ? `Kept as version ${number}.` : `Nothing has changed since version ${number}.`);
        onKept();
        onClose();
      } else setError(kept.error.message);
    } catch {
      setError('The server did not answer. Try again.');
    }
    setBusy(false);
  };
  return (
    <form
      className="flex flex-col gap-3"
      onSubmit={(event) => {
        event.preventDefault();
        void keep();
      }}
    >
      <TextField
        label="Name, optional"
        hint="What is special about this state. The version also gets the next number."
        maxLength={80}
        value={label}
        ref={firstFocus}
        error={error}
        onChange={(event) => setLabel(event.target.value)}
      />
      {errors > 0 ? (
        <p className="text-sm">
          The draft has {errors} {errors === 1 ? 'error' : 'errors'}: it can be kept, but not placed.
        </p>
      ) : null}
      {saved ? null : <p className="text-sm">The draft is being saved first.</p>}
      <div className="flex justify-end gap-2">
        <Button look="quiet" onClick={onClose}>
          Cancel
        </Button>
        <Button look="primary" type="submit" busy={busy} disabled={!saved}>
          Keep version
        </Button>
      </div>
    </form>
  );
}
