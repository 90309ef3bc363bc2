import { describe, expect, it } from 'vitest';
import { compileFabric } from '@/lib/fabric/compile';
import type { Topology } from '@/lib/fabric/fabric';
import { fabricStatistics } from '@/lib/fabric/statistics';
import {
  kingMeans,
  meshBisection,
  meshLinks,
  oblongMesh,
  squareNetworks,
  torusBisection,
} from '../../reference/trade-facts-network';
import { plainFabric } from './plain-fabric';

const figures = (side: number, topology: Topology) =>
  fabricStatistics(compileFabric(plainFabric(side, side, topology)));
const ratio = ([top, bottom]: readonly [number, number]): number => top / bottom;

// Source of every expected value: tests/reference/trade-facts-network.ts.
describe('figures of square networks equal the published ones', () => {
  it.each(squareNetworks)('mesh of side $side', (facts) => {
    const found = figures(facts.side, 'mesh');
    expect(found.meanHopsIncludingSelf).toBeCloseTo(ratio(facts.meshMean), 12);
    expect(found.meanHopsExcludingSelf).toBeCloseTo(ratio(facts.meshMeanOthers), 12);
    expect(found.diameterHops).toBe(facts.meshDiameter);
    expect(found.linkCount).toBe(meshLinks(facts.side));
  });

  it.each(squareNetworks)('torus of side $side', (facts) => {
    const found = figures(facts.side, 'torus');
    expect(found.meanHopsIncludingSelf).toBeCloseTo(ratio(facts.torusMean), 12);
    expect(found.meanHopsExcludingSelf).toBeCloseTo(ratio(facts.torusMeanOthers), 12);
    expect(found.diameterHops).toBe(facts.torusDiameter);
  });

  it.each(kingMeans)('eight neighbours, side $side', ({ side, mean }) => {
    expect(figures(side, 'diagonal').meanHopsIncludingSelf).toBeCloseTo(ratio(mean), 12);
  });

  it('a mesh of 4 by 8 has (16−1)/12 + (64−1)/24 = 31/8 mean hops', () => {
    const found = fabricStatistics(compileFabric(plainFabric(oblongMesh.rows, oblongMesh.cols)));
    expect(found.meanHopsIncludingSelf).toBeCloseTo(ratio(oblongMesh.mean), 12);
  });

  it.each([4, 6, 8, 16])('bisection of side %i: mesh 2k, torus 4k channels', (side) => {
    expect(figures(side, 'mesh').bisectionChannels).toBe(meshBisection(side));
    expect(figures(side, 'torus').bisectionChannels).toBe(torusBisection(side));
  });
});
