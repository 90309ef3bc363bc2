/**
 * The browser's own copy of edits that the server has not acknowledged: it outlives a crash of the page and a server
 * that is down. One entry for each tab, so that two tabs never write over each other's.
 */
import { z } from 'zod';
import { type Kernel, kernelSchema } from '@/lib/graph';

/** What a backup needs of localStorage. */
export type BackupShelf = Pick<Storage, 'getItem' | 'setItem' | 'removeItem' | 'key' | 'length'>;

const backupSchema = z.strictObject({
  baseRevision: z.number().int().min(1),
  atMs: z.number(),
  kernel: kernelSchema,
});
export type Backup = z.infer<typeof backupSchema>;
export interface FoundBackup extends Backup {
  key: string;
}

const prefix = (kernelId: string): string => `pinloom.unsaved.${kernelId}.`;

export const backupKey = (kernelId: string, tab: string): string => prefix(kernelId) + tab;

/** False when the shelf is full or switched off; the edits are then only in the page. */
export function writeBackup(shelf: BackupShelf, key: string, backup: Backup): boolean {
  try {
    shelf.setItem(key, JSON.stringify(backup));
    return true;
  } catch {
    return false;
  }
}

export function removeBackup(shelf: BackupShelf, key: string): void {
  try {
    shelf.removeItem(key);
  } catch {
    // A shelf that is switched off holds nothing to remove.
  }
}

/** The backups of a kernel, newest first, but those of tabs that are still open. What cannot be read is passed over. */
export function findBackups(
  shelf: BackupShelf,
  kernelId: string,
  openKeys: ReadonlySet<string>,
): FoundBackup[] {
  const keys = Array.from({ length: shelf.length }, (_, i) => shelf.key(i) ?? '');
  return keys
    .filter((key) => key.startsWith(prefix(kernelId)) && !openKeys.has(key))
    .flatMap((key) => {
      const backup = parseBackup(shelf.getItem(key));
      return backup === null ? [] : [{ ...backup, key }];
    })
    .sort((a, b) => b.atMs - a.atMs);
}

function parseBackup(text: string | null): Backup | null {
  try {
    const parsed = backupSchema.safeParse(JSON.parse(text ?? ''));
    return parsed.success ? parsed.data : null;
  } catch {
    return null;
  }
}

export const backupOf = (kernel: Kernel, baseRevision: number, atMs: number): Backup => ({
  baseRevision,
  atMs,
  kernel,
});
