/** The clock's limit on the length of a path. */
import type { Fabric } from './fabric';

/**
 * Hops that a value can make within one clock period: floor((period − entry delay) / hop delay), or null without
 * a clock. A period shorter than the entry delay gives 0. The division forgives 1e-9 of rounding, so that a
 * period of 0.7 ps with hops of 0.1 ps gives 7, not 6.
 */
export function maxHops(fabric: Pick<Fabric, 'clock'>): number | null {
  if (!fabric.clock) return null;
  const { periodPs, entryDelayPs, hopDelayPs } = fabric.clock;
  const hops = (periodPs - entryDelayPs) / hopDelayPs;
  return hops <= 0 ? 0 : Math.floor(hops * (1 + 1e-9));
}
