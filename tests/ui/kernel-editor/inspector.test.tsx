import { act, screen, within } from '@testing-library/react';
import { describe, expect, test } from 'vitest';
import { selectEdge, selectOps } from '@/components/kernel-editor/store/selection';
import { edgeId, type OpId } from '@/lib/graph';
import { ids, smallKernel } from '../../unit/kernel-editor/small-kernel';
import { renderEditor } from './render-editor';

function inspect(...chosen: OpId[]) {
  const editor = renderEditor(smallKernel);
  act(() => editor.state().select(selectOps(chosen)));
  return editor;
}
const inspector = () => within(screen.getByRole('region', { name: 'Inspector' }));

describe('the inspector of an op', () => {
  test('a label is taken when the field is left, as one step', async () => {
    const { user, state } = inspect(ids.sum);
    const label = inspector().getByLabelText('Label');
    await user.clear(label);
    await user.type(label, 'total');
    expect(state().history.done).toHaveLength(0);
    await user.tab();
    expect(state().kernel.ops.find((op) => op.id === ids.sum)?.label).toBe('total');
    expect(state().history.done).toHaveLength(1);
  });

  test('a constant drives a free operand; one beyond the width is refused with the range', async () => {
    const { user, state } = inspect(ids.sum);
    const constant = inspector().getByLabelText('Constant for b');
    // 16 bits, signed: −2¹⁵ … 2¹⁵ − 1.
    await user.type(constant, '40000{Enter}');
    expect(inspector().getByText(/integer from -32768 to 32767/)).toBeVisible();
    expect(state().kernel).toBe(smallKernel);
    await user.clear(constant);
    await user.type(constant, '−7{Enter}');
    expect(state().kernel.ops.find((op) => op.id === ids.sum)?.immediates).toEqual({ b: -7 });
    await user.clear(inspector().getByLabelText('Constant for b'));
    await user.tab();
    expect(state().kernel.ops.find((op) => op.id === ids.sum)?.immediates).toEqual({});
  });

  test('predicate and fallback stand among the operands, as optional ones', () => {
    inspect(ids.sum);
    expect(inspector().getByLabelText('Constant for predicate, optional')).toBeVisible();
    expect(inspector().getByLabelText('Constant for fallback, optional')).toBeVisible();
  });

  test('an operation that would lose a connection is not offered', () => {
    inspect(ids.sum);
    const offered = [...inspector().getByLabelText<HTMLSelectElement>('Operation').options].map(
      (o) => o.text,
    );
    expect(offered).toContain('Subtract');
    // A load has no operand a, which is connected here.
    expect(offered).not.toContain('Load');
  });

  test('a connection is removed where it arrives', async () => {
    const { user, state } = inspect(ids.sum);
    await user.click(inspector().getByRole('button', { name: 'Remove the connection to a' }));
    expect(state().kernel.edges).toEqual([]);
  });
});

describe('the inspector of a connection', () => {
  test('a distance makes room for that many initial values', async () => {
    const { user, state } = renderEditor(smallKernel);
    act(() => state().select(selectEdge(edgeId('edge_1'))));
    expect(inspector().queryByLabelText('Initial values')).toBeNull();
    const distance = inspector().getByLabelText('Distance');
    await user.clear(distance);
    await user.type(distance, '2{Enter}');
    const values = inspector().getByLabelText('Initial values');
    await user.type(values, '1, 2, 3{Enter}');
    expect(inspector().getByText('Give at most 2: the distance is 2.')).toBeVisible();
    await user.clear(values);
    await user.type(values, '1, 2{Enter}');
    expect(state().kernel.edges[0]).toMatchObject({ distance: 2, initialValues: [1, 2] });
  });
});

test('with several ops chosen the inspector aligns them', async () => {
  const { user, state } = inspect(ids.level, ids.above);
  await user.click(inspector().getByRole('button', { name: 'Align tops' }));
  const tops = state()
    .kernel.ops.filter((op) => op.id === ids.level || op.id === ids.above)
    .map((op) => op.positionPx.y);
  expect(new Set(tops).size).toBe(1);
});
