import { describe, expect, test } from 'vitest';
import { createKernelStore } from '@/components/kernel-editor/store/kernel-store';
import { replaceKernelEdit } from '@/components/kernel-editor/store/replace-kernel';
import { selectOps } from '@/components/kernel-editor/store/selection';
import { copyFragment, edgeId, type Kernel } from '@/lib/graph';
import { ids, smallKernel } from './small-kernel';

const storeOf = (kernel: Kernel = smallKernel, readOnly = false) => createKernelStore({ kernel, readOnly });
const toSum = (port: string) => ({ from: ids.level, to: ids.sum, port });

describe('edits and the way back', () => {
  test('each kind of edit is undone to the same kernel, and done again', () => {
    const store = storeOf();
    const state = () => store.getState();
    const stages: Kernel[] = [state().kernel];
    const act = (run: () => void) => {
      run();
      stages.push(state().kernel);
    };
    act(() => state().addOp('multiply', { x: 0, y: 320 }));
    act(() => state().connect(toSum('b')));
    act(() => state().edit({ type: 'updateOp', id: ids.sum, patch: { label: 'total' } }, 'change label'));
    act(() =>
      state().edit({ type: 'moveOps', moves: [{ id: ids.sum, positionPx: { x: 8, y: 8 } }] }, 'move op'),
    );
    act(() => state().paste(copyFragment(state().kernel, new Set([ids.level, ids.sum]))));
    act(() => {
      state().select(selectOps([ids.level, ids.sum]));
      state().removeSelected();
    });
    act(() => state().edit(replaceKernelEdit(state().kernel, smallKernel), 'restore version 1'));
    for (const stage of stages.slice(0, -1).reverse()) {
      state().undo();
      expect(state().kernel).toEqual(stage);
    }
    for (const stage of stages.slice(1)) {
      state().redo();
      expect(state().kernel).toEqual(stage);
    }
  });

  test('a new edit forgets what had been undone', () => {
    const store = storeOf();
    store.getState().addOp('add', { x: 0, y: 320 });
    store.getState().undo();
    store.getState().connect(toSum('b'));
    const { kernel } = store.getState();
    store.getState().redo();
    expect(store.getState().kernel).toBe(kernel);
  });

  test('three nudges of one selection are one step', () => {
    const store = storeOf();
    for (const x of [8, 16, 24]) {
      const move = { id: ids.level, positionPx: { x, y: 0 } };
      store.getState().edit({ type: 'moveOps', moves: [move] }, 'move ops', 'nudge op_level');
    }
    store.getState().undo();
    expect(store.getState().kernel).toEqual(smallKernel);
  });

  test('a kernel that may only be read stays as it is', () => {
    const store = storeOf(smallKernel, true);
    store.getState().select(selectOps([ids.level]));
    store.getState().removeSelected();
    store.getState().addOp('add', { x: 0, y: 0 });
    store.getState().connect(toSum('b'));
    store.getState().paste(copyFragment(smallKernel, new Set([ids.level])));
    store.getState().undo();
    expect(store.getState().kernel).toBe(smallKernel);
  });

  test('what is removed is no longer selected', () => {
    const store = storeOf();
    store.getState().select(selectOps([ids.level, ids.kept]));
    store.getState().removeSelected();
    expect(store.getState().selection.opIds.size).toBe(0);
    expect(store.getState().kernel.edges).toEqual([]);
  });
});

describe('connecting', () => {
  test('a free operand of the right type takes the result', () => {
    const store = storeOf();
    store.getState().connect(toSum('b'));
    expect(store.getState().kernel.edges.at(-1)).toMatchObject({ ...toSum('b'), distance: 0 });
    expect(store.getState().said).toContain('Connected “level” to “b” of “sum”');
  });

  test('an operand that is driven refuses and says by what', () => {
    const store = storeOf();
    store.getState().connect({ from: ids.sum, to: ids.sum, port: 'a' });
    expect(store.getState().kernel).toBe(smallKernel);
    expect(store.getState().said).toContain('already driven by “level”');
  });

  test('a flag where a word is asked for refuses and says so', () => {
    const store = storeOf();
    store.getState().connect({ from: ids.above, to: ids.kept, port: 'value' });
    expect(store.getState().kernel).toBe(smallKernel);
    expect(store.getState().said).toContain('gives a flag, but the operand “value” of “kept” takes a word');
  });

  test('a connection that would close a cycle waits for its distance', () => {
    const store = storeOf();
    const own = { from: ids.sum, to: ids.sum, port: 'b' };
    store.getState().connect(own);
    expect(store.getState().kernel).toBe(smallKernel);
    expect(store.getState().loopOffer).toEqual(own);
    store.getState().connectLater(own, 3);
    expect(store.getState().loopOffer).toBeNull();
    expect(store.getState().kernel.edges.at(-1)).toMatchObject({ ...own, distance: 3 });
  });

  test('while one is on its way every operand has its answer', () => {
    const store = storeOf();
    store.getState().startConnecting(ids.level, 'click');
    const answers = store.getState().connecting?.answers;
    expect(answers?.get('op_sum.a')?.ok).toBe(false);
    expect(answers?.get('op_sum.b')).toEqual({ ok: true, needsDistance: false });
    expect(answers?.get('op_kept.value')?.ok).toBe(true);
    store.getState().stopConnecting();
    expect(store.getState().connecting).toBeNull();
  });
});

describe('copying', () => {
  test('a fragment keeps the connections within it and lands aside, under new ids', () => {
    const store = storeOf();
    store.getState().select(selectOps([ids.level, ids.sum]));
    store.getState().copy();
    const pasted = store.getState().paste();
    const { kernel, selection } = store.getState();
    expect(kernel.ops).toHaveLength(6);
    expect(kernel.edges).toHaveLength(2);
    expect(new Set(kernel.ops.map((op) => op.id)).size).toBe(6);
    expect([...selection.opIds]).toEqual(pasted);
    const added = kernel.edges.find((edge) => edge.id !== edgeId('edge_1'));
    expect(pasted).toContain(added?.from);
    expect(pasted).toContain(added?.to);
    const copy = kernel.ops.find((op) => op.id === added?.from);
    expect(copy?.positionPx).toEqual({ x: 32, y: 32 });
  });
});
