import type { MappingRow, RowStatus } from '@/components/mapping-bench/lists/mapping-rows';
import type { MappingDraftListItem } from '@/db/queries/mapping-drafts';
import type { MappingListItem } from '@/db/queries/mappings';
import type { Provenance } from '@/lib/mapping/mapping';

/** A bench whose content is what was kept of it last says nothing that the kept mapping does not. */
export function changedSinceKept(draft: MappingDraftListItem, kept: readonly MappingListItem[]): boolean {
  const mapping = kept.find((item) => item.id === draft.keptAs);
  return !mapping || draft.updatedAt > mapping.createdAt;
}

const madeBy = (provenance: Provenance): string =>
  provenance.by === 'hand' ? 'hand' : `${provenance.engine}${provenance.changedByHand ? ', then hand' : ''}`;

const common = (item: MappingDraftListItem | MappingListItem) => ({
  id: item.id,
  name: item.name,
  kernel: item.kernelName,
  kernelId: item.kernelId,
  kernelVersion: item.kernelVersion,
  fabric: item.fabricName,
  fabricId: item.fabricId,
  fabricVersion: item.fabricVersion,
  opCount: item.opCount,
  wireHops: item.wireHops,
  pathHops: item.pathHops,
  longestPathHops: item.longestPathHops,
});

export const draftRow = (item: MappingDraftListItem, base: string): MappingRow => ({
  ...common(item),
  href: `${base}/bench/${item.id}`,
  placedOps: item.placedOps,
  status: { kind: 'draft', placedOps: item.placedOps, opCount: item.opCount },
  madeBy: madeBy(item.provenance),
  who: item.updatedByName,
  atMs: item.updatedAt.getTime(),
});

export const mappingRow = (item: MappingListItem, base: string): MappingRow => ({
  ...common(item),
  href: `${base}/${item.id}`,
  placedOps: item.opCount,
  status: keptStatus(item),
  madeBy: item.engine === null ? 'hand' : `${item.engine}${item.changedByHand ? ', then hand' : ''}`,
  who: item.madeByName,
  atMs: item.createdAt.getTime(),
});

/** What was proved speaks of the solve: after a change by hand the mapping is only legal. */
function keptStatus(item: MappingListItem): RowStatus {
  if (item.changedByHand || item.solveStatus === 'by hand') return { kind: 'legal' };
  if (item.solveStatus === 'optimal') return { kind: 'optimal' };
  return { kind: 'feasible', value: item.objectiveValue ?? 0, bound: item.bound ?? 0 };
}
