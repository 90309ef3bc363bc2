/** An integer program as CPLEX LP text, which HiGHS, GLPK and CBC read. */
import type { IntegerProgram } from './integer-program';

const WRAP_COLUMNS = 200;

/**
 * Readers differ on bare constants in an objective, and on the sign of one in an MPS file's RHS. So in both formats
 * an offset is the cost of one more column of this name, which is fixed at 1: every reader reports the whole objective.
 */
export const OFFSET_COLUMN = 'offset';

/** Also where there is no other column: HiGHS calls a text without any empty, whatever its rows ask for. */
export const hasOffsetColumn = (program: IntegerProgram): boolean =>
  program.offset !== 0 || program.columnNames.length === 0;

/** Cost: linear in the entries. Two-sided rows become two rows, `_low` and `_high`. `comments` come first. */
export function writeLp(program: IntegerProgram, comments: readonly string[] = []): string {
  const lines = [...commentLines('\\', comments), 'Minimize'];
  const objective: string[] = [];
  program.cost.forEach((cost, column) => {
    if (cost !== 0) objective.push(termText(cost, program.columnNames[column] as string));
  });
  if (program.offset !== 0) objective.push(termText(program.offset, OFFSET_COLUMN));
  if (objective.length === 0) objective.push(`0 ${program.columnNames[0] ?? OFFSET_COLUMN}`);
  lines.push(...wrap(' cost:', objective), 'Subject To');
  for (const one of oneSidedRows(program)) lines.push(...rowText(program, one));
  lines.push('Bounds');
  program.columnNames.forEach((name, column) => {
    const lower = program.lower[column] as number;
    const upper = program.upper[column] as number;
    if (lower === upper) lines.push(` ${name} = ${numberText(lower)}`);
    else if (Number.isFinite(upper)) lines.push(` ${numberText(lower)} <= ${name} <= ${numberText(upper)}`);
    else if (lower !== 0) lines.push(` ${name} >= ${numberText(lower)}`);
  });
  if (hasOffsetColumn(program)) lines.push(` ${OFFSET_COLUMN} = 1`);
  const integers = program.columnNames.filter((_, column) => program.isInteger[column]);
  if (integers.length > 0) lines.push('General', ...wrap('', integers));
  lines.push('End', '');
  return lines.join('\n');
}

export interface OneSidedRow {
  name: string;
  /** The row of the program. */
  row: number;
  sense: '<=' | '=' | '>=';
  side: number;
}

/** The rows as both formats have them: none with two different sides, none without any. */
export function oneSidedRows(program: IntegerProgram): OneSidedRow[] {
  return program.rowNames.flatMap((name, row): OneSidedRow[] => {
    const low = program.rowLower[row] as number;
    const high = program.rowUpper[row] as number;
    if (low === high) return [{ name, row, sense: '=', side: low }];
    const both = Number.isFinite(low) && Number.isFinite(high);
    const sides: OneSidedRow[] = [];
    if (Number.isFinite(low)) sides.push({ name: both ? `${name}_low` : name, row, sense: '>=', side: low });
    if (Number.isFinite(high))
      sides.push({ name: both ? `${name}_high` : name, row, sense: '<=', side: high });
    return sides;
  });
}

function rowText(program: IntegerProgram, { name, row, sense, side }: OneSidedRow): string[] {
  const terms: string[] = [];
  const end = program.rowStart[row + 1] as number;
  for (let entry = program.rowStart[row] as number; entry < end; entry++) {
    const column = program.columnNames[program.entryColumn[entry] as number] as string;
    terms.push(termText(program.entryValue[entry] as number, column));
  }
  if (terms.length === 0) terms.push(`0 ${program.columnNames[0] ?? OFFSET_COLUMN}`);
  return wrap(` ${name}:`, [...terms, `${sense} ${numberText(side)}`]);
}

/** Comment lines that every reader gets past: printable ASCII, the rest as \u escapes, cut off before it is too long. */
export const commentLines = (mark: string, comments: readonly string[]): string[] =>
  comments.map((comment) => {
    const ascii = comment.replace(
      /[^ -~]/g,
      (unit) => `\\u${unit.charCodeAt(0).toString(16).padStart(4, '0')}`,
    );
    return `${mark} ${ascii}`.slice(0, WRAP_COLUMNS).trimEnd();
  });

export const numberText = (value: number): string => String(Object.is(value, -0) ? 0 : value);

const termText = (value: number, name: string): string => {
  const size = Math.abs(value);
  return `${value < 0 ? '-' : '+'} ${size === 1 ? '' : `${numberText(size)} `}${name}`;
};

function wrap(head: string, parts: readonly string[]): string[] {
  const lines: string[] = [];
  let line = head;
  for (const part of parts) {
    if (line.length + part.length > WRAP_COLUMNS) {
      lines.push(line);
      line = '  ';
    }
    line += ` ${part}`;
  }
  lines.push(line);
  return lines;
}
