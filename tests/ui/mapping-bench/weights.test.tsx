import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, test, vi } from 'vitest';
import { SettingsForm } from '@/components/mapping-bench/solve/settings-form';
import type { SolvePanelProps } from '@/components/mapping-bench/solve/solve-panel-props';
import { firstSettings, type SolveSettings } from '@/components/mapping-bench/solve/solve-state';
import { BenchProvider } from '@/components/mapping-bench/store/bench-context';
import { type BenchStore, createBenchStore } from '@/components/mapping-bench/store/bench-store';
import { kernelSchema } from '@/lib/graph/kernel';
import { weightsSchema } from '@/lib/mapping/weights';
import { emptyContent, fabric, ids, newStore } from '../../unit/mapping-bench/bench-fixture';

function show({
  store = newStore(),
  settings = firstSettings,
}: {
  store?: BenchStore;
  settings?: SolveSettings;
} = {}) {
  const onStart = vi.fn();
  const props = { solve: null, starting: false, settings, onSettings: () => undefined, onStart };
  render(
    <BenchProvider store={store}>
      <SettingsForm {...(props as unknown as SolvePanelProps)} />
    </BenchProvider>,
  );
  return { store, onStart, user: userEvent.setup() };
}

const summary = () => screen.getByText('Weights').closest('summary') as HTMLElement;
const start = () => screen.getByRole('button', { name: 'Auto-place the rest' });
const field = (name: string) => screen.getByRole('textbox', { name });

describe('weights beside a solve', () => {
  test('are asked of each net for wire hops and of each connection for path hops, 1 at first', async () => {
    const { user } = show();
    await user.click(summary());
    const table = () => within(screen.getByRole('table'));
    expect(
      table()
        .getAllByRole('textbox')
        .map((input) => input.getAttribute('value')),
    ).toEqual(['1', '1', '1', '1']);
    expect(field('left → product, sum')).toBeInTheDocument();
    await user.selectOptions(screen.getByLabelText('Aim'), 'path');
    expect(table().getAllByRole('textbox')).toHaveLength(5);
    expect(field('left → sum b')).toBeInTheDocument();
  });

  test('go with the solve where they are not 1, typed with keys alone', async () => {
    const { user, onStart } = show();
    await user.tab();
    while (document.activeElement !== summary()) await user.tab();
    await user.click(document.activeElement as HTMLElement);
    await user.tab();
    expect(field('left → product, sum')).toHaveFocus();
    await user.keyboard('{Control>}a{/Control}2.5');
    await user.tab();
    await user.keyboard('{Control>}a{/Control}0{Enter}');
    expect(onStart).toHaveBeenCalledExactlyOnceWith(
      { ...firstSettings, weights: { nets: { [ids.left]: 2.5, [ids.right]: 0 } } },
      true,
    );
    expect(summary()).toHaveTextContent('Weights · 2 not 1');
  });

  test('are none where all are 1, and all are 1 again at one press', async () => {
    const weights = weightsSchema.parse({ nets: { [ids.left]: 7 } });
    const { user, onStart } = show({ settings: { ...firstSettings, weights } });
    expect(summary()).toHaveTextContent('1 not 1');
    await user.click(summary());
    expect(field('left → product, sum')).toHaveValue('7');
    await user.click(screen.getByRole('button', { name: 'All 1 again' }));
    expect(field('left → product, sum')).toHaveValue('1');
    expect(summary()).toHaveTextContent('all 1');
    await user.click(start());
    expect(onStart).toHaveBeenCalledExactlyOnceWith(firstSettings, true);
  });

  test.each(['-1', '1e10', 'two', '0x2', 'Infinity'])(
    'that are none, such as %s, are told, also when closed',
    async (text) => {
      const { user, onStart } = show();
      await user.click(summary());
      await user.clear(field('right → product'));
      await user.type(field('right → product'), text);
      expect(field('right → product')).toHaveAttribute('aria-invalid', 'true');
      await user.click(summary());
      await user.click(start());
      expect(onStart).not.toHaveBeenCalled();
      expect(screen.getByRole('alert')).toHaveTextContent(
        'One weight is none: give a number from 0 to 1,000,000,000.',
      );
    },
  );

  test('of a connection keep while the other aim is looked at', async () => {
    const { user, onStart } = show();
    await user.selectOptions(screen.getByLabelText('Aim'), 'path');
    await user.click(summary());
    await user.clear(field('sum → out value'));
    await user.type(field('sum → out value'), '3');
    await user.selectOptions(screen.getByLabelText('Aim'), 'wire');
    expect(summary()).toHaveTextContent('all 1');
    await user.selectOptions(screen.getByLabelText('Aim'), 'path');
    await user.click(start());
    expect(onStart.mock.calls[0]?.[0]).toMatchObject({
      objective: 'path',
      weights: { edges: { edge_5: 3 } },
    });
  });

  test('point at their op on the bench while they are typed', async () => {
    const { store, user } = show();
    await user.click(summary());
    await user.click(field('product → sum'));
    expect(store.getState().pointedOp).toBe(ids.product);
    await user.tab();
    expect(store.getState().pointedOp).toBe(ids.sum);
  });

  test('of 300 ops have no field until they are opened', async () => {
    const { user } = show({ store: largeStore(300) });
    const before = screen.getAllByRole('textbox').length;
    expect(before).toBeLessThan(5);
    await user.click(summary());
    expect(screen.getAllByRole('textbox')).toHaveLength(before + 299);
  });
});

/** A chain of passes. */
function largeStore(count: number): BenchStore {
  const kernel = kernelSchema.parse({
    format: 'pinloom.kernel',
    formatVersion: 1,
    name: 'Chain',
    description: '',
    ops: Array.from({ length: count }, (_, i) => ({
      id: `op_${i}`,
      kind: 'pass',
      label: `pass ${i}`,
      widthBits: 32,
      params: {},
      immediates: {},
      positionPx: { x: 0, y: 0 },
    })),
    edges: Array.from({ length: count - 1 }, (_, i) => ({
      id: `edge_${i}`,
      from: `op_${i}`,
      to: `op_${i + 1}`,
      port: 'a',
      distance: 0,
      initialValues: [],
    })),
  });
  return createBenchStore({ kernel, fabric, content: emptyContent, readOnly: false });
}
