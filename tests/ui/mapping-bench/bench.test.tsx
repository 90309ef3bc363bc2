import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, test } from 'vitest';
import { BenchPanes } from '@/components/mapping-bench/bench-panes';
import { BenchProvider, useBench } from '@/components/mapping-bench/store/bench-context';
import type { BenchStore } from '@/components/mapping-bench/store/bench-store';
import { ids, newStore, placeAll, tile } from '../../unit/mapping-bench/bench-fixture';

function Panes() {
  const facts = useBench((state) => state.facts);
  const byTile = useBench((state) => state.byTile);
  return (
    <BenchPanes
      shown={{ facts, byTile, preview: false }}
      kernelTitle="5 ops"
      fabricTitle="3×3"
      solvePanel={null}
    />
  );
}

function show(store: BenchStore = newStore()) {
  render(
    <BenchProvider store={store}>
      <Panes />
    </BenchProvider>,
  );
  return { store, user: userEvent.setup() };
}

const op = (name: RegExp) => screen.getByRole('option', { name });
const cell = (name: RegExp) => screen.getByRole('gridcell', { name });

describe('placing with keys alone', () => {
  test('Enter on an op picks it up, arrows move on the grid, Enter puts it down, Tab comes back to that tile', async () => {
    const { store, user } = show();
    op(/^left,/).focus();
    await user.keyboard('{Enter}');
    expect(screen.getAllByRole('status')[0]).toHaveTextContent(/left picked up/);
    cell(/^Row 0, column 0/).focus();
    await user.keyboard('{ArrowDown}{Enter}');
    expect(store.getState().content.placement).toEqual({ [ids.left]: tile(3) });
    expect(cell(/^Row 1, column 0.*holds left/)).toHaveFocus();
    expect(screen.getAllByRole('gridcell').filter((each) => each.tabIndex === 0)).toHaveLength(1);
  });

  test('arrows stop at the edges; Home, End and Ctrl with them go to the ends', async () => {
    const { user } = show();
    cell(/^Row 0, column 0/).focus();
    await user.keyboard('{ArrowUp}{ArrowLeft}');
    expect(cell(/^Row 0, column 0/)).toHaveFocus();
    await user.keyboard('{End}');
    expect(cell(/^Row 0, column 2/)).toHaveFocus();
    await user.keyboard('{Control>}{End}{/Control}');
    expect(cell(/^Row 2, column 2/)).toHaveFocus();
    await user.keyboard('{Home}');
    expect(cell(/^Row 2, column 0/)).toHaveFocus();
    await user.keyboard('{Control>}{Home}{/Control}');
    expect(cell(/^Row 0, column 0/)).toHaveFocus();
  });

  test('P pins and unpins, Delete takes off, Escape puts back', async () => {
    const { store, user } = show();
    store.getState().pick(ids.left);
    store.getState().putDown(0);
    cell(/^Row 0, column 0/).focus();
    await user.keyboard('p');
    expect(store.getState().content.pins).toEqual({ [ids.left]: tile(0) });
    await user.keyboard('{Delete}');
    expect(screen.getAllByRole('status')[0]).toHaveTextContent('R4: left is pinned. Unpin it first.');
    await user.keyboard('p{Delete}');
    expect(store.getState().content.placement).toEqual({});
    op(/^sum,/).focus();
    await user.keyboard('{Enter}');
    expect(store.getState().held).toBe(ids.sum);
    await user.keyboard('{Escape}');
    expect(store.getState().held).toBeNull();
  });
});

describe('illegal tiles', () => {
  test('are disabled while an op is held, and say why by name and in the status line', async () => {
    const { store, user } = show();
    store.getState().pick(ids.product);
    const memory = await screen.findByRole('gridcell', { name: /^Row 0, column 0.*not for product: R3/ });
    expect(memory).toHaveAttribute('aria-disabled', 'true');
    expect(cell(/^Row 1, column 1/)).not.toHaveAttribute('aria-disabled');
    expect(cell(/^Row 2, column 2.*R1/)).toHaveAttribute('aria-disabled', 'true');
    memory.focus();
    await user.keyboard('{Enter}');
    expect(store.getState().content.placement).toEqual({});
    expect(screen.getAllByRole('status')[0]).toHaveTextContent(/^R3: the Memory unit .* cannot do Multiply/);
  });
});

test('a click on an op and a click on a tile place it', async () => {
  const { store, user } = show();
  await user.click(op(/^sum,/));
  await user.click(cell(/^Row 0, column 1/));
  expect(store.getState().content.placement).toEqual({ [ids.sum]: tile(1) });
  expect(op(/^sum, Add, placed/)).toBeInTheDocument();
});

test('pointing at an op tells its place and what it feeds', async () => {
  const store = newStore();
  placeAll(store);
  const { user } = show(store);
  await user.hover(op(/^left,/));
  // left feeds product and sum over one tree of 2 links.
  expect(screen.getByText(/left: row 0, column 0 · feeds product, sum over 2 wire hops/)).toBeInTheDocument();
});

test('figures and rules follow', async () => {
  const { store } = show();
  placeAll(store);
  const figures = within(screen.getByRole('region', { name: 'Figures' }));
  expect(await figures.findByText('5 of 5')).toBeInTheDocument();
  expect(figures.getByText('2 of 7')).toBeInTheDocument();
  expect(screen.getByText(/every rule from R1 to R7 holds/)).toBeInTheDocument();
});

test('a viewer picks nothing up', async () => {
  const { store, user } = show(newStore(true));
  await user.click(op(/^sum,/));
  expect(store.getState().held).toBeNull();
});
