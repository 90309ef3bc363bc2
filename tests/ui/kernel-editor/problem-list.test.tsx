import { act, screen, waitFor, within } from '@testing-library/react';
import { describe, expect, test } from 'vitest';
import { emptyKernel } from '@/lib/graph';
import { ids, smallKernel } from '../../unit/kernel-editor/small-kernel';
import { renderEditor } from './render-editor';

const problems = () =>
  within(screen.getByRole('list', { name: 'Problems' }))
    .getAllByRole('button')
    .map((button) => button.textContent ?? '');

describe('the list of problems', () => {
  test('names every open operand, and shrinks as they are driven', () => {
    const { state } = renderEditor(smallKernel, { canvas: false });
    const open = (text: string) => problems().filter((problem) => problem.includes(text));
    expect(open('“sum”')).not.toEqual([]);
    const before = problems().length;
    act(() => state().connect({ from: ids.level, to: ids.sum, port: 'b' }));
    expect(problems().length).toBeLessThan(before);
  });

  test('leads to the op at fault: selected, and under the keyboard', async () => {
    const { user, state, node } = renderEditor(smallKernel);
    const [first] = within(screen.getByRole('list', { name: 'Problems' }))
      .getAllByRole('button')
      .filter((button) => button.textContent?.includes('“kept”'));
    if (!first) throw new Error('There is no problem with the store');
    await user.click(first);
    expect([...state().selection.opIds]).toEqual([ids.kept]);
    await waitFor(() => expect(node(ids.kept)).toHaveFocus());
  });

  test('of a kernel without ops says what is missing', () => {
    renderEditor(emptyKernel('New'), { canvas: false });
    expect(problems()).toHaveLength(1);
  });
});
