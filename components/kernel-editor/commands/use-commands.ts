'use client';

import { useCallback } from 'react';
import { useEditor } from '../store/editor-context';
import type { Command, CommandContext } from './command';

/** The state and the canvas at the moment of a command. */
export function useCommandContext(): () => CommandContext {
  const { store, canvas, focusPalette } = useEditor();
  return useCallback(
    () => ({
      state: store.getState(),
      canvas: canvas.current,
      focusPalette: () => focusPalette.current?.(),
    }),
    [store, canvas, focusPalette],
  );
}

export function useRun(): (command: Command) => void {
  const context = useCommandContext();
  return useCallback(
    (command) => {
      const now = context();
      if (command.enabled(now)) command.run(now);
    },
    [context],
  );
}
