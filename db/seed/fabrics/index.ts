/** The three fabrics of the Tarnbrook demonstration: documents only, written to the database by the seed. */
import type { Fabric } from '../../../lib/fabric/fabric';
import { type NewFabricForm, newFabric, unitMixPattern } from '../../../lib/fabric/presets';
import { linkId, tileId } from '../../../lib/fabric/tiles';

export interface DemoFabric {
  /** Stable name for other parts of the seed. */
  key: 'gauge' | 'hive' | 'slope';
  fabric: Fabric;
}

function fromPattern(patternId: string, form: Omit<NewFabricForm, 'mix'>, description: string): Fabric {
  const mix = unitMixPattern(patternId);
  if (!mix) throw new Error(`No unit mix pattern is called ${patternId}`);
  return { ...newFabric({ ...form, mix }), description };
}

/** 8 memory, 2 multiplier, 1 scratchpad, 5 arithmetic; at most 5 hops: floor((2000 − 450) / 300). */
const gauge = fromPattern(
  'memoryEdges',
  {
    name: 'Gauge node, 4 × 4',
    rows: 4,
    cols: 4,
    topology: 'mesh',
    channels: 1,
    bufferDepth: 4,
    clock: { periodPs: 2000, entryDelayPs: 450, hopDelayPs: 300 },
    memoryBanks: 2,
  },
  'The stream gauge: small filters on a coin cell. Memory on both sides, and few multipliers.',
);

/** 12 memory, 4 multiplier, 4 scratchpad, 16 arithmetic; at most 7 hops: floor((2500 − 400) / 300). */
const hive = fromPattern(
  'memoryEdges',
  {
    name: 'Hive microphone, 6 × 6',
    rows: 6,
    cols: 6,
    topology: 'mesh',
    channels: 1,
    bufferDepth: 4,
    clock: { periodPs: 2500, entryDelayPs: 400, hopDelayPs: 300 },
    memoryBanks: 4,
  },
  'The microphone in the hive: wavelet steps, butterflies and sorting networks on a small solar cell.',
);

/** Express links along the middle rows, both ways, four columns at a time. */
const expressLinks = [3, 4].flatMap((row) => {
  const west = tileId(row, 1);
  const east = tileId(row, 6);
  return [linkId(west, east), linkId(east, west)];
});

/** The memory frame's mix with two channels on each link and express links; at most 9 hops: floor((3200 − 500) / 300). */
const slope: Fabric = {
  ...fromPattern(
    'memoryFrame',
    {
      name: 'Slope tiltmeter, 8 × 8',
      rows: 8,
      cols: 8,
      topology: 'mesh',
      channels: 2,
      bufferDepth: 4,
      clock: { periodPs: 3200, entryDelayPs: 500, hopDelayPs: 300 },
      memoryBanks: 8,
    },
    'The tiltmeter on the slope: larger kernels, two words wide on each link, with express links across the middle.',
  ),
  addedLinks: expressLinks,
};

export const demoFabrics: readonly DemoFabric[] = [
  { key: 'gauge', fabric: gauge },
  { key: 'hive', fabric: hive },
  { key: 'slope', fabric: slope },
];
