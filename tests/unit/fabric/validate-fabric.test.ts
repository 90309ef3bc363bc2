import { describe, expect, it } from 'vitest';
import type { Fabric } from '@/lib/fabric/fabric';
import { unitIdSchema } from '@/lib/fabric/fabric';
import { linkId, tileId } from '@/lib/fabric/tiles';
import { validateFabric } from '@/lib/fabric/validate-fabric';
import { plainFabric } from './plain-fabric';

const across = linkId(tileId(0, 0), tileId(0, 1));
const slant = linkId(tileId(0, 0), tileId(1, 1));
const outside = linkId(tileId(0, 1), tileId(0, 2));

const cases: [title: string, change: (fabric: Fabric) => void, code: string, severity: string][] = [
  ['an added link to a tile outside', (f) => f.addedLinks.push(outside), 'linkOutside', 'error'],
  ['a removed link outside', (f) => f.removedLinks.push(outside), 'linkOutside', 'error'],
  ['an added link that the preset has', (f) => f.addedLinks.push(across), 'addedLinkExists', 'error'],
  [
    'an added link to itself',
    (f) => f.addedLinks.push(linkId(tileId(0, 0), tileId(0, 0))),
    'selfLink',
    'error',
  ],
  ['a removed link that was never there', (f) => f.removedLinks.push(slant), 'removedLinkAbsent', 'error'],
  ['a link added twice', (f) => f.addedLinks.push(slant, slant), 'linkRepeated', 'error'],
  [
    'channels of an absent link',
    (f) => {
      f.linkChannels[slant] = 2;
    },
    'channelsOfAbsentLink',
    'error',
  ],
  [
    'an unknown unit',
    (f) => {
      f.units[3] = unitIdSchema.parse('unit_unheard_of');
    },
    'unknownUnit',
    'error',
  ],
  ['no PE at all', (f) => f.units.fill(null), 'noUnits', 'error'],
  [
    'a corner that cannot be left',
    (f) => f.removedLinks.push(across, linkId(tileId(0, 0), tileId(1, 0))),
    'disconnected',
    'warning',
  ],
  [
    'a corner that can be left but not entered',
    (f) => f.removedLinks.push(linkId(tileId(0, 1), tileId(0, 0)), linkId(tileId(1, 0), tileId(0, 0))),
    'disconnected',
    'warning',
  ],
  [
    'a clock without time for a hop',
    (f) => {
      f.clock = { periodPs: 10, entryDelayPs: 5, hopDelayPs: 6 };
    },
    'noHopsInPeriod',
    'warning',
  ],
];

describe('problems of a fabric', () => {
  it.each(cases)('%s', (_, change, code, severity) => {
    const fabric = plainFabric(2, 2);
    change(fabric);
    expect(validateFabric(fabric).map((problem) => [problem.code, problem.severity])).toEqual([
      [code, severity],
    ]);
  });
  it('a whole mesh has none', () => {
    expect(validateFabric(plainFabric(2, 2))).toEqual([]);
  });
  it('a link removed and added again, with channels, is no problem', () => {
    const fabric = plainFabric(2, 2);
    fabric.removedLinks.push(across);
    fabric.addedLinks.push(across);
    fabric.linkChannels[across] = 4;
    expect(validateFabric(fabric)).toEqual([]);
  });
});
