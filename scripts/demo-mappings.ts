/**
 * Solves the demonstration's mappings again and writes them to db/seed/mappings/solved.json, so that a first start
 * need not wait for the solver. Run: node scripts/bundle.mjs && node dist/demo-mappings.mjs
 */
import { writeFileSync } from 'node:fs';
import { demoFabrics } from '../db/seed/fabrics/index';
import { demoKernels } from '../db/seed/kernels/index';
import type { DemoMapping } from '../db/seed/mappings/demo-mapping';
import { runSolve } from '../lib/solver/worker/client';

type Wanted = Pick<DemoMapping, 'name' | 'kernelSlug' | 'fabricKey' | 'madeBy'>;

const wanted: readonly Wanted[] = [
  { name: 'Scale and clamp, solved', kernelSlug: 'scale-and-clamp', fabricKey: 'gauge', madeBy: 'compiler' },
  { name: 'Wavelet step, solved', kernelSlug: 'wavelet-step', fabricKey: 'hive', madeBy: 'compiler' },
  { name: 'Butterfly, solved', kernelSlug: 'fourier-butterfly', fabricKey: 'hive', madeBy: 'compiler' },
  { name: 'Sort four, solved', kernelSlug: 'sort-four-readings', fabricKey: 'hive', madeBy: 'architect' },
  { name: 'Gradient, solved', kernelSlug: 'gradient', fabricKey: 'slope', madeBy: 'compiler' },
];
const SETTINGS = {
  engine: 'auto',
  timeLimitMs: 20_000,
  seed: 1,
  nodeLimit: null,
  searchTries: null,
} as const;

async function solved(want: Wanted): Promise<DemoMapping> {
  const kernel = demoKernels.find((each) => each.slug === want.kernelSlug)!.kernel;
  const fabric = demoFabrics.find((each) => each.key === want.fabricKey)!.fabric;
  const outcome = await runSolve({ kernel, fabric, pins: {}, objective: 'wire' }, SETTINGS);
  if (outcome.status !== 'optimal' && outcome.status !== 'feasible') {
    throw new Error(`${want.name}: ${outcome.status}, ${outcome.reason}`);
  }
  const { status, objectiveValue, bound, engine, elapsedMs, objective, seed, placement, routes } = outcome;
  console.log(`${want.name}: ${status}, ${objectiveValue} wire hops, bound ${bound}, ${elapsedMs} ms`);
  const made = { by: 'solver', engine, objective, timeLimitMs: SETTINGS.timeLimitMs, seed, status } as const;
  const proof = outcome.certificate ? { certificate: outcome.certificate } : {};
  const provenance = { ...made, objectiveValue, bound, elapsedMs, changedByHand: false, ...proof };
  return { ...want, placement, pins: {}, routes, provenance, kept: true };
}

const mappings: DemoMapping[] = [];
for (const want of wanted) mappings.push(await solved(want));
writeFileSync('db/seed/mappings/solved.json', `${JSON.stringify(mappings, null, 1)}\n`);
