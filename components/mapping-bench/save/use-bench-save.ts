'use client';

import { useCallback, useEffect, useRef, useState } from 'react';
import type { BenchContent } from '../store/bench-content';
import type { BenchStore } from '../store/bench-store';
import {
  type Backup,
  backupText,
  createSaver,
  parseBackup,
  type SaveAnswer,
  type Saver,
  type SaveState,
  sameContent,
} from './save-machine';

interface BenchSaveParts {
  draftId: string;
  revision: number;
  readOnly: boolean;
  send: (content: BenchContent, revision: number) => Promise<SaveAnswer>;
}

export interface BenchSave {
  state: SaveState;
  retry: () => void;
  takeTheirs: () => void;
  flush: () => Promise<boolean>;
  /** The revision after the last save. */
  revision: () => number;
  /** Unsaved changes of an earlier visit in this browser, until they are restored or let go. */
  found: Backup | null;
  restoreFound: () => void;
  dropFound: () => void;
}

const backupKey = (draftId: string) => `pinloom.bench.${draftId}`;

/** Saves the bench's store by itself, keeps a copy in the browser until it is saved, and offers one that was left. */
export function useBenchSave(store: BenchStore, parts: BenchSaveParts): BenchSave {
  const { draftId, readOnly } = parts;
  const key = backupKey(draftId);
  const send = useRef(parts.send);
  send.current = parts.send;
  const saver = useRef<Saver | null>(null);
  const [state, setState] = useState<SaveState>({
    phase: 'clean',
    revision: parts.revision,
    savedAtMs: null,
    reason: null,
    theirs: null,
  });
  const [found, setFound] = useState<Backup | null>(null);
  const firstRevision = useRef(parts.revision);

  useEffect(() => {
    if (readOnly) return;
    const left = parseBackup(shelf(() => localStorage.getItem(key)));
    if (left && !sameContent(left.content, store.getState().content)) setFound(left);
    const created = createSaver({
      content: store.getState().content,
      revision: saver.current?.state().revision ?? firstRevision.current,
      send: (content, revision) => send.current(content, revision),
      after: (delayMs, run) => {
        const timer = setTimeout(run, delayMs);
        return () => clearTimeout(timer);
      },
      onChange: setState,
      backUp: (unsaved) => {
        shelf(() =>
          unsaved === null
            ? localStorage.removeItem(key)
            : localStorage.setItem(key, backupText({ ...unsaved, atMs: Date.now() })),
        );
      },
    });
    saver.current = created;
    const unsubscribe = store.subscribe((now, before) => {
      if (now.content !== before.content) created.edited(now.content);
    });
    const warn = (event: BeforeUnloadEvent) => {
      if (created.state().phase !== 'clean') event.preventDefault();
    };
    const online = () => created.retry();
    window.addEventListener('beforeunload', warn);
    window.addEventListener('online', online);
    return () => {
      unsubscribe();
      window.removeEventListener('beforeunload', warn);
      window.removeEventListener('online', online);
      created.stop();
    };
  }, [store, key, readOnly]);

  const takeTheirs = useCallback(() => {
    const theirs = saver.current?.state().theirs;
    if (!theirs) return;
    saver.current?.tookTheirs();
    store
      .getState()
      .replace(theirs.content, `The state of ${theirs.changedBy} is on the bench. Undo brings yours back.`);
  }, [store]);
  const dropFound = useCallback(() => {
    setFound(null);
    if (saver.current?.state().phase === 'clean') shelf(() => localStorage.removeItem(key));
  }, [key]);
  const restoreFound = useCallback(() => {
    if (found) store.getState().replace(found.content, 'The unsaved changes are back on the bench.');
    setFound(null);
  }, [found, store]);
  return {
    state,
    retry: () => saver.current?.retry(),
    takeTheirs,
    flush: () => saver.current?.flush() ?? Promise.resolve(true),
    revision: () => saver.current?.state().revision ?? firstRevision.current,
    found,
    restoreFound,
    dropFound,
  };
}

/** Runs with the browser's shelf; null where it is full or switched off. */
function shelf<T>(use: () => T): T | null {
  try {
    return use();
  } catch {
    return null;
  }
}
