import { act, screen } from '@testing-library/react';
import { describe, expect, test } from 'vitest';
import { ids, smallKernel } from '../../unit/kernel-editor/small-kernel';
import { renderEditor } from './render-editor';

describe('connecting with two clicks', () => {
  test('first the result, then the operand', async () => {
    const { user, state, result, operand } = renderEditor(smallKernel);
    await user.click(result(ids.sum));
    expect(screen.getByText(/Connecting from “sum”/)).toBeVisible();
    expect(operand(ids.kept, 'value')).toHaveAttribute('data-standing', 'open');
    expect(operand(ids.sum, 'a')).toHaveAttribute('data-standing', 'refused');
    await user.click(operand(ids.kept, 'value'));
    expect(state().kernel.edges.at(-1)).toMatchObject({ from: ids.sum, to: ids.kept, port: 'value' });
    expect(operand(ids.kept, 'value')).toHaveAttribute('data-standing', 'idle');
  });

  test('an operand that refuses says why, and nothing changes', async () => {
    const { user, state, result, operand } = renderEditor(smallKernel);
    await user.click(result(ids.above));
    await user.click(operand(ids.kept, 'value'));
    expect(screen.getByText(/Not connected\. .*gives a flag/)).toBeVisible();
    expect(state().kernel).toBe(smallKernel);
  });

  test('Escape gives a connection up', async () => {
    const { user, state, result, node } = renderEditor(smallKernel);
    await user.click(result(ids.sum));
    act(() => node(ids.sum).focus());
    await user.keyboard('{Escape}');
    expect(state().connecting).toBeNull();
    expect(screen.getByText('Connection given up')).toBeVisible();
  });
});

describe('connecting by keys', () => {
  test('C opens the operands of the op under the keyboard; typing finds, Enter connects', async () => {
    const { user, state, node } = renderEditor(smallKernel);
    act(() => node(ids.level).focus());
    await user.keyboard('c');
    expect(screen.getByRole('combobox', { name: 'Search operands' })).toHaveFocus();
    await user.keyboard('sum b{Enter}');
    expect(state().kernel.edges.at(-1)).toMatchObject({ from: ids.level, to: ids.sum, port: 'b' });
  });

  test('those that refuse are shown with the reason, and cannot be chosen', async () => {
    const { user, state, node } = renderEditor(smallKernel);
    act(() => node(ids.level).focus());
    await user.keyboard('c');
    expect(screen.queryByRole('option', { name: /“sum”, a/ })).toBeNull();
    await user.click(screen.getByLabelText('Show operands that refuse, with the reason'));
    const refusing = screen.getByRole('option', { name: /“sum”, a/ });
    expect(refusing).toHaveTextContent('already driven by “level”');
    await user.click(refusing);
    expect(state().kernel).toBe(smallKernel);
  });

  test('one that closes a loop asks for the distance first', async () => {
    const { user, state, node } = renderEditor(smallKernel);
    act(() => node(ids.sum).focus());
    await user.keyboard('c');
    await user.keyboard('sum b{Enter}');
    const distance = screen.getByLabelText('Distance, in iterations');
    expect(state().kernel).toBe(smallKernel);
    await user.clear(distance);
    await user.type(distance, '0{Enter}');
    expect(screen.getByText(/Give an integer from 1 to/)).toBeVisible();
    await user.clear(distance);
    await user.type(distance, '4{Enter}');
    expect(state().kernel.edges.at(-1)).toMatchObject({ from: ids.sum, to: ids.sum, port: 'b', distance: 4 });
  });

  test('an op without a result says that there is nothing to connect', async () => {
    const { user, node } = renderEditor(smallKernel);
    act(() => node(ids.kept).focus());
    await user.keyboard('c');
    expect(screen.getByText('Store has no result to connect.')).toBeVisible();
  });

  test('arrows go along a connection, Delete removes, Ctrl+Z brings back', async () => {
    const { user, state, node } = renderEditor(smallKernel);
    act(() => node(ids.level).focus());
    await user.keyboard('{ArrowRight}');
    expect([...state().selection.opIds]).toEqual([ids.sum]);
    await user.keyboard('{Delete}');
    expect(state().kernel.ops.map((op) => op.id)).not.toContain(ids.sum);
    await user.keyboard('{Control>}z{/Control}');
    expect(state().kernel).toEqual(smallKernel);
  });
});
