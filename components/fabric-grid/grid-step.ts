import type { GridSize } from '@/lib/mapping/picture/fabric-geometry';

/** The tile that a key leads to from another, without wrapping; null for keys that do not move. */
export function gridStep(
  { rows, cols }: GridSize,
  tile: number,
  key: string,
  withCtrl: boolean,
): number | null {
  const row = Math.floor(tile / cols);
  const col = tile % cols;
  const at = (toRow: number, toCol: number) =>
    Math.min(rows - 1, Math.max(0, toRow)) * cols + Math.min(cols - 1, Math.max(0, toCol));
  switch (key) {
    case 'ArrowUp':
      return at(row - 1, col);
    case 'ArrowDown':
      return at(row + 1, col);
    case 'ArrowLeft':
      return at(row, col - 1);
    case 'ArrowRight':
      return at(row, col + 1);
    case 'Home':
      return withCtrl ? 0 : at(row, 0);
    case 'End':
      return withCtrl ? rows * cols - 1 : at(row, cols - 1);
    default:
      return null;
  }
}
