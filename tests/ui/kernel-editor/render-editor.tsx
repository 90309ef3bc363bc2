import { render } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { type ReactNode, useEffect } from 'react';
import { KernelCanvas } from '@/components/kernel-editor/canvas/kernel-canvas';
import { ConnectDialog } from '@/components/kernel-editor/panels/connect-dialog';
import { Inspector } from '@/components/kernel-editor/panels/inspector';
import { LoopDialog } from '@/components/kernel-editor/panels/loop-dialog';
import { Palette } from '@/components/kernel-editor/panels/palette';
import { ProblemList } from '@/components/kernel-editor/panels/problem-list';
import { StatusLine } from '@/components/kernel-editor/panels/status-line';
import { EditorProvider, useEditor } from '@/components/kernel-editor/store/editor-context';
import type { KernelStore } from '@/components/kernel-editor/store/kernel-store';
import { useEditorKeys } from '@/components/kernel-editor/use-editor-keys';
import type { Kernel } from '@/lib/graph';

// jsdom knows the dialog element, but not how to open it; and nothing there has a pointer.
HTMLDialogElement.prototype.showModal = function (this: HTMLDialogElement) {
  this.open = true;
  this.querySelector<HTMLElement>('[autofocus]')?.focus();
};
HTMLDialogElement.prototype.close = function (this: HTMLDialogElement) {
  this.open = false;
};
window.matchMedia ??= (media) =>
  ({ media, matches: false, addEventListener() {}, removeEventListener() {} }) as unknown as MediaQueryList;

function Screen({ children, onStore }: { children: ReactNode; onStore: (store: KernelStore) => void }) {
  const { store } = useEditor();
  const keys = useEditorKeys();
  useEffect(() => onStore(store), [store, onStore]);
  return <div {...keys}>{children}</div>;
}

/** What a test does not look at can stay away: asking a large page for roles takes seconds in jsdom. */
interface Parts {
  readOnly?: boolean;
  palette?: boolean;
  canvas?: boolean;
}

/** The editor but its bars: canvas, panels and dialogs on a kernel, with the store that they share. */
export function renderEditor(
  kernel: Kernel,
  { readOnly = false, palette = false, canvas = true }: Parts = {},
) {
  let found: KernelStore | null = null;
  const view = render(
    <EditorProvider kernel={kernel} readOnly={readOnly}>
      <Screen
        onStore={(store) => {
          found = store;
        }}
      >
        {palette ? <Palette /> : null}
        {canvas ? (
          <div style={{ width: 1200, height: 800 }}>
            <KernelCanvas />
          </div>
        ) : null}
        <Inspector />
        <ProblemList />
        <StatusLine />
        <ConnectDialog />
        <LoopDialog />
      </Screen>
    </EditorProvider>,
  );
  const state = () => {
    if (found === null) throw new Error('The editor has no store');
    return found.getState();
  };
  const element = (selector: string): HTMLElement => {
    const one = view.container.querySelector<HTMLElement>(selector);
    if (one === null) throw new Error(`Nothing is ${selector}`);
    return one;
  };
  return {
    user: userEvent.setup(),
    state,
    node: (id: string) => element(`.react-flow__node[data-id="${id}"]`),
    result: (id: string) => element(`.react-flow__node[data-id="${id}"] .react-flow__handle.source`),
    operand: (id: string, port: string) =>
      element(`.react-flow__node[data-id="${id}"] .react-flow__handle[data-handleid="${port}"]`),
  };
}
