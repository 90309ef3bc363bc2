/** What is measured, one line each: a name for people, the figure with its unit, and what else was seen. */
import { mkdirSync, writeFileSync } from 'node:fs';
import { cpus } from 'node:os';
import { dirname } from 'node:path';

export type Unit = 'ms' | 'bytes';

export interface Measurement {
  group: 'start-up' | 'client code' | 'bench screen' | 'kernel editor' | 'solve';
  name: string;
  value: number | null;
  unit: Unit;
  details: Record<string, unknown>;
}

export type Take = (measurement: Measurement) => void;

export interface Ledger {
  /** The time of the yardstick in this run, in ms. */
  yardstickMs: number;
  take: Take;
  all: readonly Measurement[];
}

/** Prints each measurement as one line of JSON as soon as it is taken. */
export function ledger(yardstickMs: number): Ledger {
  const all: Measurement[] = [];
  return {
    yardstickMs,
    all,
    take(measurement) {
      all.push(measurement);
      console.log(JSON.stringify(measurement));
    },
  };
}

/** The middle value; of an even number of values the lower of the two in the middle. Null of none. */
export function median(values: readonly number[]): number | null {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.ceil(sorted.length / 2) - 1] ?? null;
}

/** Writes all measurements with the machine they were taken on. */
export function writeReport(path: string, { all, yardstickMs }: Ledger, takenAt: Date): void {
  const machine = {
    processor: cpus()[0]?.model ?? 'unknown',
    cores: cpus().length,
    node: process.version,
    yardstickMs,
  };
  mkdirSync(dirname(path), { recursive: true });
  const report = { takenAt: takenAt.toISOString(), machine, measurements: all };
  writeFileSync(path, `${JSON.stringify(report, null, 2)}\n`);
}

function figureText({ value, unit }: Measurement): string {
  if (value === null) return '–';
  return unit === 'bytes' ? `${(value / 1000).toFixed(1)} kB` : `${Math.round(value)} ms`;
}

/** How many yardsticks a time is long. */
function ratioText({ value, unit }: Measurement, yardstickMs: number): string {
  return unit === 'ms' && value !== null ? `${(value / yardstickMs).toFixed(1)} ×` : '';
}

function remark({ details }: Measurement): string {
  return Object.entries(details)
    .filter(([, value]) => typeof value === 'string' || typeof value === 'number')
    .map(([key, value]) => `${key} ${value}`)
    .join(', ');
}

/** All measurements as a table of plain text. */
export function tableText({ all, yardstickMs }: Ledger): string {
  const rows = all.map((one) => [
    `${one.group}: ${one.name}`,
    figureText(one),
    ratioText(one, yardstickMs),
    remark(one),
  ]);
  const width = (column: number) => Math.max(0, ...rows.map((row) => row[column]?.length ?? 0));
  const widths = [0, 1, 2].map(width);
  const lines = rows.map(([name = '', figure = '', ratio = '', more = '']) =>
    [name.padEnd(widths[0] ?? 0), figure.padStart(widths[1] ?? 0), ratio.padStart(widths[2] ?? 0), more]
      .join('  ')
      .trimEnd(),
  );
  return [`yardstick (sorting 400 000 numbers): ${yardstickMs.toFixed(1)} ms`, ...lines].join('\n');
}
