import { describe, expect, test } from 'vitest';
import { allCommands, commandForKey } from '@/components/kernel-editor/commands/all-commands';
import { matches, shortcutLabel } from '@/components/kernel-editor/commands/shortcut';
import { createKernelStore } from '@/components/kernel-editor/store/kernel-store';
import { selectOps } from '@/components/kernel-editor/store/selection';
import { ids, smallKernel } from './small-kernel';

const plain = { ctrlKey: false, metaKey: false, altKey: false, shiftKey: false };
const press = (key: string, held: Partial<typeof plain> = {}) => ({ ...plain, ...held, key });

describe('shortcuts', () => {
  test.each([
    ['Mod+Z', press('z', { ctrlKey: true }), true],
    ['Mod+Z', press('z', { metaKey: true }), true],
    ['Mod+Z', press('Z', { ctrlKey: true, shiftKey: true }), false],
    ['Mod+Shift+Z', press('Z', { ctrlKey: true, shiftKey: true }), true],
    ['?', press('?', { shiftKey: true }), true],
    ['+', press('+', { shiftKey: true }), true],
    ['C', press('c', { ctrlKey: true }), false],
    ['Shift+ArrowLeft', press('ArrowLeft'), false],
  ])('%s against %o is %s', (shortcut, keys, expected) => {
    expect(matches(shortcut, keys)).toBe(expected);
  });

  test('no two commands have the same keys', () => {
    const all = allCommands.flatMap((command) => command.shortcuts);
    expect(all.filter((shortcut, i) => all.indexOf(shortcut) !== i)).toEqual([]);
  });

  test('are shown as the platform writes them', () => {
    expect(shortcutLabel('Mod+Shift+Z')).toBe('Ctrl+Shift+Z');
    expect(shortcutLabel('Mod+Shift+Z', true)).toBe('⌘⇧Z');
  });

  test('a single letter counts on the canvas only, and writing keys never where one may only read', () => {
    const context = (readOnly: boolean) => {
      const store = createKernelStore({ kernel: smallKernel, readOnly });
      store.getState().select(selectOps([ids.sum]));
      store.getState().focusOp(ids.sum);
      return { state: store.getState(), canvas: null, focusPalette: () => {} };
    };
    expect(commandForKey(press('c'), context(false), true)?.id).toBe('connect');
    expect(commandForKey(press('c'), context(false), false)).toBeNull();
    expect(commandForKey(press('Delete'), context(true), true)).toBeNull();
    expect(commandForKey(press('c', { ctrlKey: true }), context(true), false)?.id).toBe('copy');
  });
});
