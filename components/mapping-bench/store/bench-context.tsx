'use client';

import { createContext, type ReactNode, useContext } from 'react';
import { useStore } from 'zustand';
import type { BenchState, BenchStore } from './bench-store';

const BenchContext = createContext<BenchStore | null>(null);

export function BenchProvider({ store, children }: { store: BenchStore; children: ReactNode }) {
  return <BenchContext value={store}>{children}</BenchContext>;
}

export function useBenchStore(): BenchStore {
  const store = useContext(BenchContext);
  if (store === null) throw new Error('useBenchStore is called outside of a BenchProvider');
  return store;
}

/** A part of the state. The selector returns a primitive or something that keeps its identity. */
export function useBench<T>(selector: (state: BenchState) => T): T {
  return useStore(useBenchStore(), selector);
}
