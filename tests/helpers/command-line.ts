/** Runs the command line as a person does, with files of its own. */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

export const fixture = (name: string) => join('tests/fixtures/solver', name);

export function commandLine() {
  const folder = mkdtempSync(join(tmpdir(), 'pinloom-cli-'));
  return {
    fixture,
    /** Five ops in a chain on 6 × 6 tiles. */
    chain: ['--kernel', fixture('scale-and-clamp.kernel.json'), '--fabric', fixture('hive.fabric.json')],
    /** The path of a new file. */
    scratch: (name: string, text: string): string => {
      const path = join(folder, name);
      writeFileSync(path, text);
      return path;
    },
    run: (...args: string[]) => {
      const done = spawnSync(process.execPath, ['scripts/pinloom.mjs', ...args], { encoding: 'utf8' });
      return { code: done.status, stdout: done.stdout, stderr: done.stderr };
    },
    clear: () => rmSync(folder, { recursive: true }),
  };
}
