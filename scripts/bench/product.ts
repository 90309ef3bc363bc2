/** The product as `npm start` runs it, on a database and a port of the measurements' own. */
import { spawn, spawnSync } from 'node:child_process';
import { join } from 'node:path';

export interface Product {
  address: string;
  /** From the start of the process to the line that it is ready, in ms. */
  startedInMs: number;
  stop(): Promise<void>;
}

export interface ProductPlace {
  root: string;
  /** The first port to try. */
  port: number;
}

const environment = ({ root, port }: ProductPlace): NodeJS.ProcessEnv => {
  // An address that this shell happens to name is somebody's data, never ours to write to.
  const { DATABASE_URL: _, PUBLIC_ADDRESS: __, ...rest } = process.env;
  return { ...rest, PINLOOM_STATE: join(root, '.data', 'bench'), PORT: String(port), LOG_LEVEL: 'error' };
};

/** Throws away what an earlier run left. */
export function forgetData(place: ProductPlace): void {
  spawnSync(process.execPath, ['scripts/db.mjs', 'destroy'], { cwd: place.root, env: environment(place) });
}

/** Resolves once the product says that it is ready; rejects with its output when it ends before. */
export async function startProduct(place: ProductPlace): Promise<Product> {
  const startMs = performance.now();
  const child = spawn(process.execPath, ['scripts/start.mjs'], {
    cwd: place.root,
    env: environment(place),
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  let output = '';
  const address = await new Promise<string>((ready, failed) => {
    child.stdout.on('data', (chunk: Buffer) => {
      output += chunk;
      const found = /Pinloom is ready at (\S+)/.exec(output)?.[1];
      if (found) ready(found);
    });
    child.once('exit', (code) => failed(new Error(`The product ended while starting (${code}):\n${output}`)));
  });
  const startedInMs = performance.now() - startMs;
  const stop = () =>
    new Promise<void>((done) => {
      if (child.exitCode !== null) return done();
      child.once('exit', () => done());
      child.kill('SIGTERM');
    });
  return { address, startedInMs, stop };
}
