/** Commands as data: toolbar, menu, keyboard and the list of shortcuts share them. */
import type { CanvasHandle } from '../store/editor-context';
import type { KernelState } from '../store/kernel-store';

export interface CommandContext {
  state: KernelState;
  canvas: CanvasHandle | null;
  focusPalette(): void;
}

export const commandGroups = ['Edit', 'Select', 'Move', 'Connect', 'Arrange', 'View', 'Help'] as const;
export type CommandGroup = (typeof commandGroups)[number];

export interface Command {
  id: string;
  label: string;
  group: CommandGroup;
  /** The first is shown. `Mod` is Ctrl, or ⌘ on a Mac. Those without a modifier work while the canvas has the focus. */
  shortcuts: readonly string[];
  /** Changes the kernel: not offered where it may only be read. */
  writes: boolean;
  enabled(context: CommandContext): boolean;
  run(context: CommandContext): void;
}

export const always = (): boolean => true;
export const someOps = ({ state }: CommandContext): boolean => state.kernel.ops.length > 0;
export const opsChosen = ({ state }: CommandContext): boolean => state.selection.opIds.size > 0;
export const somethingChosen = ({ state }: CommandContext): boolean =>
  state.selection.opIds.size > 0 || state.selection.edgeId !== null;
