/** Named patterns of units as data. Each gives a sensible mix for every size from 1 × 1 to 64 × 64. */
import type { UnitId } from './fabric';
import { arithmeticUnit, memoryUnit, multiplierUnit, scratchpadUnit } from './unit-library';

export interface PatternCell {
  row: number;
  col: number;
  rows: number;
  cols: number;
}

export interface UnitMixPattern {
  id: string;
  label: string;
  description: string;
  unitAt(cell: PatternCell): UnitId | null;
}

const ARITHMETIC = arithmeticUnit.id;
const MULTIPLIER = multiplierUnit.id;
const MEMORY = memoryUnit.id;
const SCRATCHPAD = scratchpadUnit.id;

/** Positions along one side: both ends where it has three or more, else every other place of the long side. */
function atEnd(position: number, length: number, along: number): boolean {
  if (length >= 3) return position === 0 || position === length - 1;
  return position === 0 && along % 2 === 0;
}

/**
 * Multipliers on a knight's-move lattice (one in five, no two in a row or column of any 5 × 5 block), scratchpads in
 * every fifth row, the rest arithmetic.
 */
function core({ row, col }: PatternCell): UnitId {
  if ((2 * row - col) % 5 === 0) return MULTIPLIER;
  return row % 5 === 0 && (col % 5 === 1 || col % 5 === 4) ? SCRATCHPAD : ARITHMETIC;
}

const turned = ({ row, col, rows, cols }: PatternCell): PatternCell => ({
  row: col,
  col: row,
  rows: cols,
  cols: rows,
});

const memoryEdges = (cell: PatternCell): UnitId =>
  atEnd(cell.col, cell.cols, cell.row) ? MEMORY : core(cell);

function memoryFrame(cell: PatternCell): UnitId {
  const { row, col, rows, cols } = cell;
  if (rows < 3 || cols < 3) return memoryEdges(cell);
  const onFrame = row === 0 || row === rows - 1 || col === 0 || col === cols - 1;
  // Every other place of the frame: a full frame would leave a small grid with little else.
  if (onFrame) return (row + col) % 2 === 0 ? MEMORY : ARITHMETIC;
  return core(cell);
}

function memorySpine(cell: PatternCell): UnitId {
  const { row, col, cols } = cell;
  const middle = Math.floor((cols - 1) / 2);
  const width = cols >= 6 ? 2 : 1;
  if (col < middle || col >= middle + width) return core(cell);
  return cols === 1 && row % 2 === 1 ? ARITHMETIC : MEMORY;
}

function checker({ row, col }: PatternCell): UnitId {
  if ((row + col) % 2 === 1) return ARITHMETIC;
  if (row % 2 === 0) return MEMORY;
  return (row - 1) % 4 === 0 && (col - 1) % 4 === 0 ? SCRATCHPAD : MULTIPLIER;
}

function stripes({ row, col }: PatternCell): UnitId {
  switch (col % 4) {
    case 0:
      return row % 4 === 3 ? SCRATCHPAD : MEMORY;
    case 2:
      return row % 2 === 0 ? MULTIPLIER : ARITHMETIC;
    default:
      return ARITHMETIC;
  }
}

export const unitMixPatterns: readonly UnitMixPattern[] = [
  {
    id: 'memoryEdges',
    label: 'Memory on the sides',
    description: 'Memory in the first and last column; multipliers spread between, one PE in five.',
    unitAt: memoryEdges,
  },
  {
    id: 'memoryRows',
    label: 'Memory above and below',
    description: 'Memory in the first and last row; multipliers spread between, one PE in five.',
    unitAt: (cell) => memoryEdges(turned(cell)),
  },
  {
    id: 'memoryFrame',
    label: 'Memory all round',
    description: 'Memory on every other place of the rim, arithmetic between; multipliers inside.',
    unitAt: memoryFrame,
  },
  {
    id: 'memorySpine',
    label: 'Memory down the middle',
    description: 'One or two columns of memory in the middle, within few hops of every other PE.',
    unitAt: memorySpine,
  },
  {
    id: 'checker',
    label: 'Checker',
    description: 'Arithmetic on every other PE; memory, multipliers and a few scratchpads between.',
    unitAt: checker,
  },
  {
    id: 'stripes',
    label: 'Stripes',
    description:
      'Columns by turns: memory with scratchpads, arithmetic, multipliers with arithmetic, arithmetic.',
    unitAt: stripes,
  },
  {
    id: 'arithmeticOnly',
    label: 'Arithmetic only',
    description: 'The same unit everywhere: a plain cloth to paint on. It cannot read or write memory yet.',
    unitAt: () => ARITHMETIC,
  },
];
