'use client';

import { createContext, type ReactNode, type RefObject, useContext, useMemo, useRef, useState } from 'react';
import { useStore } from 'zustand';
import type { Kernel, OpId } from '@/lib/graph';
import { createKernelStore, type KernelState, type KernelStore } from './kernel-store';

/** What commands and panels ask of the canvas. Positions are those of the document. */
export interface CanvasHandle {
  zoomIn(): void;
  zoomOut(): void;
  fit(): void;
  /** Brings the ops into view. */
  reveal(ids: readonly OpId[]): void;
  /** Moves the keyboard's place to an op, or to the canvas itself. */
  focus(id: OpId | null): void;
  middlePx(): { x: number; y: number };
}

export interface EditorParts {
  store: KernelStore;
  canvas: RefObject<CanvasHandle | null>;
  focusPalette: RefObject<(() => void) | null>;
}

const EditorContext = createContext<EditorParts | null>(null);

export function EditorProvider({
  kernel,
  readOnly,
  children,
}: {
  kernel: Kernel;
  readOnly: boolean;
  children: ReactNode;
}) {
  const [store] = useState(() => createKernelStore({ kernel, readOnly }));
  const canvas = useRef<CanvasHandle | null>(null);
  const focusPalette = useRef<(() => void) | null>(null);
  const parts = useMemo(() => ({ store, canvas, focusPalette }), [store]);
  return <EditorContext value={parts}>{children}</EditorContext>;
}

export function useEditor(): EditorParts {
  const parts = useContext(EditorContext);
  if (parts === null) throw new Error('useEditor is called outside of an EditorProvider');
  return parts;
}

/** A part of the state. The selector returns a primitive or something that keeps its identity. */
export function useKernelState<T>(selector: (state: KernelState) => T): T {
  return useStore(useEditor().store, selector);
}
