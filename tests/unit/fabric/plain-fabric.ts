import type { Fabric, Topology } from '@/lib/fabric/fabric';
import { newFabric, unitMixPattern } from '@/lib/fabric/presets';

/** A fabric of arithmetic PEs, unless a pattern is named; without a clock, unless hops are limited. */
export function plainFabric(
  rows: number,
  cols: number,
  topology: Topology = 'mesh',
  options: { channels?: number; maxHops?: number; pattern?: string } = {},
): Fabric {
  const mix = unitMixPattern(options.pattern ?? 'arithmeticOnly');
  if (!mix) throw new Error(`No pattern ${options.pattern}`);
  const { maxHops } = options;
  return newFabric({
    name: 'Plain cloth',
    rows,
    cols,
    topology,
    mix,
    channels: options.channels ?? 1,
    bufferDepth: 4,
    clock: maxHops === undefined ? null : { periodPs: maxHops * 10, entryDelayPs: 0, hopDelayPs: 10 },
    memoryBanks: 1,
  });
}
