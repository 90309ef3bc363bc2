'use client';

import { Dialog } from '@/components/ui/dialog';
import { commandsFor } from '../commands/all-commands';
import { commandGroups } from '../commands/command';
import { shortcutLabel } from '../commands/shortcut';
import { useEditor, useKernelState } from '../store/editor-context';

/** Every command with its keys. */
export function ShortcutsDialog() {
  const { store } = useEditor();
  const open = useKernelState((state) => state.dialog === 'shortcuts');
  const readOnly = useKernelState((state) => state.readOnly);
  const commands = commandsFor(readOnly).filter((command) => command.shortcuts.length > 0);
  const onMac = typeof navigator !== 'undefined' && /Mac|iPhone|iPad/.test(navigator.platform);
  return (
    <Dialog
      open={open}
      title="Keyboard shortcuts"
      size="wide"
      onClose={() => store.getState().openDialog(null)}
    >
      <p className="mb-3 text-sm text-quiet">
        Keys without Ctrl or ⌘ work while the canvas has the focus. Tab leads to the canvas and out of it.
      </p>
      <div className="columns-1 gap-8 md:columns-2">
        {commandGroups.map((group) => {
          const inGroup = commands.filter((command) => command.group === group);
          return inGroup.length === 0 ? null : (
            <section key={group} className="mb-4 break-inside-avoid" aria-label={group}>
              <h3 className="mb-1 text-xs font-semibold tracking-wide text-quiet">{group}</h3>
              <dl className="text-sm">
                {inGroup.map((command) => (
                  <div key={command.id} className="flex items-baseline justify-between gap-4 py-0.5">
                    <dt>{command.label}</dt>
                    <dd className="flex-none font-mono text-xs">
                      {command.shortcuts.map((shortcut) => shortcutName(shortcut, onMac)).join(' or ')}
                    </dd>
                  </div>
                ))}
              </dl>
            </section>
          );
        })}
      </div>
    </Dialog>
  );
}

const shortcutName = (shortcut: string, onMac: boolean): string =>
  shortcut === ' ' ? 'Space' : shortcutLabel(shortcut, onMac);
