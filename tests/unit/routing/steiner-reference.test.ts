import { describe, expect, it } from 'vitest';
import { pruneToTree } from '@/lib/solver/routing/link-tree';
import { steinerTree } from '@/lib/solver/routing/steiner-tree';
import { hananInstance, type SteinerInstance, steinerInstances } from './steiner-instance';

// Optima: OR-Library B and SteinLib, see tests/reference/steiner/README.md for each set's source.
const all = [
  ...steinerInstances('or-library-b'),
  ...steinerInstances('lin'),
  ...steinerInstances('vlsi-grid'),
];
const EXACT_TERMINALS = 13;
const exact = all.filter(({ terminals }) => terminals.length <= EXACT_TERMINALS);
const larger = all.filter(({ terminals }) => terminals.length > EXACT_TERMINALS);

function solve({ graph, terminals, linkCost }: SteinerInstance, exactWork: number) {
  const [source = 0, ...targets] = terminals;
  const tree = steinerTree(graph, source, targets, linkCost, { exactWork });
  if (tree === null) throw new Error('The terminals are joined');
  const pruned = pruneToTree(graph, source, targets, tree.links);
  return { ...tree, spans: pruned.length === tree.links.length, targets: targets.length };
}

describe('published Steiner trees', () => {
  it('there are instances for both methods', () => {
    expect([exact.length, larger.length]).toEqual([45, 27]);
  });

  it.each(exact)(
    '$name: exactly $optimum',
    (instance) => {
      const tree = solve(instance, Number.POSITIVE_INFINITY);
      expect([tree.cost, tree.exact, tree.spans]).toEqual([instance.optimum, true, true]);
    },
    60_000,
  );

  it('es10fst01: ten points on the lattice through all of them, exactly 22920745', () => {
    const instance = hananInstance('es10fst01');
    expect(instance.graph.tileCount).toBe(100);
    expect(solve(instance, Number.POSITIVE_INFINITY).cost).toBe(22920745);
  });

  it.each(larger)('$name: by attaching paths at least $optimum and at most 10 % more', (instance) => {
    const tree = solve(instance, 0);
    expect([tree.exact, tree.spans]).toEqual([false, true]);
    expect(tree.cost).toBeGreaterThanOrEqual(instance.optimum);
    expect(tree.cost).toBeLessThanOrEqual(instance.optimum * 1.1);
  });
});
