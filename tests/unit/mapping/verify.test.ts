import { describe, expect, it } from 'vitest';
import { type LinkId, tileIdSchema } from '@/lib/fabric/fabric';
import { linkId, tileId } from '@/lib/fabric/tiles';
import { opId } from '@/lib/graph/ids';
import type { Kernel } from '@/lib/graph/kernel';
import type { Pins, Placement, Routes } from '@/lib/mapping/mapping';
import { verifyMapping, verifyPlacement } from '@/lib/mapping/verify';
import { additions, opAt } from '../../property/mapping/random-mapping';
import { plainFabric } from '../fabric/plain-fabric';

const way = (...tiles: [row: number, col: number][]) =>
  tiles.slice(1).map(([row, col], i) => {
    const [fromRow, fromCol] = tiles[i] ?? [0, 0];
    return linkId(tileId(fromRow, fromCol), tileId(row, col));
  });

/**
 * 3 × 3 mesh, 4 hops. Op 0 at (0,0) feeds 1 at (0,2) and 2 at (2,1) by a trunk along row 0; op 1 feeds 2 and itself.
 *
 *   0 → · → 1
 *       ↓   ↓
 *   ·   ·   ·
 *       ↓   ↓
 *   ·   2 ← ·
 */
interface Case {
  kernel: Kernel;
  placement: Placement;
  routes: Routes;
  pins: Pins;
}
const fabric = () => plainFabric(3, 3, 'mesh', { maxHops: 4 });
const good = (): Case => ({
  kernel: additions(3, [
    [0, 1],
    [0, 2],
    [1, 2],
    [1, 1],
  ]),
  placement: { [opAt(0)]: tileId(0, 0), [opAt(1)]: tileId(0, 2), [opAt(2)]: tileId(2, 1) },
  routes: {
    [opAt(0)]: [...way([0, 0], [0, 1], [0, 2]), ...way([0, 1], [1, 1], [2, 1])],
    [opAt(1)]: way([0, 2], [1, 2], [2, 2], [2, 1]),
  },
  pins: { [opAt(1)]: tileId(0, 2) },
});
const stranger = opId('op_stranger');

const broken: [title: string, change: (mapping: Case) => void, expected: [rule: string, text: string][]][] = [
  [
    'an op that is not placed (its consumer side keeps quiet, its route is refused)',
    (m) => {
      delete m.placement[opAt(0)];
    },
    [
      ['R1', 'sum 0 is not placed'],
      ['R5', 'A route is given for sum 0, which is not placed on the fabric'],
    ],
  ],
  [
    'an op outside the grid',
    (m) => {
      m.placement[opAt(2)] = tileId(3, 1);
    },
    [
      ['R1', 'sum 2 is placed at row 3, column 1, but the fabric has 3 rows and 3 columns'],
      ['R5', 'The route of sum 0 has a loose end at row 2, column 1, where no consumer is'],
      ['R5', 'The route of sum 0 does not reach sum 2 at row 3, column 1'],
      ['R5', 'The route of sum 1 has a loose end at row 2, column 1, where no consumer is'],
      ['R5', 'The route of sum 1 does not reach sum 2 at row 3, column 1'],
    ],
  ],
  [
    'a placement of an op that does not exist',
    (m) => {
      m.placement[stranger] = tileId(1, 0);
    },
    [['R1', 'The placement names op_stranger, which the kernel does not have']],
  ],
  [
    'two ops on one PE',
    (m) => {
      m.placement[opAt(1)] = tileId(2, 1);
      m.pins = {};
      m.routes = { [opAt(0)]: way([0, 0], [0, 1], [1, 1], [2, 1]) };
    },
    [['R2', 'sum 1, sum 2 share the PE at row 2, column 1']],
  ],
  [
    'an op beside its pin',
    (m) => {
      m.pins = { [opAt(1)]: tileId(1, 2) };
    },
    [['R4', 'sum 1 is pinned to row 1, column 2 but is at row 0, column 2']],
  ],
  [
    'a pin of an op that does not exist',
    (m) => {
      m.pins[stranger] = tileId(1, 2);
    },
    [['R4', 'A pin names op_stranger, which the kernel does not have']],
  ],
  [
    'a route that is missing',
    (m) => {
      delete m.routes[opAt(1)];
    },
    [['R5', 'The route of sum 1 does not reach sum 2 at row 2, column 1']],
  ],
  [
    'a link that the fabric does not have',
    (m) => {
      m.routes[opAt(1)] = way([0, 2], [1, 1], [2, 1]);
    },
    [
      [
        'R5',
        'The route of sum 1 takes the link row 0, column 2 to row 1, column 1, which the fabric does not have',
      ],
      [
        'R5',
        'The route of sum 1 has links that its source does not lead to: row 1, column 1 to row 2, column 1',
      ],
      ['R5', 'The route of sum 1 does not reach sum 2 at row 2, column 1'],
      ['R6', 'The link row 1, column 1 to row 2, column 1 has 1 channel but carries 2 nets: sum 0, sum 1'],
    ],
  ],
  [
    'a loose end',
    (m) => {
      m.routes[opAt(1)]?.push(...way([1, 2], [1, 1]));
    },
    [['R5', 'The route of sum 1 has a loose end at row 1, column 1, where no consumer is']],
  ],
  [
    'a router entered twice',
    (m) => {
      m.routes[opAt(1)]?.push(...way([1, 2], [1, 1], [1, 0], [2, 0], [2, 1]));
    },
    [['R5', 'The route of sum 1 enters the router at row 2, column 1 2 times']],
  ],
  [
    'a loop back to the source',
    (m) => {
      m.routes[opAt(1)]?.push(...way([1, 2], [0, 2]));
    },
    [['R5', 'The route of sum 1 comes back to its source at row 0, column 2']],
  ],
  [
    'a circle apart from the source',
    (m) => {
      m.routes[opAt(1)]?.push(...way([1, 0], [2, 0], [1, 0]));
    },
    [
      [
        'R5',
        'The route of sum 1 has links that its source does not lead to: row 1, column 0 to row 2, column 0; row 2, column 0 to row 1, column 0',
      ],
    ],
  ],
  [
    'a link named twice',
    (m) => {
      m.routes[opAt(1)]?.push(...way([0, 2], [1, 2]));
    },
    [['R5', 'The route of sum 1 names the link row 0, column 2 to row 1, column 2 twice']],
  ],
  [
    'a route of an op without consumers',
    (m) => {
      m.routes[opAt(2)] = way([2, 1], [2, 0]);
    },
    [['R5', 'A route is given for sum 2, which feeds no other op']],
  ],
  [
    'a route of an op that does not exist, with a malformed link',
    (m) => {
      m.routes[stranger] = ['nonsense' as LinkId];
    },
    [['R5', 'A route is given for op_stranger, which the kernel does not have']],
  ],
];

