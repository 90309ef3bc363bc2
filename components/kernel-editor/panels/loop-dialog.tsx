'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { TextField } from '@/components/ui/field';
import { type ConnectionRequest, KERNEL_LIMITS, opName } from '@/lib/graph';
import { useEditor, useKernelState } from '../store/editor-context';
import { indexOf } from '../store/kernel-facts';
import { parseInteger } from './commit-field';
import { firstFocus } from './first-focus';

/** A connection that would close a cycle is offered as one that carries its value to a later iteration. */
export function LoopDialog() {
  const { store } = useEditor();
  const offer = useKernelState((state) => state.loopOffer);
  return (
    <Dialog
      open={offer !== null}
      title="This connection closes a loop"
      onClose={() => store.getState().dismissLoopOffer()}
    >
      {offer === null ? null : <LoopForm offer={offer} />}
    </Dialog>
  );
}

function LoopForm({ offer }: { offer: ConnectionRequest }) {
  const { store } = useEditor();
  const kernel = useKernelState((state) => state.kernel);
  const [text, setText] = useState('1');
  const [error, setError] = useState<string | null>(null);
  const name = (id: ConnectionRequest['from']) => {
    const op = indexOf(kernel).opById.get(id);
    return op === undefined ? id : opName(op);
  };
  return (
    <form
      className="flex flex-col gap-3"
      onSubmit={(event) => {
        event.preventDefault();
        const distance = parseInteger(text);
        if (distance === null || distance < 1 || distance > KERNEL_LIMITS.distance) {
          setError(`Give an integer from 1 to ${KERNEL_LIMITS.distance}.`);
        } else store.getState().connectLater(offer, distance);
      }}
    >
      <p className="text-sm">
        {offer.from === offer.to
          ? `${name(offer.from)} would wait for its own result. `
          : `${name(offer.to)} already leads to ${name(offer.from)}, so both would wait for each other. `}
        It works when the value is carried to a later iteration; until the first one arrives, 0 is read, or
        the initial values that you give in the inspector.
      </p>
      <TextField
        label="Distance, in iterations"
        inputMode="numeric"
        value={text}
        error={error}
        ref={firstFocus}
        onChange={(event) => setText(event.target.value)}
      />
      <div className="flex justify-end gap-2">
        <Button look="quiet" onClick={() => store.getState().dismissLoopOffer()}>
          Do not connect
        </Button>
        <Button look="primary" type="submit">
          Connect
        </Button>
      </div>
    </form>
  );
}
