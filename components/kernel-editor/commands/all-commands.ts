import { alignCommands, layoutCommand } from './arrange-commands';
import type { Command, CommandContext } from './command';
import { connectCommand } from './connect-commands';
import {
  copyCommand,
  cutCommand,
  duplicateCommand,
  pasteCommand,
  redoCommand,
  removeCommand,
  undoCommand,
} from './edit-commands';
import { moveCommands } from './move-commands';
import { escapeCommand, selectAllCommand, toggleCommand } from './select-commands';
import { hasModifier, type KeyPress, matches } from './shortcut';
import {
  dragModeCommand,
  fitCommand,
  paletteCommand,
  shortcutsCommand,
  zoomInCommand,
  zoomOutCommand,
} from './view-commands';

export const allCommands: readonly Command[] = [
  undoCommand,
  redoCommand,
  cutCommand,
  copyCommand,
  pasteCommand,
  duplicateCommand,
  removeCommand,
  selectAllCommand,
  toggleCommand,
  escapeCommand,
  ...moveCommands,
  connectCommand,
  layoutCommand,
  ...alignCommands,
  zoomInCommand,
  zoomOutCommand,
  fitCommand,
  dragModeCommand,
  paletteCommand,
  shortcutsCommand,
];

/** The commands that a person may use: those that write are not offered where the kernel may only be read. */
export const commandsFor = (readOnly: boolean): readonly Command[] =>
  readOnly ? allCommands.filter((command) => !command.writes) : allCommands;

/** The command that a key press means. Outside the canvas only shortcuts with a modifier key count. */
export function commandForKey(press: KeyPress, context: CommandContext, onCanvas: boolean): Command | null {
  const found = commandsFor(context.state.readOnly).find((command) =>
    command.shortcuts.some((shortcut) => (onCanvas || hasModifier(shortcut)) && matches(shortcut, press)),
  );
  return found?.enabled(context) ? found : null;
}
