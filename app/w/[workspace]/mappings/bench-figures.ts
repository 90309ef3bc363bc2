import type { BenchFigures } from '@/db/queries/mapping-drafts';
import type { MappingMetrics } from '@/lib/mapping/metrics';

/** The figures that lists show, from a measured document. */
export const benchFigures = (metrics: MappingMetrics): BenchFigures => ({
  placedOps: metrics.placedOps,
  wireHops: metrics.totalWireHops,
  pathHops: metrics.totalPathHops,
  longestPathHops: metrics.longestPathHops,
  linksUsed: metrics.linksUsed,
  fullestLinkNets: metrics.fullestLink?.nets ?? 0,
});
