/** A line of the list of mappings: a bench that is worked on, or a kept mapping. */
export interface MappingRow {
  id: string;
  href: string;
  name: string;
  kernel: string;
  kernelId: string;
  kernelVersion: number;
  fabric: string;
  fabricId: string;
  fabricVersion: number;
  opCount: number;
  placedOps: number;
  wireHops: number;
  pathHops: number;
  longestPathHops: number;
  status: RowStatus;
  madeBy: string;
  who: string;
  /** Milliseconds since 1970. */
  atMs: number;
}

export type RowStatus =
  | { kind: 'draft'; placedOps: number; opCount: number }
  | { kind: 'legal' }
  | { kind: 'optimal' }
  | { kind: 'feasible'; value: number; bound: number };

export const statusNames = {
  draft: 'Draft',
  legal: 'Legal',
  optimal: 'Proved optimal',
  feasible: 'Feasible',
} as const;

export function statusText(status: RowStatus): string {
  switch (status.kind) {
    case 'draft':
      return `draft, ${status.placedOps} of ${status.opCount} placed`;
    case 'legal':
      return 'legal';
    case 'optimal':
      return 'proved optimal';
    case 'feasible':
      return status.bound > 0
        ? `feasible, gap ${Math.ceil((100 * (status.value - status.bound)) / status.value)} %`
        : 'feasible';
  }
}
