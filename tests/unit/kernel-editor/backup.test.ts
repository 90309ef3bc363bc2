import { describe, expect, test } from 'vitest';
import {
  type BackupShelf,
  backupKey,
  backupOf,
  findBackups,
  removeBackup,
  writeBackup,
} from '@/components/kernel-editor/save/backup';
import { newestDraft, noteSaved } from '@/components/kernel-editor/save/newest-draft';
import { renamed, smallKernel } from './small-kernel';

function shelfOf(entries: Record<string, string> = {}): BackupShelf {
  const held = new Map(Object.entries(entries));
  return {
    get length() {
      return held.size;
    },
    key: (i) => [...held.keys()][i] ?? null,
    getItem: (key) => held.get(key) ?? null,
    setItem: (key, text) => void held.set(key, text),
    removeItem: (key) => void held.delete(key),
  };
}
const none: ReadonlySet<string> = new Set();

describe('the browser’s own copy', () => {
  test('is found again, the newest first, and only for its kernel', () => {
    const shelf = shelfOf();
    writeBackup(shelf, backupKey('kernel_a', 'tab1'), backupOf(renamed('older'), 3, 100));
    writeBackup(shelf, backupKey('kernel_a', 'tab2'), backupOf(renamed('newer'), 3, 200));
    writeBackup(shelf, backupKey('kernel_b', 'tab3'), backupOf(renamed('other'), 1, 300));
    expect(findBackups(shelf, 'kernel_a', none).map(({ kernel }) => kernel.name)).toEqual(['newer', 'older']);
  });

  test('of a tab that is still open is left to that tab', () => {
    const shelf = shelfOf();
    const key = backupKey('kernel_a', 'tab1');
    writeBackup(shelf, key, backupOf(smallKernel, 3, 100));
    expect(findBackups(shelf, 'kernel_a', new Set([key]))).toEqual([]);
    removeBackup(shelf, key);
    expect(findBackups(shelf, 'kernel_a', none)).toEqual([]);
  });

  test('that cannot be read is passed over', () => {
    const shelf = shelfOf({
      [backupKey('kernel_a', 'cut')]: '{"baseRevision":1,',
      [backupKey('kernel_a', 'foreign')]: '{"baseRevision":1,"atMs":1,"kernel":{"name":"no kernel"}}',
    });
    expect(findBackups(shelf, 'kernel_a', none)).toEqual([]);
  });

  test('a full shelf is told, not thrown', () => {
    const full: BackupShelf = {
      ...shelfOf(),
      setItem: () => {
        throw new Error('QuotaExceededError');
      },
    };
    expect(writeBackup(full, 'k', backupOf(smallKernel, 1, 1))).toBe(false);
  });
});

describe('the newest state that is known', () => {
  const read = { kernel: smallKernel, revision: 3, savedAtMs: 1 };

  test('is what was saved from here, when the page that was read is older', () => {
    const later = { kernel: renamed('later'), revision: 5, savedAtMs: 2 };
    noteSaved('kernel_n1', later);
    expect(newestDraft('kernel_n1', read)).toBe(later);
    // An answer that comes late does not bring an older state back.
    noteSaved('kernel_n1', { ...read, revision: 4 });
    expect(newestDraft('kernel_n1', read)).toBe(later);
  });

  test('is what was read, when somebody has saved since', () => {
    noteSaved('kernel_n2', { ...read, revision: 2 });
    expect(newestDraft('kernel_n2', read)).toBe(read);
    expect(newestDraft('kernel_n3', read)).toBe(read);
  });
});
