'use client';

import { useSyncExternalStore } from 'react';

const never = () => () => {};
const format = (timeZone?: string) =>
  new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'short', timeZone });

/** A moment in the reader's own time zone; until the page is alive, in UTC, and said so. */
export function Instant({ at }: { at: string }) {
  const alive = useSyncExternalStore(
    never,
    () => true,
    () => false,
  );
  const text = alive ? format().format(new Date(at)) : `${format('UTC').format(new Date(at))} UTC`;
  return (
    <time dateTime={at} className="whitespace-nowrap">
      {text}
    </time>
  );
}
