import type { Tx } from '../../db/client';
import { createFabricVersion } from '../../db/queries/fabric-versions';
import { createFabric } from '../../db/queries/fabrics';
import { createKernelVersion } from '../../db/queries/kernel-versions';
import { createKernel } from '../../db/queries/kernels';
import { createMappingDraft } from '../../db/queries/mapping-drafts';
import { type Fabric, fabricSchema } from '../../lib/fabric/fabric';
import { type Kernel, kernelSchema } from '../../lib/graph/kernel';
import type { Id } from '../../lib/ids';
import type { Result } from '../../lib/result';

/** A load that a store writes back. */
export const gaugeKernel = (name = 'Gauge reading'): Kernel =>
  kernelSchema.parse({
    format: 'pinloom.kernel',
    formatVersion: 1,
    name,
    description: '',
    ops: [
      op('op_load', 'load', { array: 'level', base: 0, stride: 1 }, 0),
      op('op_store', 'store', { array: 'kept', base: 0, stride: 1 }, 200),
    ],
    edges: [{ id: 'edge_1', from: 'op_load', to: 'op_store', port: 'value', distance: 0, initialValues: [] }],
  });

const op = (id: string, kind: string, params: Record<string, string | number>, x: number) => ({
  id,
  kind,
  label: '',
  widthBits: 16,
  params,
  immediates: {},
  positionPx: { x, y: 0 },
});

/** Two rows of two, memory units in the first column. */
export const smallFabric = (name = 'Two by two'): Fabric =>
  fabricSchema.parse({
    format: 'pinloom.fabric',
    formatVersion: 1,
    name,
    description: '',
    rows: 2,
    cols: 2,
    topology: 'mesh',
    units: ['unit_memory', 'unit_arithmetic', 'unit_memory', null],
    channels: 1,
    removedLinks: [],
    addedLinks: [],
    linkChannels: {},
    bufferDepth: 2,
    clock: null,
    memoryBanks: 2,
  });

/** The value of a result that has to be good here. */
export function value<T>(result: Result<T, unknown>): T {
  if (!result.ok) throw new Error(`Refused: ${JSON.stringify(result.error)}`);
  return result.value;
}

/** A kernel and a fabric with a version each, and a bench for them. */
export async function newBench(tx: Tx, of: { workspaceId: Id<'workspace'>; userId: Id<'user'> }) {
  const kernel = await createKernel(tx, { ...of, document: gaugeKernel(), errorCount: 0 });
  const fabric = await createFabric(tx, { ...of, document: smallFabric(), errorCount: 0 });
  const kernelVersion = value(
    await createKernelVersion(tx, { ...of, kernelId: kernel.id, revision: 1, label: 'first' }),
  );
  const fabricVersion = value(
    await createFabricVersion(tx, { ...of, fabricId: fabric.id, revision: 1, label: 'first' }),
  );
  const draft = value(
    await createMappingDraft(tx, {
      ...of,
      name: 'Bench',
      kernelVersionId: kernelVersion.id,
      fabricVersionId: fabricVersion.id,
    }),
  );
  return {
    kernelId: kernel.id,
    fabricId: fabric.id,
    kernelVersionId: kernelVersion.id,
    fabricVersionId: fabricVersion.id,
    draftId: draft.id,
  };
}
