/** An integer program as free MPS text, which HiGHS, GLPK and CBC read. The same rows and columns as in `writeLp`. */
import type { IntegerProgram } from './integer-program';
import {
  commentLines,
  hasOffsetColumn,
  numberText,
  OFFSET_COLUMN,
  type OneSidedRow,
  oneSidedRows,
} from './write-lp';

const SENSE = { '<=': 'L', '=': 'E', '>=': 'G' } as const;

/**
 * To be minimised, which is what MPS means without an OBJSENSE section. Names must be without spaces; the program
 * must have no row `cost`. Two-sided rows become two rows, so that no RANGES are needed, whose reading differs where
 * the lower side is above the upper one. For the offset see OFFSET_COLUMN. Cost: linear in the entries.
 */
export function writeMps(program: IntegerProgram, comments: readonly string[] = []): string {
  const rows = oneSidedRows(program);
  const lines = [...commentLines('*', comments), 'NAME pinloom FREE', 'ROWS', ' N cost'];
  for (const { name, sense } of rows) lines.push(` ${SENSE[sense]} ${name}`);
  lines.push('COLUMNS');
  pushColumns(lines, program, rows);
  lines.push('RHS');
  for (const { name, side } of rows) if (side !== 0) lines.push(` RHS ${name} ${numberText(side)}`);
  lines.push('BOUNDS');
  program.columnNames.forEach((name, column) => {
    const lower = program.lower[column] as number;
    const upper = program.upper[column] as number;
    lines.push(...boundLines(name, lower, upper, program.isInteger[column] === 1));
  });
  if (hasOffsetColumn(program)) lines.push(...boundLines(OFFSET_COLUMN, 1, 1, false));
  lines.push('ENDATA', '');
  return lines.join('\n');
}

function pushColumns(lines: string[], program: IntegerProgram, rows: readonly OneSidedRow[]): void {
  const entries = entriesByColumn(program, rows);
  let markers = 0;
  const mark = (end: 'INTORG' | 'INTEND') => lines.push(` marker_${++markers} 'MARKER' '${end}'`);
  let isInside = false;
  program.columnNames.forEach((name, column) => {
    const isInteger = program.isInteger[column] === 1;
    if (isInteger !== isInside) mark(isInteger ? 'INTORG' : 'INTEND');
    isInside = isInteger;
    const cost = program.cost[column] as number;
    const own = entries[column] ?? [];
    // A column exists by being listed, so one without any entry is listed with its cost of 0.
    if (cost !== 0 || own.length === 0) lines.push(` ${name} cost ${numberText(cost)}`);
    for (const [row, value] of own) lines.push(` ${name} ${row} ${numberText(value)}`);
  });
  if (isInside) mark('INTEND');
  if (hasOffsetColumn(program)) lines.push(` ${OFFSET_COLUMN} cost ${numberText(program.offset)}`);
}

/** Of each column its entries as row name and value. MPS lists by column what the program keeps by row. */
function entriesByColumn(program: IntegerProgram, rows: readonly OneSidedRow[]): [string, number][][] {
  const entries: [string, number][][] = program.columnNames.map(() => []);
  for (const { name, row } of rows) {
    const end = program.rowStart[row + 1] as number;
    for (let entry = program.rowStart[row] as number; entry < end; entry++) {
      entries[program.entryColumn[entry] as number]?.push([name, program.entryValue[entry] as number]);
    }
  }
  return entries;
}

/** Without a bound some readers take an integer column for a binary one, so these always get an upper bound. */
function boundLines(name: string, lower: number, upper: number, isInteger: boolean): string[] {
  if (lower === upper) return [` FX BND ${name} ${numberText(lower)}`];
  const lines: string[] = [];
  // First, as an upper bound below 0 means "no lower bound" to some readers where none has been given.
  if (lower !== 0) lines.push(` LO BND ${name} ${numberText(lower)}`);
  if (Number.isFinite(upper)) lines.push(` UP BND ${name} ${numberText(upper)}`);
  else if (isInteger) lines.push(` PL BND ${name}`);
  return lines;
}
