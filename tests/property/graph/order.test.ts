import fc from 'fast-check';
import { expect, test } from 'vitest';
import {
  applyEdit,
  canConnect,
  copyFragment,
  edgeId,
  emptyKernel,
  iterationOrder,
  type Kernel,
  layoutEdit,
  netsOf,
  pasteFragment,
  sameIterationCycles,
  validateKernel,
} from '@/lib/graph';
import { anyKernel } from './kernel-arbitrary';

const SEED = 20260302;

/** Whether same-iteration edges close a cycle, by striking out one op at a time. Slow and plain. */
function hasCycle(kernel: Kernel): boolean {
  const left = new Set(kernel.ops.map((op) => op.id));
  for (;;) {
    const free = [...left].find(
      (id) => !kernel.edges.some((edge) => edge.to === id && edge.distance === 0 && left.has(edge.from)),
    );
    if (free === undefined) return left.size > 0;
    left.delete(free);
  }
}

test('the order has every op once, and every edge of distance 0 runs forwards in it', () => {
  fc.assert(
    fc.property(anyKernel(24), (kernel) => {
      const order = iterationOrder(kernel) ?? [];
      expect([...order].sort()).toEqual(kernel.ops.map((op) => op.id).sort());
      for (const edge of kernel.edges.filter((one) => one.distance === 0)) {
        expect(order.indexOf(edge.from)).toBeLessThan(order.indexOf(edge.to));
      }
    }),
    { seed: SEED, numRuns: 300 },
  );
});

test('there is no order exactly when same-iteration edges close a cycle, and each cycle reported is one', () => {
  let cyclic = 0;
  fc.assert(
    fc.property(anyKernel(10), fc.array(fc.nat(100), { maxLength: 3 }), (kernel, picks) => {
      const short = new Set(picks.map((pick) => pick % Math.max(1, kernel.edges.length)));
      const edges = kernel.edges.map((edge, i) => (short.has(i) ? { ...edge, distance: 0 } : edge));
      const changed = { ...kernel, edges };
      expect(iterationOrder(changed) === null).toBe(hasCycle(changed));
      const cycles = sameIterationCycles(changed);
      expect(cycles.length > 0).toBe(hasCycle(changed));
      if (cycles.length > 0) cyclic++;
      for (const cycle of cycles) {
        cycle.edges.forEach((edge, i) => {
          expect(edge.distance).toBe(0);
          expect(edge.to).toBe(cycle.edges[(i + 1) % cycle.edges.length]!.from);
        });
      }
    }),
    { seed: SEED, numRuns: 400 },
  );
  expect(cyclic).toBeGreaterThan(20);
});

test('an edge that canConnect allows adds no problem when it has the distance that the answer asks for', () => {
  let allowed = 0;
  fc.assert(
    fc.property(anyKernel(10), fc.nat(50), fc.nat(50), fc.boolean(), (drawn, a, b, keep) => {
      const target = drawn.edges[b % Math.max(1, drawn.edges.length)];
      const from = drawn.ops[a % Math.max(1, drawn.ops.length)];
      fc.pre(from !== undefined && target !== undefined);
      const { to, port } = target;
      // An operand that has just been set free, or one that is driven still.
      const kernel = keep ? drawn : { ...drawn, edges: drawn.edges.filter((one) => one !== target) };
      const answer = canConnect(kernel, { from: from.id, to, port });
      const edge = { id: edgeId('edge_new'), from: from.id, to, port, initialValues: [] };
      const after = (distance: number) => ({ ...kernel, edges: [...kernel.edges, { ...edge, distance }] });
      const faults = (one: Kernel) =>
        validateKernel(one).filter(
          (problem) =>
            problem.edgeIds.includes(edge.id) &&
            (!RELATIONS.has(problem.code) || problem.message.includes('give it as a constant')),
        );
      expect(faults(after(answer.ok && !answer.needsDistance ? 0 : 1)).length === 0).toBe(answer.ok);
      if (!answer.ok) return;
      allowed++;
      expect(iterationOrder(after(0)) === null).toBe(answer.needsDistance);
    }),
    { seed: SEED, numRuns: 600 },
  );
  expect(allowed).toBeGreaterThan(30);
});

/** Rules about how several operands go together: they are met by what is drawn next. */
const RELATIONS: ReadonlySet<string> = new Set([
  'predicateWithoutFallback',
  'fallbackWithoutPredicate',
  'rateMismatch',
]);

test('every edge that is not a self-edge is in exactly one net, that of its source', () => {
  fc.assert(
    fc.property(anyKernel(20), (kernel) => {
      const nets = netsOf(kernel);
      const bySource = new Map(nets.map((net) => [net.source, net]));
      expect(bySource.size).toBe(nets.length);
      const outer = kernel.edges.filter((edge) => edge.from !== edge.to);
      expect(nets.flatMap((net) => net.edges).sort()).toEqual(outer.map((edge) => edge.id).sort());
      for (const edge of outer) expect(bySource.get(edge.from)?.consumers).toContain(edge.to);
      for (const net of nets) expect(net.consumers).not.toContain(net.source);
    }),
    { seed: SEED, numRuns: 200 },
  );
});

test('a pasted copy has the same ops and connections under new names, and leaves the original alone', () => {
  fc.assert(
    fc.property(anyKernel(12), (kernel) => {
      const fragment = copyFragment(
        kernel,
        kernel.ops.map((op) => op.id),
      );
      const paste = pasteFragment(kernel, fragment, { x: 8, y: -8 });
      const result = applyEdit(kernel, paste.edit);
      if (!result.ok) throw new Error(result.error);
      const both = result.value;
      expect(both.ops.slice(0, kernel.ops.length)).toEqual(kernel.ops);
      const renamed = new Map(paste.opIds.map((id, i) => [id, kernel.ops[i]!.id]));
      expect(new Set(both.ops.map((op) => op.id)).size).toBe(kernel.ops.length * 2);
      const back = both.edges.slice(kernel.edges.length).map((edge, i) => ({
        ...edge,
        id: kernel.edges[i]!.id,
        from: renamed.get(edge.from),
        to: renamed.get(edge.to),
      }));
      expect(back).toEqual(kernel.edges);
    }),
    { seed: SEED, numRuns: 200 },
  );
});

test('layout puts every op right of its same-iteration operands and no two ops on top of each other', () => {
  fc.assert(
    fc.property(anyKernel(14), (kernel) => {
      const placed = applyEdit(
        { ...emptyKernel('k'), ops: kernel.ops, edges: kernel.edges },
        layoutEdit(kernel),
      );
      if (!placed.ok) throw new Error(placed.error);
      const at = new Map(placed.value.ops.map((op) => [op.id, op.positionPx]));
      for (const edge of kernel.edges.filter((one) => one.distance === 0)) {
        expect(at.get(edge.from)!.x).toBeLessThan(at.get(edge.to)!.x);
      }
      const places = placed.value.ops.map((op) => `${op.positionPx.x},${op.positionPx.y}`);
      expect(new Set(places).size).toBe(places.length);
      expect(layoutEdit(placed.value)).toEqual({ type: 'moveOps', moves: [] });
    }),
    { seed: SEED, numRuns: 60 },
  );
});
