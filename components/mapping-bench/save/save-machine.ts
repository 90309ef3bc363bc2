/**
 * Saves a bench by itself: one request at a time, nothing forgotten, nobody's state overwritten, asked again after a
 * failure. Clock, transport and the browser's shelf are handed in.
 */
import { type BenchDocument, benchDocumentSchema } from '@/lib/mapping/bench-document';
import { type Provenance, provenanceSchema } from '@/lib/mapping/mapping';
import type { BenchContent } from '../store/bench-content';

export interface Theirs {
  content: BenchContent;
  revision: number;
  changedBy: string;
}

export type SaveAnswer =
  | { type: 'saved'; revision: number; atMs: number }
  | { type: 'conflict'; theirs: Theirs }
  /** Asking again is of no use before something has changed. */
  | { type: 'refused'; reason: string }
  | { type: 'unreachable' };

export interface SaveState {
  phase: 'clean' | 'waiting' | 'saving' | 'retrying' | 'refused' | 'conflict';
  revision: number;
  /** Null until something has been saved here. */
  savedAtMs: number | null;
  reason: string | null;
  theirs: Theirs | null;
}

export interface SaverParts {
  content: BenchContent;
  revision: number;
  send(content: BenchContent, revision: number): Promise<SaveAnswer>;
  /** Calls back after a delay; returns what cancels it. */
  after(delayMs: number, run: () => void): () => void;
  onChange(state: SaveState): void;
  /** Keeps the newest unsaved content in the browser; null when everything is saved. */
  backUp(unsaved: { content: BenchContent; revision: number } | null): void;
}

export interface Saver {
  state(): SaveState;
  edited(content: BenchContent): void;
  retry(): void;
  /** The bench now shows their state: saving goes on from it. */
  tookTheirs(): void;
  /** Saves at once; resolves when nothing is unsaved any more, or with false when that cannot be. */
  flush(): Promise<boolean>;
  stop(): void;
}

export const SAVE_DELAY_MS = 700;
export const ANSWER_DEADLINE_MS = 20_000;
const RETRY_FIRST_MS = 1000;
const RETRY_LONGEST_MS = 20_000;

