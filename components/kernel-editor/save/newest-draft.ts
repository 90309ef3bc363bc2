/**
 * The newest state of each draft that this page knows the server to hold. The browser's Back shows a page as it was first
 * read; without this the editor would open there on a state that has long been saved over.
 */
import type { Kernel } from '@/lib/graph';

export interface SavedDraft {
  kernel: Kernel;
  revision: number;
  savedAtMs: number;
}

const newest = new Map<string, SavedDraft>();

export function noteSaved(kernelId: string, draft: SavedDraft): void {
  const known = newest.get(kernelId);
  if (known === undefined || known.revision <= draft.revision) newest.set(kernelId, draft);
}

/** What was read, or what is known to be newer. */
export function newestDraft(kernelId: string, read: SavedDraft): SavedDraft {
  const known = newest.get(kernelId);
  return known !== undefined && known.revision > read.revision ? known : read;
}
