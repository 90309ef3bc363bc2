import { describe, expect, test } from 'vitest';
import { ids, newStore, placeAll, tile } from './bench-fixture';

const hold = (store: ReturnType<typeof newStore>, id: (typeof ids)[keyof typeof ids], index: number) => {
  store.getState().pick(id);
  return store.getState().putDown(index);
};

describe('placing by hand', () => {
  test('an op that is picked and put down is on the tile and no longer held', () => {
    const store = newStore();
    expect(hold(store, ids.left, 0)).toBe(true);
    expect(store.getState().content.placement).toEqual({ [ids.left]: tile(0) });
    expect(store.getState().held).toBeNull();
  });

  test('a unit that does not implement the op refuses it by R3 and the op stays held', () => {
    const store = newStore();
    expect(hold(store, ids.product, 0)).toBe(false);
    expect(store.getState().said).toEqual({
      text: 'R3: the Memory unit at row 0, column 0 cannot do Multiply. It needs Multiplier.',
      refused: true,
    });
    expect(store.getState().held).toBe(ids.product);
  });

  test('a tile without a PE refuses every op by R1', () => {
    expect(newStore().getState().refusal(ids.sum, 8)).toBe('R1: row 2, column 2 has a router but no PE.');
  });

  test('two placed ops that fit swap', () => {
    const store = newStore();
    hold(store, ids.left, 0);
    hold(store, ids.out, 2);
    hold(store, ids.left, 2);
    expect(store.getState().content.placement).toEqual({ [ids.left]: tile(2), [ids.out]: tile(0) });
  });

  test('an op from the graph takes the tile; the one that was there is off the fabric', () => {
    const store = newStore();
    hold(store, ids.left, 0);
    hold(store, ids.right, 0);
    expect(store.getState().content.placement).toEqual({ [ids.right]: tile(0) });
  });

  test('a pinned op neither moves nor gives way, by R4', () => {
    const store = newStore();
    hold(store, ids.left, 0);
    store.getState().togglePin(ids.left);
    expect(store.getState().refusal(ids.left, 2)).toMatch(/^R4: left is pinned to row 0, column 0/);
    expect(store.getState().refusal(ids.right, 0)).toMatch(/^R4: left is pinned/);
    store.getState().unplace(ids.left);
    expect(store.getState().content.placement[ids.left]).toBe(tile(0));
  });

  test('a press on the tile of the held op puts it back', () => {
    const store = newStore();
    hold(store, ids.left, 0);
    store.getState().press(0);
    expect(store.getState().held).toBe(ids.left);
    store.getState().press(0);
    expect(store.getState().held).toBeNull();
    expect(store.getState().past).toHaveLength(1);
  });

  test('a viewer picks nothing up', () => {
    const store = newStore(true);
    store.getState().pick(ids.left);
    expect(store.getState().held).toBeNull();
  });
});

describe('figures follow every change', () => {
  // left(1,1) feeds product(2,2) over 2 hops and sum(1,2) on the way: 2 wire hops. right→product 1, product→sum 1, sum→out 1.
  test('wire hops 2+1+1+1 = 5, path hops 2+1+1+1+1 = 6, longest 2 of 7', () => {
    const store = newStore();
    placeAll(store);
    const { metrics, legal, violations } = store.getState().facts;
    expect(violations).toEqual([]);
    expect(legal).toBe(true);
    expect([metrics.totalWireHops, metrics.totalPathHops, metrics.longestPathHops, metrics.maxHops]).toEqual([
      5, 6, 2, 7,
    ]);
  });
});

describe('undo and redo', () => {
  test('take back and bring again placing, pinning and an auto-placed result', () => {
    const store = newStore();
    placeAll(store);
    const byHand = store.getState().content;
    store.getState().togglePin(ids.sum);
    const pinned = store.getState().content;
    store.getState().takeResult({
      placement: byHand.placement,
      routes: byHand.routes,
      provenance: solved,
    });
    const taken = store.getState().content;
    expect(taken.provenance).toEqual(solved);
    expect(taken.pins).toEqual(pinned.pins);
    store.getState().undo();
    expect(store.getState().content).toBe(pinned);
    store.getState().undo();
    expect(store.getState().content).toBe(byHand);
    store.getState().redo();
    store.getState().redo();
    expect(store.getState().content).toBe(taken);
  });

  test('a change after undo forgets what was undone', () => {
    const store = newStore();
    hold(store, ids.left, 0);
    store.getState().undo();
    hold(store, ids.right, 3);
    expect(store.getState().future).toEqual([]);
  });
});

const solved = {
  by: 'solver' as const,
  engine: 'search',
  objective: 'wire' as const,
  timeLimitMs: 5000,
  seed: 1,
  status: 'optimal' as const,
  objectiveValue: 5,
  bound: 5,
  elapsedMs: 12,
  changedByHand: false,
};

test('moving an op after a solve marks the mapping as changed by hand', () => {
  const store = newStore();
  placeAll(store);
  const { placement, routes } = store.getState().content;
  store.getState().takeResult({ placement, routes, provenance: solved });
  hold(store, ids.out, 6);
  expect(store.getState().content.provenance).toEqual({ ...solved, changedByHand: true });
});
