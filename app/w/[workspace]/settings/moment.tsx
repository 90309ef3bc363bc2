'use client';

import { useSyncExternalStore } from 'react';

const never = () => () => {};
const inWords = (iso: string, timeZone?: string) =>
  new Date(iso).toLocaleString('en-GB', { dateStyle: 'medium', timeStyle: 'short', timeZone });

/** A moment in words: in UTC as the server sends it, and in the reader's own time zone once the page is ready. */
export function Moment({ iso }: { iso: string }) {
  const text = useSyncExternalStore(
    never,
    () => inWords(iso),
    () => inWords(iso, 'UTC'),
  );
  return <time dateTime={iso}>{text}</time>;
}
