'use client';

import { Button } from '@/components/ui/button';
import type { BenchSave } from './use-bench-save';

const clock = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit' });

/** How things stand with saving, in quiet words. */
export function SaveStatus({ save, readOnly }: { save: BenchSave; readOnly: boolean }) {
  const { phase, savedAtMs, reason } = save.state;
  if (readOnly) return <span>read only</span>;
  switch (phase) {
    case 'clean':
      return <span>{savedAtMs === null ? 'saved' : `saved ${clock.format(savedAtMs)}`}</span>;
    case 'waiting':
    case 'saving':
      return <span>saving …</span>;
    case 'retrying':
      return (
        <span className="text-madder">
          not saved: {reason} Kept in this browser, tried again.{' '}
          <button type="button" className="min-h-6 underline" onClick={save.retry}>
            Try now
          </button>
        </span>
      );
    case 'refused':
      return (
        <span className="text-madder">
          not saved: {reason}{' '}
          <button type="button" className="min-h-6 underline" onClick={save.retry}>
            Try again
          </button>
        </span>
      );
    case 'conflict':
      return <span className="text-madder">not saved: changed elsewhere</span>;
  }
}

/** What to choose when somebody else saved in between, or when an earlier visit left something unsaved. */
export function SaveBanner({ save, onKeepBoth }: { save: BenchSave; onKeepBoth: () => void }) {
  const { theirs } = save.state;
  if (theirs) {
    return (
      <div
        role="alert"
        className="flex flex-wrap items-center gap-3 border-b border-madder! bg-madder-wash px-4 py-2 text-sm text-madder"
      >
        <p>{theirs.changedBy} saved this bench in the meantime. Both states are still there.</p>
        <Button look="danger" onClick={onKeepBoth}>
          Keep both: mine as a new draft
        </Button>
        <Button look="quiet" onClick={save.takeTheirs}>
          Go on with theirs
        </Button>
      </div>
    );
  }
  if (save.found) {
    return (
      <div
        role="status"
        className="flex flex-wrap items-center gap-3 border-b border-rule bg-indigo-wash px-4 py-2 text-sm"
      >
        <p>Changes of {clock.format(save.found.atMs)} in this browser were never saved.</p>
        <Button look="secondary" onClick={save.restoreFound}>
          Bring them back
        </Button>
        <Button look="quiet" onClick={save.dropFound}>
          Let them go
        </Button>
      </div>
    );
  }
  return null;
}
