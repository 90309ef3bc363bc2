/**
 * The placement model: where ops stand, at the least sum of hops, congestion left out. Its optimum is a lower
 * bound over legal mappings, and exact for paths on every fabric and for nets of two or three terminals on a mesh.
 * docs/solver.md tells each family of rows and its proof.
 */
import type { PlacementInstance } from '../instance';
import { type AssignmentColumns, addAssignment } from './assignment-columns';
import { addGraphPath, addGraphWire } from './graph-costs';
import {
  type FillColumns,
  type IntegerProgram,
  objectiveAt,
  type ProgramBuilder,
  programBuilder,
} from './integer-program';
import { addMeshPath, addMeshWire } from './mesh-costs';

export interface PlacementProgram {
  program: IntegerProgram;
  /** The point of a tiling, for a warm start. */
  encode(tiling: ArrayLike<number>): Float64Array;
  /** The tiling of a point, or null where it is no whole placement. */
  decode(values: ArrayLike<number>): Int32Array | null;
}

/**
 * `star` are the least sums of pair costs by op and tile (see bounds/star-bound.ts); with them, each op's costs
 * are tied to its tile, which lifts the relaxation.
 */
export function placementProgram(instance: PlacementInstance, star: Float64Array | null): PlacementProgram {
  const builder = programBuilder();
  const assignment = addAssignment(builder, instance);
  const add = chooseCosts(instance);
  const fill = add(builder, instance, assignment, star);
  const weights = (instance.objective === 'path' ? instance.pairs : instance.nets).map((one) => one.weight);
  const program = builder.finish({ hasIntegerObjective: weights.every(Number.isInteger) });
  return {
    program,
    decode: assignment.decode,
    encode: (tiling) => {
      const values = new Float64Array(program.columnNames.length);
      assignment.encode(tiling, values);
      fill(tiling, values);
      return values;
    },
  };
}

type AddCosts = (
  builder: ProgramBuilder,
  instance: PlacementInstance,
  assignment: AssignmentColumns,
  star: Float64Array | null,
) => FillColumns;

function chooseCosts(instance: PlacementInstance): AddCosts {
  if (instance.objective === 'path') return instance.isPlainMesh ? addMeshPath : addGraphPath;
  return instance.isPlainMesh ? addMeshWire : addGraphWire;
}

/** The same quantity that the model minimises, straight from a tiling: for tests and for reports. */
export function modelObjective(built: PlacementProgram, tiling: ArrayLike<number>): number {
  return objectiveAt(built.program, built.encode(tiling));
}

/** Entries that the model would have, near enough to refuse it before it is built. */
export function estimateEntries(instance: PlacementInstance): number {
  const sizes = instance.candidates.map((list) => list.length);
  const binaries = sizes.reduce((sum, size) => sum + size, 0);
  const mean = binaries / Math.max(1, instance.opCount);
  const limited = instance.maxHops !== null ? instance.pairs.length * mean * mean : 0;
  const terminals = instance.nets.reduce((sum, net) => sum + (net.consumers.length + 1) ** 2, 0);
  const cones = instance.isPlainMesh ? 0 : mean * 2 * mean * Math.max(terminals, instance.pairs.length);
  return binaries * 6 + limited + cones;
}
