import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { demoKernels } from '@/db/seed/kernels';
import { compileFabric } from '@/lib/fabric/compile';
import type { Fabric, Topology } from '@/lib/fabric/fabric';
import { newFabric, unitMixPatterns } from '@/lib/fabric/presets';
import type { Kernel } from '@/lib/graph/kernel';
import type { Placement } from '@/lib/mapping/mapping';
import { weaveChains } from '@/lib/mapping/picture/crossings';
import {
  CHANNEL_PX,
  columnChannelX,
  type Point,
  pictureSize,
  rowChannelY,
  tileBox,
} from '@/lib/mapping/picture/fabric-geometry';
import { laneOffsets, type NetPiece } from '@/lib/mapping/picture/lanes';
import { linkWay } from '@/lib/mapping/picture/link-pieces';
import { threadStyle } from '@/lib/mapping/picture/thread-style';
import { type Thread, weaveThreads } from '@/lib/mapping/picture/threads';
import { routePlacement } from '@/lib/solver/routing/route-nets';
import { legalTiles, kernel as small, fabric as smallFabric, tile } from './bench-fixture';

const RUNS = { seed: 20261201, numRuns: 40 };
/** Routing takes most of it; a busy machine takes several times as long. */
const PATIENT_MS = 60_000;

function fabricOf(rows: number, cols: number, topology: Topology): Fabric {
  const mix = unitMixPatterns[0];
  if (!mix) throw new Error('There is no pattern of units');
  return newFabric({
    name: 'f',
    rows,
    cols,
    topology,
    mix,
    channels: 2,
    bufferDepth: 4,
    clock: null,
    memoryBanks: 1,
  });
}

function woven(kernel: Kernel, fabric: Fabric, order: readonly number[]): Thread[] {
  const graph = compileFabric(fabric);
  const placement: Placement = {};
  kernel.ops.forEach((op, i) => {
    const at = graph.tiles[order[i] ?? 0];
    if (at) placement[op.id] = at;
  });
  return weaveThreads(kernel, fabric, graph, {
    placement,
    routes: routePlacement(kernel, graph, placement).routes,
  });
}

/** Whether a point lies in the inside of a tile. */
function insideTile(fabric: Fabric, point: Point): boolean {
  for (let row = 0; row < fabric.rows; row++) {
    for (let col = 0; col < fabric.cols; col++) {
      const box = tileBox(row, col);
      const within =
        point.x > box.x + 0.01 &&
        point.x < box.x + box.width - 0.01 &&
        point.y > box.y + 0.01 &&
        point.y < box.y + box.height - 0.01;
      if (within) return true;
    }
  }
  return false;
}

const someMapping = fc
  .record({
    kernel: fc.constantFrom(...demoKernels.map((demo) => demo.kernel)),
    topology: fc.constantFrom<Topology>('mesh', 'torus', 'diagonal'),
    order: fc.shuffledSubarray(
      Array.from({ length: 36 }, (_, i) => i),
      { minLength: 36 },
    ),
  })
  .map(({ kernel, topology, order }) => {
    const fabric = fabricOf(6, 6, topology);
    return { fabric, threads: woven(kernel, fabric, order) };
  });

describe('threads', { timeout: PATIENT_MS }, () => {
  test('stay in the channels: no point of any line lies inside a tile or outside the picture', () => {
    fc.assert(
      fc.property(someMapping, ({ fabric, threads }) => {
        const size = pictureSize(fabric);
        for (const thread of threads) {
          for (const chain of thread.wholeChains) {
            for (const [i, b] of chain.entries()) {
              const a = chain[i - 1] ?? b;
              for (const part of [0.25, 0.5, 0.75, 1]) {
                const point = { x: a.x + (b.x - a.x) * part, y: a.y + (b.y - a.y) * part };
                expect(insideTile(fabric, point)).toBe(false);
                expect(point.x >= 0 && point.x <= size.width && point.y >= 0 && point.y <= size.height).toBe(
                  true,
                );
              }
            }
          }
        }
      }),
      RUNS,
    );
  });

  test('have one knot for each link', () => {
    fc.assert(
      fc.property(someMapping, ({ threads }) => {
        for (const thread of threads) expect(thread.knots).toHaveLength(thread.links.length);
      }),
      RUNS,
    );
  });

  test('the same mapping gives the same drawing', () => {
    fc.assert(
      fc.property(fc.constantFrom(...demoKernels.map((demo) => demo.kernel)), (kernel) => {
        const order = Array.from({ length: 36 }, (_, i) => i);
        const fabric = fabricOf(6, 6, 'torus');
        expect(woven(kernel, fabric, order)).toEqual(woven(kernel, fabric, order));
      }),
      { ...RUNS, numRuns: 12 },
    );
  });
});

