import { describe, expect, it } from 'vitest';
import { compileFabric } from '@/lib/fabric/compile';
import { UNREACHABLE } from '@/lib/fabric/hop-distances';
import { maxHops } from '@/lib/fabric/max-hops';
import { linkEnds, linkId, parseLink, parseTile, tileAt, tileId, tileLabel } from '@/lib/fabric/tiles';
import { presetNeighbours } from '@/lib/fabric/topology';
import { plainFabric } from './plain-fabric';

const link = (fromRow: number, fromCol: number, toRow: number, toCol: number) =>
  linkId(tileId(fromRow, fromCol), tileId(toRow, toCol));

describe('the links of a fabric', () => {
  it.each([
    ['mesh 1 × 1 has none', 'mesh', 1, 1, 0],
    ['torus 1 × 1 has no link to itself', 'torus', 1, 1, 0],
    ['torus 1 × 2: one each way, not doubled', 'torus', 1, 2, 2],
    ['torus 2 × 2 equals the mesh: 8', 'torus', 2, 2, 8],
    ['torus 1 × 5 is a ring: 10', 'torus', 1, 5, 10],
    ['torus 3 × 3: 9 tiles of 4', 'torus', 3, 3, 36],
    ['torus 2 × 3: 6 tiles of 2 + 1', 'torus', 2, 3, 18],
    ['diagonal 3 × 3: 4·3 + 4·5 + 8', 'diagonal', 3, 3, 40],
    ['mesh 2 × 3: 7 pairs each way', 'mesh', 2, 3, 14],
  ] as const)('%s', (_, topology, rows, cols, count) => {
    const graph = compileFabric(plainFabric(rows, cols, topology));
    expect(graph.links).toHaveLength(count);
    expect(graph.linkIndex.size).toBe(count);
  });

  it('neighbours on a torus two tiles wide: one across, one up and one down, none twice', () => {
    expect(presetNeighbours('torus', 3, 2, 0, 0)).toEqual([4, 1, 2]);
  });

  it('a removed link is gone one way only, an added one is there, with its own channels', () => {
    const fabric = plainFabric(2, 3);
    fabric.removedLinks.push(link(0, 0, 0, 1));
    fabric.addedLinks.push(link(0, 0, 1, 2));
    fabric.linkChannels[link(0, 0, 1, 2)] = 3;
    const graph = compileFabric(fabric);
    expect(graph.linkIndex.has(link(0, 0, 0, 1))).toBe(false);
    expect(graph.linkIndex.has(link(0, 1, 0, 0))).toBe(true);
    expect(graph.links[graph.linkIndex.get(link(0, 0, 1, 2)) ?? -1]).toEqual({
      id: 'r0c0>r1c2',
      from: 0,
      to: 5,
      channels: 3,
    });
    // 0,0 → 0,1 now takes three hops: down, right, up.
    expect(graph.distance[1]).toBe(3);
    expect(graph.distance[5]).toBe(1);
  });

  it('links that mean nothing are left out', () => {
    const fabric = plainFabric(2, 2);
    fabric.addedLinks.push(link(0, 0, 0, 1), link(0, 0, 0, 0), link(0, 0, 5, 5));
    fabric.removedLinks.push(link(0, 0, 1, 1));
    expect(compileFabric(fabric).links).toHaveLength(8);
  });

  it('a router without a way out is unreachable from nowhere but itself', () => {
    const fabric = plainFabric(1, 2);
    fabric.removedLinks.push(link(0, 0, 0, 1));
    expect([...compileFabric(fabric).distance]).toEqual([0, UNREACHABLE, 1, 0]);
  });

  it('out and in lists hold each link once', () => {
    const graph = compileFabric(plainFabric(3, 4, 'torus'));
    for (const lists of [graph.outLinks, graph.inLinks]) {
      expect(lists.flat().sort((a, b) => a - b)).toEqual(graph.links.map((_, i) => i));
    }
  });
});

describe('names of tiles and links', () => {
  it('read back what was written', () => {
    expect(tileAt(tileId(2, 13))).toEqual({ row: 2, col: 13 });
    expect(linkEnds(link(0, 1, 2, 3))).toEqual({ from: 'r0c1', to: 'r2c3' });
  });
  it.each(['', 'r1', 'r01c1', 'r1c100', 'r-1c2', 'R1c1', 'r1c1 '])('"%s" is no tile', (text) => {
    expect(parseTile(text)).toBeNull();
  });
  it.each(['r0c0', 'r0c0>', 'r0c0>r0c1>r0c2', 'r0c0-r0c1'])('"%s" is no link', (text) => {
    expect(parseLink(text)).toBeNull();
  });
  it('people count from 1', () => {
    expect(tileLabel('r2c3')).toBe('row 2, column 3');
  });
  it('refuses a negative row', () => {
    expect(() => tileId(-1, 0)).toThrow(RangeError);
  });
});

describe('hops within a clock period', () => {
  it.each([
    ['(1000 − 300) / 100 = 7', 1000, 300, 100, 7],
    ['(1000 − 300) / 101 = 6.9…', 1000, 300, 101, 6],
    ['(0.7 − 0) / 0.1 is 7 in spite of rounding', 0.7, 0, 0.1, 7],
    ['a period shorter than the entry delay gives 0', 100, 300, 100, 0],
    ['exactly the entry delay gives 0', 300, 300, 100, 0],
  ])('%s', (_, periodPs, entryDelayPs, hopDelayPs, hops) => {
    expect(maxHops({ clock: { periodPs, entryDelayPs, hopDelayPs } })).toBe(hops);
  });
  it('is without limit where there is no clock', () => {
    expect(maxHops({ clock: null })).toBeNull();
  });
});
