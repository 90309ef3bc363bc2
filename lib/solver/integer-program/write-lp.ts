/** An integer program as CPLEX LP text, which HiGHS, GLPK and CBC read. */
import type { IntegerProgram } from './integer-program';

const WRAP_COLUMNS = 200;

/** Cost: linear in the entries. Two-sided rows become two rows, `_low` and `_high`. */
export function writeLp(program: IntegerProgram): string {
  const lines = ['Minimize'];
  const objective: string[] = [];
  program.cost.forEach((cost, column) => {
    if (cost !== 0) objective.push(termText(cost, program.columnNames[column] as string));
  });
  // Readers differ on bare constants, so an offset is a column that is fixed at 1.
  if (program.offset !== 0) objective.push(termText(program.offset, 'offset'));
  if (objective.length === 0) objective.push(`0 ${program.columnNames[0] ?? 'offset'}`);
  lines.push(...wrap(' cost:', objective), 'Subject To');
  for (let row = 0; row < program.rowNames.length; row++) lines.push(...rowText(program, row));
  lines.push('Bounds');
  program.columnNames.forEach((name, column) => {
    const lower = program.lower[column] as number;
    const upper = program.upper[column] as number;
    if (lower === upper) lines.push(` ${name} = ${numberText(lower)}`);
    else if (Number.isFinite(upper)) lines.push(` ${numberText(lower)} <= ${name} <= ${numberText(upper)}`);
    else if (lower !== 0) lines.push(` ${name} >= ${numberText(lower)}`);
  });
  if (program.offset !== 0) lines.push(' offset = 1');
  const integers = program.columnNames.filter((_, column) => program.isInteger[column]);
  if (integers.length > 0) lines.push('General', ...wrap('', integers));
  lines.push('End', '');
  return lines.join('\n');
}

function rowText(program: IntegerProgram, row: number): string[] {
  const terms: string[] = [];
  const end = program.rowStart[row + 1] as number;
  for (let entry = program.rowStart[row] as number; entry < end; entry++) {
    const name = program.columnNames[program.entryColumn[entry] as number] as string;
    terms.push(termText(program.entryValue[entry] as number, name));
  }
  if (terms.length === 0) terms.push(`0 ${program.columnNames[0] ?? 'offset'}`);
  const name = program.rowNames[row] as string;
  const low = program.rowLower[row] as number;
  const high = program.rowUpper[row] as number;
  const both = Number.isFinite(low) && Number.isFinite(high) && low !== high;
  const line = (label: string, sign: string, side: number) =>
    wrap(` ${label}:`, [...terms, `${sign} ${numberText(side)}`]);
  if (low === high) return line(name, '=', low);
  return [
    ...(Number.isFinite(low) ? line(both ? `${name}_low` : name, '>=', low) : []),
    ...(Number.isFinite(high) ? line(both ? `${name}_high` : name, '<=', high) : []),
  ];
}

const numberText = (value: number): string => String(Object.is(value, -0) ? 0 : value);

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