describe('the verifier', () => {
  it('accepts the legal mapping', () => {
    expect(verifyMapping(good().kernel, fabric(), good())).toEqual([]);
  });

  it.each(broken)('names %s', (_, change, expected) => {
    const mapping = good();
    change(mapping);
    const found = verifyMapping(mapping.kernel, fabric(), mapping);
    expect(found.map(({ rule, message }) => [rule, message])).toEqual(expected);
  });

  it('R3: an addition on a memory PE', () => {
    const cloth = plainFabric(3, 3, 'mesh', { maxHops: 4, pattern: 'memoryEdges' });
    const found = verifyPlacement(good().kernel, cloth, good());
    expect(found.map(({ rule }) => rule)).toEqual(['R3', 'R3']);
    expect(found[0]?.message).toBe(
      'The PE at row 0, column 0 is a unit Memory: it cannot do sum 0 (Add); Arithmetic can',
    );
  });

  it('R1: a router without a PE', () => {
    const cloth = fabric();
    cloth.units[0] = null;
    expect(verifyPlacement(good().kernel, cloth, good()).map(({ message }) => message)).toEqual([
      'sum 0 is placed at row 0, column 0, which has a router but no PE',
    ]);
  });

  it('R6: a link with one channel and two nets, and none with two', () => {
    const mapping = good();
    mapping.routes[opAt(1)] = way([0, 2], [1, 2], [1, 1], [2, 1]);
    const found = verifyMapping(mapping.kernel, fabric(), mapping);
    expect(found.map(({ rule, linkIds, opIds }) => [rule, linkIds, opIds])).toEqual([
      ['R6', way([1, 1], [2, 1]), [opAt(0), opAt(1)]],
    ]);
    const wide = plainFabric(3, 3, 'mesh', { maxHops: 4, channels: 2 });
    expect(verifyMapping(mapping.kernel, wide, mapping)).toEqual([]);
  });

  it('R7: 3 hops where the clock allows 2, for both connections', () => {
    const found = verifyMapping(good().kernel, plainFabric(3, 3, 'mesh', { maxHops: 2 }), good());
    expect(found.map(({ rule, message }) => [rule, message])).toEqual([
      ['R7', 'sum 0 to sum 2 takes 3 hops; the clock allows 2'],
      ['R7', 'sum 1 to sum 2 takes 3 hops; the clock allows 2'],
    ]);
  });

  it('a partial mapping: unplaced ops are no violation, what is placed is checked', () => {
    const mapping = good();
    delete mapping.placement[opAt(1)];
    mapping.pins = { [opAt(1)]: tileIdSchema.parse('r0c2') };
    mapping.routes = { [opAt(0)]: way([0, 0], [0, 1], [1, 1], [2, 1]) };
    expect(verifyMapping(mapping.kernel, fabric(), mapping, { partial: true })).toEqual([]);
    expect(verifyMapping(mapping.kernel, fabric(), mapping).map(({ rule }) => rule)).toEqual(['R1', 'R4']);
    mapping.routes = {};
    expect(
      verifyMapping(mapping.kernel, fabric(), mapping, { partial: true }).map(({ rule }) => rule),
    ).toEqual(['R5']);
  });
});