describe('lanes', { timeout: PATIENT_MS }, () => {
  const piece = fc.record({
    net: fc.nat(5),
    line: fc.nat(2),
    from: fc.nat(5),
    length: fc.integer({ min: 1, max: 3 }),
    back: fc.boolean(),
    axis: fc.constantFrom('row' as const, 'column' as const),
  });
  const pieces = fc.array(piece, { maxLength: 24 }).map((list) =>
    list.map(({ net, line, from, length, back, axis }, i): NetPiece => {
      const at = axis === 'row' ? columnChannelX : rowChannelY;
      const [a, b] = [at(from), at(from + length)];
      return { net, line, axis, key: String(i), start: back ? b : a, end: back ? a : b };
    }),
  );

  test('different nets that overlap or meet in one channel keep apart, inside the channel and off its middle', () => {
    fc.assert(
      fc.property(pieces, (list) => {
        const offsets = laneOffsets(list);
        const span = (p: NetPiece) => [Math.min(p.start, p.end), Math.max(p.start, p.end)] as const;
        for (const p of list) {
          const offset = offsets.get(p.key) ?? 0;
          expect(Math.abs(offset)).toBeGreaterThan(0);
          expect(Math.abs(offset)).toBeLessThan(CHANNEL_PX / 2);
          for (const q of list) {
            const meets = span(p)[0] <= span(q)[1] && span(q)[0] <= span(p)[1];
            if (p.net === q.net || p.axis !== q.axis || p.line !== q.line || !meets) continue;
            expect(Math.abs(offset - (offsets.get(q.key) ?? 0))).toBeGreaterThan(1);
          }
        }
      }),
      { ...RUNS, numRuns: 300 },
    );
  });

  test('a net that goes straight on past a router keeps its lane', () => {
    const [a, b, c] = [columnChannelX(0), columnChannelX(1), columnChannelX(2)];
    const offsets = laneOffsets([
      { net: 0, axis: 'row', line: 0, start: a, end: b, key: 'first' },
      { net: 1, axis: 'row', line: 0, start: b, end: a, key: 'other' },
      { net: 0, axis: 'row', line: 0, start: b, end: c, key: 'second' },
    ]);
    expect(offsets.get('first')).toBe(offsets.get('second'));
  });
});

describe('crossings', () => {
  test('of two threads that cross once, one is cut by a gap of 8 px and the other is whole', () => {
    const across = [
      { x: 0, y: 10 },
      { x: 40, y: 10 },
    ];
    const down = [
      { x: 20, y: 0 },
      { x: 20, y: 40 },
    ];
    expect(weaveChains([[across], [down]])).toEqual([
      [
        [
          { x: 0, y: 10 },
          { x: 16, y: 10 },
        ],
        [
          { x: 24, y: 10 },
          { x: 40, y: 10 },
        ],
      ],
      [down],
    ]);
  });

  test('a thread that crosses two others goes under the first and over the second', () => {
    const across = [
      { x: 0, y: 10 },
      { x: 60, y: 10 },
    ];
    const first = [
      { x: 20, y: 0 },
      { x: 20, y: 40 },
    ];
    const second = [
      { x: 40, y: 0 },
      { x: 40, y: 40 },
    ];
    const [cut, whole, under] = weaveChains([[across], [first], [second]]);
    expect([cut?.length, whole?.length, under?.length]).toEqual([2, 1, 2]);
  });
});

describe('ways of links', () => {
  const torus = { rows: 4, cols: 4, topology: 'torus' as const };

  test('a wrap link leaves at one side and comes in at the other', () => {
    const { wraps, pieces } = linkWay(torus, { from: 3, to: 0 });
    expect(wraps).toBe(true);
    expect(pieces.map(({ start, end }) => Math.sign(end - start))).toEqual([1, 1]);
    expect(pieces[0]?.end).toBe(pictureSize(torus).width - 2);
  });

  test('a diagonal link goes along the row and then the column', () => {
    const { wraps, pieces } = linkWay({ ...torus, topology: 'diagonal' }, { from: 0, to: 5 });
    expect(wraps).toBe(false);
    expect(pieces.map(({ axis, line }) => [axis, line])).toEqual([
      ['row', 0],
      ['column', 1],
    ]);
  });
});

test('70 nets in a row have 70 different pairs of colour and rhythm', () => {
  const looks = Array.from({ length: 70 }, (_, net) => JSON.stringify(threadStyle(net)));
  expect(new Set(looks).size).toBe(70);
});

test('a thread of a small mapping begins at its source tile and ends at its consumers', () => {
  const graph = compileFabric(smallFabric);
  const placement = Object.fromEntries(legalTiles.map(([id, at]) => [id, tile(at)])) as Placement;
  const threads = weaveThreads(small, smallFabric, graph, {
    placement,
    routes: routePlacement(small, graph, placement).routes,
  });
  expect(threads.map((thread) => thread.source)).toEqual(['op_left', 'op_right', 'op_product', 'op_sum']);
  const box = tileBox(0, 0);
  const start = threads[0]?.wholeChains[0]?.[0];
  expect(start?.x).toBeCloseTo(box.x + box.width);
  expect(start?.y).toBeCloseTo(box.y + box.height);
});