export function createSaver(parts: SaverParts): Saver {
  let state: SaveState = {
    phase: 'clean',
    revision: parts.revision,
    savedAtMs: null,
    reason: null,
    theirs: null,
  };
  let latest = parts.content;
  /** Sent without a heard answer: the server may hold them. */
  let unanswered: BenchContent[] = [];
  let failures = 0;
  let cancelWait = () => {};
  let stopped = false;
  let waiters: ((saved: boolean) => void)[] = [];

  function change(next: Partial<SaveState>): void {
    state = { ...state, ...next };
    parts.backUp(state.phase === 'clean' ? null : { content: latest, revision: state.revision });
    parts.onChange(state);
    if (state.phase === 'clean') settle(true);
    else if (state.phase === 'refused' || state.phase === 'conflict' || state.phase === 'retrying')
      settle(false);
  }
  function settle(saved: boolean): void {
    const told = waiters;
    waiters = [];
    for (const tell of told) tell(saved);
  }
  function wait(delayMs: number): void {
    cancelWait();
    cancelWait = parts.after(delayMs, send);
  }
  function send(): void {
    if (stopped) return;
    cancelWait();
    const sent = latest;
    unanswered = [...unanswered, sent];
    change({ phase: 'saving' });
    let heard = false;
    const answer = (got: SaveAnswer) => {
      if (heard || stopped) return;
      heard = true;
      cancelDeadline();
      receive(sent, got);
    };
    const cancelDeadline = parts.after(ANSWER_DEADLINE_MS, () => answer({ type: 'unreachable' }));
    parts.send(sent, state.revision).then(answer, () => answer({ type: 'unreachable' }));
  }
  function settled(sent: BenchContent, revision: number, atMs: number | null): void {
    unanswered = [];
    failures = 0;
    const done = latest === sent;
    change({ phase: done ? 'clean' : 'waiting', revision, savedAtMs: atMs ?? state.savedAtMs, reason: null });
    if (!done) wait(waiters.length > 0 ? 0 : SAVE_DELAY_MS);
  }
  function receive(sent: BenchContent, answer: SaveAnswer): void {
    if (answer.type === 'saved') {
      settled(sent, answer.revision, answer.atMs);
    } else if (answer.type === 'conflict') {
      // A state of our own that was saved though its answer got lost is no conflict.
      const own = unanswered.find((content) => sameContent(content, answer.theirs.content));
      if (own) settled(own, answer.theirs.revision, null);
      else change({ phase: 'conflict', theirs: answer.theirs });
    } else if (answer.type === 'refused') {
      change({ phase: 'refused', reason: answer.reason });
    } else {
      failures += 1;
      change({ phase: 'retrying', reason: 'The server does not answer.' });
      wait(Math.min(RETRY_LONGEST_MS, RETRY_FIRST_MS * 2 ** (failures - 1)));
    }
  }
  return {
    state: () => state,
    edited(content) {
      latest = content;
      if (state.phase === 'clean' || state.phase === 'refused' || state.phase === 'waiting') {
        change({ phase: 'waiting', reason: null });
        wait(SAVE_DELAY_MS);
      } else {
        change({});
      }
    },
    retry() {
      if (state.phase === 'retrying' || state.phase === 'refused') send();
    },
    tookTheirs() {
      const { theirs } = state;
      if (!theirs) return;
      latest = theirs.content;
      unanswered = [];
      change({ phase: 'clean', revision: theirs.revision, theirs: null, reason: null });
    },
    flush() {
      if (state.phase === 'clean') return Promise.resolve(true);
      if (state.phase === 'conflict') return Promise.resolve(false);
      const done = new Promise<boolean>((resolve) => waiters.push(resolve));
      if (state.phase !== 'saving') send();
      return done;
    },
    stop() {
      stopped = true;
      cancelWait();
    },
  };
}

export interface Backup {
  content: BenchContent;
  revision: number;
  atMs: number;
}

/** Reads a backup's text; null where it is none. */
export function parseBackup(text: string | null): Backup | null {
  try {
    const raw = JSON.parse(text ?? 'null') as {
      document?: unknown;
      provenance?: unknown;
      revision?: unknown;
      atMs?: unknown;
    } | null;
    const document = benchDocumentSchema.safeParse(raw?.document);
    const provenance = provenanceSchema.safeParse(raw?.provenance);
    if (!raw || !document.success || !provenance.success) return null;
    if (typeof raw.revision !== 'number' || typeof raw.atMs !== 'number') return null;
    return {
      content: { ...document.data, provenance: provenance.data },
      revision: raw.revision,
      atMs: raw.atMs,
    };
  } catch {
    return null;
  }
}

export const backupText = (backup: Backup): string =>
  JSON.stringify({
    document: documentOf(backup.content),
    provenance: backup.content.provenance,
    revision: backup.revision,
    atMs: backup.atMs,
  });

export const documentOf = ({ placement, pins, routes }: BenchContent): BenchDocument => ({
  placement,
  pins,
  routes,
});

export const contentOf = (document: BenchDocument, provenance: Provenance): BenchContent => ({
  ...document,
  provenance,
});

/** Whether two contents hold the same, whatever the order of keys: a database may change that. */
export const sameContent = (a: BenchContent, b: BenchContent): boolean => a === b || sorted(a) === sorted(b);

function sorted(value: unknown): string {
  return JSON.stringify(value, (_key, part: unknown) => {
    if (typeof part !== 'object' || part === null || Array.isArray(part)) return part;
    return Object.fromEntries(Object.entries(part).sort(([x], [y]) => (x < y ? -1 : 1)));
  });
}
