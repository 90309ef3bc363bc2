import fc from 'fast-check';
import { expect, test } from 'vitest';
import { applyEdit, type GraphEdit, invertEdit, type Kernel, kernelSchema } from '@/lib/graph';
import { editFor, editSeeds } from './edit-arbitrary';
import { anyKernel } from './kernel-arbitrary';

const SEED = 20260301;

function deepFreeze(kernel: Kernel): Kernel {
  for (const item of [...kernel.ops, ...kernel.edges]) Object.freeze(item);
  Object.freeze(kernel.ops);
  Object.freeze(kernel.edges);
  return Object.freeze(kernel);
}

test('the inverse of every edit that can be made takes it back, and no edit changes the kernel it is given', () => {
  let made = 0;
  fc.assert(
    fc.property(anyKernel(), editSeeds, (start, seeds) => {
      const undo: { edit: GraphEdit; before: Kernel }[] = [];
      let kernel = deepFreeze(start);
      for (const seed of seeds) {
        const edit = editFor(kernel, seed);
        const result = applyEdit(kernel, edit);
        if (!result.ok) continue;
        made++;
        undo.push({ edit: invertEdit(kernel, edit), before: kernel });
        kernel = deepFreeze(result.value);
        expect(kernelSchema.safeParse(kernel).success).toBe(true);
      }
      for (const { edit, before } of undo.reverse()) {
        const back = applyEdit(kernel, edit);
        if (!back.ok) throw new Error(back.error);
        expect(back.value).toEqual(before);
        kernel = deepFreeze(back.value);
      }
    }),
    { seed: SEED, numRuns: 300 },
  );
  expect(made).toBeGreaterThan(500);
});

test('a sequence of edits as one batch gives the same kernel and one inverse for all of it', () => {
  fc.assert(
    fc.property(anyKernel(), editSeeds, (start, seeds) => {
      const edits: GraphEdit[] = [];
      let kernel = start;
      for (const seed of seeds) {
        const edit = editFor(kernel, seed);
        const result = applyEdit(kernel, edit);
        if (!result.ok) continue;
        edits.push(edit);
        kernel = result.value;
      }
      const batch: GraphEdit = { type: 'batch', edits };
      const together = applyEdit(start, batch);
      expect(together).toEqual({ ok: true, value: kernel });
      expect(applyEdit(kernel, invertEdit(start, batch))).toEqual({ ok: true, value: start });
    }),
    { seed: SEED, numRuns: 200 },
  );
});
