/** What is measured, one line each: a name for people, the figure with its unit, and what else was seen. */
import { mkdirSync, writeFileSync } from 'node:fs';
import { cpus } from 'node:os';
import { dirname } from 'node:path';

export type Unit = 'ms' | 'bytes' | 'hops';

export interface Measurement {
  group: 'start-up' | 'client code' | 'bench screen' | 'kernel editor' | 'solve';
  name: string;
  value: number | null;
  unit: Unit;
  details: Record<string, unknown>;
}

export type Take = (measurement: Measurement) => void;

export interface Ledger {
  take: Take;
  all: readonly Measurement[];
}

/** Prints each measurement as one line of JSON as soon as it is taken. */
export function ledger(): Ledger {
  const all: Measurement[] = [];
  return {
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
export function writeReport(path: string, measurements: readonly Measurement[], takenAt: Date): void {
  const machine = {
    processor: cpus()[0]?.model ?? 'unknown',
    cores: cpus().length,
    node: process.version,
  };
  mkdirSync(dirname(path), { recursive: true });
  const report = { takenAt: takenAt.toISOString(), machine, measurements };
  writeFileSync(path, `${JSON.stringify(report, null, 2)}\n`);
}

function figureText({ value, unit }: Measurement): string {
  if (value === null) return '–';
  if (unit === 'bytes') return `${(value / 1024).toFixed(1)} kB`;
  return unit === 'ms' ? `${Math.round(value)} ms` : String(value);
}

function remark({ details }: Measurement): string {
  return Object.entries(details)
    .filter(([, value]) => typeof value === 'string' || typeof value === 'number')
    .map(([key, value]) => `${key} ${value}`)
    .join(', ');
}

/** All measurements as a table of plain text. */
export function tableText(measurements: readonly Measurement[]): string {
  const rows = measurements.map(
    (one) => [`${one.group}: ${one.name}`, figureText(one), remark(one)] as const,
  );
  const nameWidth = Math.max(...rows.map(([name]) => name.length));
  const figureWidth = Math.max(...rows.map(([, figure]) => figure.length));
  return rows
    .map(([name, figure, more]) =>
      `${name.padEnd(nameWidth)}  ${figure.padStart(figureWidth)}  ${more}`.trimEnd(),
    )
    .join('\n');
}
