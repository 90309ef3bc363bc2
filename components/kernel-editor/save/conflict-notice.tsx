'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { KERNEL_LIMITS, type Kernel } from '@/lib/graph';
import { type EditorCalls, type KernelPlaces, kernelPath } from '../server-calls';
import { useEditor } from '../store/editor-context';
import { replaceKernelEdit } from '../store/replace-kernel';
import { ClockTime } from './save-status';
import type { Autosave } from './use-autosave';

const MINE = ' (my state)';

export const myCopyOf = (kernel: Kernel): Kernel => ({
  ...kernel,
  name: `${kernel.name.slice(0, KERNEL_LIMITS.nameLength - MINE.length)}${MINE}`,
});

interface SavingNoticesProps {
  places: KernelPlaces;
  autosave: Autosave;
  create: EditorCalls['create'];
}

/** What to do about two states of one draft: both are kept until the person has chosen. */
export function SavingNotices({ places, autosave, create }: SavingNoticesProps) {
  const { store } = useEditor();
  const { state, runner, recovered, dismissRecovered } = autosave;
  /** My state after theirs was loaded: still on offer. */
  const [setAside, setSetAside] = useState<Kernel | null>(null);
  const keep = useKeepCopy(places, create);
  const { theirs } = state;
  if (state.phase === 'conflict' && theirs !== null) {
    const loadTheirs = () => {
      const mine = store.getState().kernel;
      store.getState().edit(replaceKernelEdit(mine, theirs.kernel), 'load the other state');
      runner?.dispatch({ type: 'tookTheirs', kernel: store.getState().kernel, revision: theirs.revision });
      setSetAside(mine);
    };
    return (
      <NoticeBar tone="warning" text={conflictText(theirs.changedBy, theirs.kernel)}>
        <Button
          busy={keep.busy}
          onClick={() =>
            keep.run(store.getState().kernel, () =>
              runner?.dispatch({
                type: 'tookTheirs',
                kernel: store.getState().kernel,
                revision: theirs.revision,
              }),
            )
          }
        >
          Keep mine as a new kernel
        </Button>
        <Button onClick={loadTheirs}>Load theirs</Button>
        <KeepError error={keep.error} />
      </NoticeBar>
    );
  }
  if (setAside !== null) {
    return (
      <NoticeBar
        tone="plain"
        text={`You see the other state now. Yours (${setAside.ops.length} ops) can still become a kernel of its own, and Undo brings it back.`}
      >
        <Button busy={keep.busy} onClick={() => keep.run(setAside, () => setSetAside(null))}>
          Keep mine as a new kernel
        </Button>
        <Button look="quiet" onClick={() => setSetAside(null)}>
          Dismiss
        </Button>
        <KeepError error={keep.error} />
      </NoticeBar>
    );
  }
  if (recovered === null) return null;
  return (
    <NoticeBar
      tone="plain"
      text={
        <>
          {recovered.applied
            ? 'Edits that had not reached the server are back, from '
            : 'This browser holds edits that never reached the server, and the draft has changed since. They are from '}
          <ClockTime atMs={recovered.atMs} />
          {recovered.applied ? '. Undo takes them away.' : '.'}
        </>
      }
    >
      {recovered.applied ? null : (
        <Button busy={keep.busy} onClick={() => keep.run(recovered.kernel, dismissRecovered)}>
          Keep them as a new kernel
        </Button>
      )}
      <Button look="quiet" onClick={dismissRecovered}>
        {recovered.applied ? 'Dismiss' : 'Discard them'}
      </Button>
      <KeepError error={keep.error} />
    </NoticeBar>
  );
}

const conflictText = (changedBy: string, { ops, edges }: Kernel): string =>
  `${changedBy} saved another state of this kernel (${ops.length} ops, ${edges.length} connections) while you were drawing. Yours is kept in this browser until you choose.`;

/** Makes a kernel of its own of a state, then opens it. */
function useKeepCopy(places: KernelPlaces, create: EditorCalls['create']) {
  const router = useRouter();
  const [busy, setBusy] = useState(false);
  const [error, setError] = useState<string | null>(null);
  const run = async (kernel: Kernel, onKept: () => void) => {
    setBusy(true);
    setError(null);
    try {
      const made = await create({ workspace: places.workspace, document: myCopyOf(kernel) });
      if (made.ok) {
        onKept();
        router.push(kernelPath({ workspace: places.workspace, kernelId: made.value.id }));
      } else setError(made.error.message);
    } catch {
      setError('The server did not answer. Nothing was lost; try again.');
    }
    setBusy(false);
  };
  return { busy, error, run };
}

function KeepError({ error }: { error: string | null }) {
  return error === null ? null : (
    <span role="alert" className="font-semibold">
      {error}
    </span>
  );
}

function NoticeBar(props: { tone: 'warning' | 'plain'; text: React.ReactNode; children: React.ReactNode }) {
  return (
    <Notice tone={props.tone} live className="m-2 flex flex-none flex-wrap items-center gap-x-3 gap-y-2">
      <span className="min-w-60 flex-1">{props.text}</span>
      {props.children}
    </Notice>
  );
}
