/** Every demo kernel on every demo fabric, solved as the worker does it (scripts/bench-solve.ts). */
import { spawn } from 'node:child_process';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { z } from 'zod';
import type { Take } from './measurement';

const lineSchema = z.object({
  case: z.string(),
  ops: z.number(),
  engine: z.string(),
  status: z.string(),
  objectiveValue: z.number().nullable(),
  bound: z.number().nullable(),
  elapsedMs: z.number(),
  nodes: z.number(),
  firstMappingMs: z.number().nullable(),
  peakMemoryMb: z.number(),
});

export async function measureSolves(root: string, timeLimitMs: number, take: Take): Promise<void> {
  const child = spawn(
    process.execPath,
    [join(root, 'dist', 'bench-solve.mjs'), '--engines', 'auto', '--time-limit-ms', String(timeLimitMs)],
    { cwd: root, stdio: ['ignore', 'pipe', 'inherit'] },
  );
  for await (const text of createInterface({ input: child.stdout })) {
    const { case: name, elapsedMs, ...details } = lineSchema.parse(JSON.parse(text));
    take({ group: 'solve', name, value: elapsedMs, unit: 'ms', details });
  }
}
