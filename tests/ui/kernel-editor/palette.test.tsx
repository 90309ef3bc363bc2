import { screen, within } from '@testing-library/react';
import { describe, expect, test } from 'vitest';
import { emptyKernel } from '@/lib/graph';
import { renderEditor } from './render-editor';

const paletteOnly = { palette: true, canvas: false };
const search = () => screen.getByRole('combobox', { name: 'Search operations' });
const offered = () =>
  within(screen.getByRole('listbox', { name: 'Operations' }))
    .getAllByRole('option')
    .map((option) => option.getAttribute('aria-label')?.split(':')[0]);

describe('the palette', () => {
  test('a search narrows the operations, by name, sign or unit', async () => {
    const { user } = renderEditor(emptyKernel('New'), paletteOnly);
    await user.type(search(), 'scratch');
    expect(offered()).toEqual(['Scratchpad read', 'Scratchpad write']);
    await user.clear(search());
    await user.type(search(), '≠');
    expect(offered()).toEqual(['Not equal']);
    await user.clear(search());
    await user.type(search(), 'nonsense');
    expect(screen.getByText(/No operation is called that/)).toBeVisible();
  });

  test('Enter adds the one that the arrows chose, and stays for the next', async () => {
    const { user, state } = renderEditor(emptyKernel('New'), paletteOnly);
    await user.type(search(), 'scratch{ArrowDown}{Enter}');
    expect(state().kernel.ops.map((op) => op.kind)).toEqual(['scratchWrite']);
    expect(search()).toHaveFocus();
    expect(screen.getByText(/^Added/)).toBeVisible();
  });

  test('a click adds, selects and gives the keyboard to the new op; none covers another', async () => {
    const { user, state } = renderEditor(emptyKernel('New'), paletteOnly);
    const add = screen.getByRole('option', { name: /^Add:/ });
    await user.click(add);
    await user.click(add);
    const [first, second] = state().kernel.ops;
    expect(second?.positionPx).not.toEqual(first?.positionPx);
    expect([...state().selection.opIds]).toEqual([second?.id]);
    expect(state().focusedOp).toBe(second?.id);
  });
});
