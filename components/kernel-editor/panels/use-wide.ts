'use client';

import { useSyncExternalStore } from 'react';

const QUERY = '(min-width: 1024px)';

/** Whether there is room for panels at both sides. Where nobody can say (the server), there is. */
export function useWide(): boolean {
  return useSyncExternalStore(
    subscribe,
    () => media()?.matches ?? true,
    () => true,
  );
}

const media = (): MediaQueryList | null => (typeof matchMedia === 'function' ? matchMedia(QUERY) : null);

function subscribe(onChange: () => void): () => void {
  const list = media();
  list?.addEventListener('change', onChange);
  return () => list?.removeEventListener('change', onChange);
}
