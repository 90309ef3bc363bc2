'use client';

import { useCallback, useEffect, useRef, useState } from 'react';
import type { Kernel } from '@/lib/graph';
import { useEditor } from '../store/editor-context';
import { replaceKernelEdit } from '../store/replace-kernel';
import { hasUnsavedEdits, initialSave, type SaveAnswer, type SaveState } from './autosave';
import { backupKey, backupOf, findBackups, removeBackup, writeBackup } from './backup';
import { holdBackupKey, openBackupKeys } from './backup-locks';
import { noteSaved } from './newest-draft';
import { runAutosave, type SaveRunner } from './run-autosave';
import { sameKernel } from './same-kernel';

const BACKUP_DELAY_MS = 250;

export interface AutosaveParts {
  kernelId: string;
  revision: number;
  savedAtMs: number;
  readOnly: boolean;
  send(kernel: Kernel, baseRevision: number): Promise<SaveAnswer>;
}

/** Edits of an earlier visit that never reached the server. */
export interface Recovered {
  kernel: Kernel;
  atMs: number;
  /** They stand on the state that is loaded, so they are already part of the draft again. */
  applied: boolean;
}

export interface Autosave {
  state: SaveState;
  runner: SaveRunner | null;
  recovered: Recovered | null;
  dismissRecovered(): void;
}

/** Saves every change of the store's kernel, and keeps a copy in the browser of what is not saved yet. */
export function useAutosave(parts: AutosaveParts): Autosave {
  const { store } = useEditor();
  const { kernelId, readOnly } = parts;
  // Where saving began. A page that is drawn again later must not start it anew: edits may be on their way.
  const [{ revision, savedAtMs }] = useState(() => parts);
  const send = useRef(parts.send);
  send.current = parts.send;
  const [state, setState] = useState<SaveState>(() => ({
    ...initialSave(store.getState().kernel, revision),
    savedAtMs,
  }));
  const [runner, setRunner] = useState<SaveRunner | null>(null);
  const recoveredKey = useRef<string | null>(null);
  const [recovered, setRecovered] = useState<Recovered | null>(null);

  useEffect(() => {
    if (readOnly) return;
    const key = backupKey(kernelId, crypto.randomUUID());
    const letGo = holdBackupKey(key);
    let backupTimer: ReturnType<typeof setTimeout> | undefined;
    const current = runAutosave({
      initial: { ...initialSave(store.getState().kernel, revision), savedAtMs },
      async send(kernel, baseRevision) {
        const answer = await send.current(kernel, baseRevision);
        // Noted even when the editor has been left since.
        if (answer.type === 'saved') {
          noteSaved(kernelId, { kernel, revision: answer.revision, savedAtMs: answer.atMs });
        }
        return answer;
      },
      after: (delayMs, run) => {
        const timer = setTimeout(run, delayMs);
        return () => clearTimeout(timer);
      },
      onChange: (next) => {
        setState(next);
        if (!hasUnsavedEdits(next)) removeBackup(localStorage, key);
      },
    });
    setRunner(current);
    const backUp = () => {
      clearTimeout(backupTimer);
      const now = current.state();
      if (hasUnsavedEdits(now))
        writeBackup(localStorage, key, backupOf(now.latest, now.revision, Date.now()));
    };
    const unsubscribe = store.subscribe((next, before) => {
      if (next.kernel === before.kernel) return;
      current.dispatch({ type: 'edited', kernel: next.kernel });
      clearTimeout(backupTimer);
      backupTimer = setTimeout(backUp, BACKUP_DELAY_MS);
    });
    const leave = (event: BeforeUnloadEvent) => {
      backUp();
      if (hasUnsavedEdits(current.state())) event.preventDefault();
    };
    const retry = () => current.dispatch({ type: 'retry' });
    window.addEventListener('beforeunload', leave);
    window.addEventListener('pagehide', backUp);
    window.addEventListener('online', retry);

    let mounted = true;
    void openBackupKeys().then((openKeys) => {
      const [found] = mounted ? findBackups(localStorage, kernelId, openKeys) : [];
      if (found === undefined) return;
      const loaded = store.getState().kernel;
      if (sameKernel(found.kernel, loaded)) {
        removeBackup(localStorage, found.key);
        return;
      }
      const standsOnLoaded = found.baseRevision === current.state().revision;
      // It may have been sent without the answer being heard; finding it at the server is then no conflict.
      if (standsOnLoaded) current.dispatch({ type: 'recovered', kernel: found.kernel });
      const applied =
        standsOnLoaded &&
        store.getState().edit(replaceKernelEdit(loaded, found.kernel), 'take back unsaved edits');
      setRecovered({ kernel: found.kernel, atMs: found.atMs, applied });
      // From here on this visit's own backup, or the choice on the screen, holds them.
      if (applied) {
        backUp();
        removeBackup(localStorage, found.key);
      } else recoveredKey.current = found.key;
    });

    return () => {
      mounted = false;
      unsubscribe();
      window.removeEventListener('beforeunload', leave);
      window.removeEventListener('pagehide', backUp);
      window.removeEventListener('online', retry);
      backUp();
      clearTimeout(backupTimer);
      // Leaving within the delay: the last edits go out now; the backup stays until a later visit sees them saved.
      current.dispatch({ type: 'due' });
      current.stop();
      letGo();
    };
  }, [store, kernelId, revision, savedAtMs, readOnly]);

  const dismissRecovered = useCallback(() => {
    if (recoveredKey.current !== null) removeBackup(localStorage, recoveredKey.current);
    recoveredKey.current = null;
    setRecovered(null);
  }, []);
  return { state, runner, recovered, dismissRecovered };
}
