/**
 * Whoever changes the order of nodes raises ENGINE_VERSION in lib/solver/engine-version.ts and writes the new counts here,
 * so that `pinloom prove` does not ask certificates of the former version for the same nodes.
 */
import { expect, it } from 'vitest';
import { demoFabrics } from '@/db/seed/fabrics';
import { demoKernels } from '@/db/seed/kernels';
import type { Fabric } from '@/lib/fabric/fabric';
import type { Kernel } from '@/lib/graph/kernel';
import { ENGINE_VERSION } from '@/lib/solver/engine-version';
import { defaultSolveOptions } from '@/lib/solver/options';
import { solve } from '@/lib/solver/solve';

const counts = {
  engineVersion: 2,
  nodes: [
    ['surge-detector', 'hive', 'wire', 29],
    ['wavelet-step', 'slope', 'wire', 141],
    ['wavelet-step', 'slope', 'path', 13],
    ['fourier-butterfly', 'hive', 'wire', 26],
    ['fourier-butterfly', 'hive', 'path', 1],
  ],
} as const;

it('the counts below are of the present version', () => {
  expect(counts.engineVersion).toBe(ENGINE_VERSION);
});

it.each(counts.nodes)(
  '%s on %s, %s, takes %d nodes',
  (slug, key, objective, nodes) => {
    const kernel = demoKernels.find((one) => one.slug === slug)?.kernel as Kernel;
    const fabric = demoFabrics.find((one) => one.key === key)?.fabric as Fabric;
    const result = solve(
      { kernel, fabric, pins: {}, objective },
      { ...defaultSolveOptions, nodeLimit: 1e6 },
      { nowMs: () => 0, shouldStop: () => false, onProgress: () => undefined, engines: [] },
    );
    expect(result.ok && result.value.status).toBe('optimal');
    expect(result.ok && result.value.nodes).toBe(nodes);
  },
  30_000,
);
