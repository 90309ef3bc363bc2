import type { BenchFigures } from '@/db/queries/mapping-drafts';
import type { MappingView } from '@/db/queries/mappings';
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

/** The figures of a bench that begins with a kept mapping: just these, since the rest of its row is not the bench's. */
export const keptFigures = ({
  opCount,
  wireHops,
  pathHops,
  longestPathHops,
  linksUsed,
  fullestLinkNets,
}: MappingView): BenchFigures => ({
  placedOps: opCount,
  wireHops,
  pathHops,
  longestPathHops,
  linksUsed,
  fullestLinkNets,
});
