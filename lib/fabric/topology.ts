/** The links that a topology preset gives, before single ones are removed or added. */
import type { Topology } from './fabric';

/** Steps to the neighbours as [rows down, columns right]: north, east, south, west, then the diagonals. */
const STRAIGHT = [
  [-1, 0],
  [0, 1],
  [1, 0],
  [0, -1],
] as const;
const SLANTED = [
  [-1, 1],
  [1, 1],
  [1, -1],
  [-1, -1],
] as const;

const steps = (topology: Topology) => (topology === 'diagonal' ? [...STRAIGHT, ...SLANTED] : STRAIGHT);
const wrap = (value: number, side: number): number => (value + side) % side;

/**
 * Tile indices (row by row) that the tile at a row and column has a link to, each once and never itself:
 * a torus side of length 1 gives no link, one of length 2 gives a single link each way.
 */
export function presetNeighbours(
  topology: Topology,
  rows: number,
  cols: number,
  row: number,
  col: number,
): number[] {
  const own = row * cols + col;
  const found: number[] = [];
  for (const [down, right] of steps(topology)) {
    const nextRow = topology === 'torus' ? wrap(row + down, rows) : row + down;
    const nextCol = topology === 'torus' ? wrap(col + right, cols) : col + right;
    if (nextRow < 0 || nextRow >= rows || nextCol < 0 || nextCol >= cols) continue;
    const neighbour = nextRow * cols + nextCol;
    if (neighbour !== own && !found.includes(neighbour)) found.push(neighbour);
  }
  return found;
}
