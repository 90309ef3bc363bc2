'use client';

import { IconButton } from '@/components/ui/button';
import { Menu } from '@/components/ui/menu';
import { commandsFor } from '../commands/all-commands';
import { alignCommands, layoutCommand } from '../commands/arrange-commands';
import type { Command } from '../commands/command';
import { redoCommand, undoCommand } from '../commands/edit-commands';
import { shortcutLabel } from '../commands/shortcut';
import { useCommandContext, useRun } from '../commands/use-commands';
import {
  dragModeCommand,
  fitCommand,
  shortcutsCommand,
  zoomInCommand,
  zoomOutCommand,
} from '../commands/view-commands';
import { useKernelState } from '../store/editor-context';

/** The commands used most, over the canvas; the rest stand in its menus. */
export function Toolbar() {
  const readOnly = useKernelState((state) => state.readOnly);
  const dragMode = useKernelState((state) => state.dragMode);
  // What decides whether commands are on: any of these changing draws the bar again.
  useKernelState((state) => state.history);
  useKernelState((state) => state.selection);
  useKernelState((state) => state.fragment);
  const run = useRun();
  return (
    <div
      role="toolbar"
      aria-label="Canvas"
      className="flex flex-none flex-wrap items-center gap-0.5 border-b border-rule bg-surface px-2 py-1"
    >
      {readOnly ? (
        <span className="px-2 text-sm text-quiet">Read only</span>
      ) : (
        <>
          <CommandButton command={undoCommand} symbol="↶" />
          <CommandButton command={redoCommand} symbol="↷" />
          <CommandMenu label="Edit" commands={commandsFor(false).filter(({ group }) => group === 'Edit')} />
          <CommandMenu label="Arrange" commands={[layoutCommand, ...alignCommands]} />
        </>
      )}
      <span className="ml-auto" />
      <IconButton
        label={
          dragMode === 'pan'
            ? 'A drag moves the view; press to select by drag'
            : 'A drag selects; press to move the view by drag'
        }
        aria-pressed={dragMode === 'pan'}
        className={dragMode === 'pan' ? 'bg-indigo-wash' : ''}
        onClick={() => run(dragModeCommand)}
      >
        <HandMark />
      </IconButton>
      <CommandButton command={zoomOutCommand} symbol="−" />
      <CommandButton command={zoomInCommand} symbol="+" />
      <CommandButton command={fitCommand} symbol={<FitMark />} />
      <CommandButton command={shortcutsCommand} symbol="?" />
    </div>
  );
}

function CommandButton({ command, symbol }: { command: Command; symbol: React.ReactNode }) {
  const run = useRun();
  const context = useCommandContext();
  const [shortcut] = command.shortcuts;
  return (
    <IconButton
      label={shortcut === undefined ? command.label : `${command.label} (${shortcutLabel(shortcut)})`}
      disabled={!command.enabled(context())}
      onClick={() => run(command)}
    >
      {typeof symbol === 'string' ? <span aria-hidden="true">{symbol}</span> : symbol}
    </IconButton>
  );
}

function CommandMenu({ label, commands }: { label: string; commands: readonly Command[] }) {
  const run = useRun();
  const context = useCommandContext();
  return (
    <Menu
      label={label}
      align="left"
      items={commands.map((command) => {
        const [shortcut] = command.shortcuts;
        return {
          id: command.id,
          label: command.label,
          shortcut: shortcut === undefined ? undefined : shortcutLabel(shortcut),
          disabled: !command.enabled(context()),
          onSelect: () => run(command),
        };
      })}
    />
  );
}

const mark = {
  width: 16,
  height: 16,
  viewBox: '0 0 16 16',
  fill: 'none',
  stroke: 'currentColor',
  strokeWidth: 1.5,
};

/** Four arrows from the middle: the view moves. */
function HandMark() {
  return (
    <svg aria-hidden="true" {...mark}>
      <path d="M8 2v12M2 8h12M6 4l2-2 2 2M6 12l2 2 2-2M4 6L2 8l2 2M12 6l2 2-2 2" />
    </svg>
  );
}

function FitMark() {
  return (
    <svg aria-hidden="true" {...mark}>
      <path d="M2 5V2h3M11 2h3v3M14 11v3h-3M5 14H2v-3M5.5 6h5v4h-5z" />
    </svg>
  );
}
