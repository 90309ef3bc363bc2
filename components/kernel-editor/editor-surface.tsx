'use client';

import { type ReactNode, useSyncExternalStore } from 'react';
import { KernelCanvas } from './canvas/kernel-canvas';
import { ConnectDialog } from './panels/connect-dialog';
import { LoopDialog } from './panels/loop-dialog';
import { ShortcutsDialog } from './panels/shortcuts-dialog';
import { SidePanels } from './panels/side-panels';
import { StatusLine } from './panels/status-line';
import { Toolbar } from './panels/toolbar';
import { useEditorKeys } from './use-editor-keys';

interface EditorSurfaceProps {
  top: ReactNode;
  notices?: ReactNode;
  dialogs?: ReactNode;
}

const never = () => () => {};
/** False on the server and at the first draw in the browser: the canvas measures, so it starts after that. */
const useAwake = (): boolean =>
  useSyncExternalStore(
    never,
    () => true,
    () => false,
  );

/** Canvas, panels and dialogs, below a bar of the caller's. Fills the screen; only its parts scroll. */
export function EditorSurface({ top, notices, dialogs }: EditorSurfaceProps) {
  const keys = useEditorKeys();
  const awake = useAwake();
  return (
    <div className="flex h-[calc(100dvh-3.5rem)] flex-col overflow-hidden md:h-dvh" {...keys}>
      {top}
      {notices}
      <SidePanels>
        <Toolbar />
        <div className="min-h-0 flex-1">{awake ? <KernelCanvas /> : null}</div>
        <StatusLine />
      </SidePanels>
      <ConnectDialog />
      <LoopDialog />
      <ShortcutsDialog />
      {dialogs}
    </div>
  );
}
