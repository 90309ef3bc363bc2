'use client';

import { type ClipboardEvent, type KeyboardEvent, useCallback } from 'react';
import { kernelFragmentSchema } from '@/lib/graph';
import { commandForKey } from './commands/all-commands';
import { copyCommand, cutCommand, pasteCommand } from './commands/edit-commands';
import { useCommandContext } from './commands/use-commands';

const TYPED_IN = 'input, textarea, select, [contenteditable="true"], dialog';

/** The editor's keys. While something is typed, none is taken; outside the canvas only those with Ctrl or ⌘. */
export function useEditorKeys() {
  const context = useCommandContext();
  const onKeyDown = useCallback(
    (event: KeyboardEvent) => {
      const target = event.target as HTMLElement;
      if (event.defaultPrevented || target.closest(TYPED_IN)) return;
      const now = context();
      const command = commandForKey(event, now, target.closest('.kernel-canvas') !== null);
      // The browser's own paste event brings what other tabs copied.
      if (command === null || command === pasteCommand) return;
      event.preventDefault();
      command.run(now);
      const { fragment } = context().state;
      if ((command === copyCommand || command === cutCommand) && fragment !== null) {
        navigator.clipboard?.writeText(JSON.stringify(fragment)).catch(() => {});
      }
    },
    [context],
  );
  const onPaste = useCallback(
    (event: ClipboardEvent) => {
      if ((event.target as HTMLElement).closest(TYPED_IN)) return;
      const { state, canvas } = context();
      const pasted = state.readOnly
        ? []
        : state.paste(fragmentOf(event.clipboardData.getData('text/plain')) ?? undefined);
      if (pasted.length === 0) return;
      event.preventDefault();
      canvas?.reveal(pasted);
      canvas?.focus(pasted[0] ?? null);
    },
    [context],
  );
  return { onKeyDown, onPaste };
}

/** The fragment that a text holds, or null when it is some other text. */
function fragmentOf(text: string) {
  if (!text.includes('pinloom.fragment')) return null;
  try {
    return kernelFragmentSchema.safeParse(JSON.parse(text)).data ?? null;
  } catch {
    return null;
  }
}
