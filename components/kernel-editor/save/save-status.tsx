'use client';

import type { SaveState } from './autosave';

const timeFormat = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit' });

/** A moment as the clock of the reader shows it. The server's may differ, so the text may change when the page wakes. */
export function ClockTime({ atMs }: { atMs: number }) {
  const at = new Date(atMs);
  return (
    <time dateTime={at.toISOString()} suppressHydrationWarning>
      {timeFormat.format(at)}
    </time>
  );
}

/** The truth about saving, in a few words. */
export function SaveStatus({ state, onRetry }: { state: SaveState; onRetry: () => void }) {
  return (
    <span className="flex flex-wrap items-center gap-x-2" role="status">
      <SaveWords state={state} />
      {state.phase === 'retrying' || state.phase === 'refused' ? (
        <button type="button" className="min-h-6 font-semibold text-indigo underline" onClick={onRetry}>
          Try now
        </button>
      ) : null}
    </span>
  );
}

function SaveWords({ state }: { state: SaveState }) {
  switch (state.phase) {
    case 'clean':
      return (
        <span>
          draft · saved{state.savedAtMs === null ? '' : ' '}
          {state.savedAtMs === null ? null : <ClockTime atMs={state.savedAtMs} />}
        </span>
      );
    case 'waiting':
      return <span>draft · not saved yet</span>;
    case 'saving':
      return <span>draft · saving…</span>;
    case 'retrying':
      return <span className="text-madder">not saved: {state.reason}, trying again</span>;
    case 'refused':
      return <span className="text-madder">not saved: {state.reason}</span>;
    case 'conflict':
      return <span className="text-madder">not saved: another state was saved meanwhile</span>;
  }
}
