/** The weights that the search for placements works with. What it finds is measured with the true ones. */
import type { PlacementInstance } from './instance';

/**
 * In mean weights. Nothing is free to the search: nets that weigh nothing must still be routed, within the clock's
 * limit and in the room that others leave.
 */
const LEAST_WEIGHT = 0.02;

/** The instance with a mean weight of 1, as the search's prices for full links and long paths are those of hops. */
export function forSearch(instance: PlacementInstance): PlacementInstance {
  const terms = instance.objective === 'path' ? instance.pairs : instance.nets;
  const positive = terms.filter(({ weight }) => weight > 0);
  const mean = positive.reduce((sum, { weight }) => sum + weight, 0) / Math.max(1, positive.length);
  const scaled = <T extends { weight: number }>(list: readonly T[]): T[] =>
    list.map((one) => ({ ...one, weight: Math.max(LEAST_WEIGHT, mean > 0 ? one.weight / mean : 1) }));
  return instance.objective === 'path'
    ? { ...instance, pairs: scaled(instance.pairs) }
    : { ...instance, nets: scaled(instance.nets) };
}
