/** What is to be placed, and whether it can be tried at all. */
import { z } from 'zod';
import { compileFabric, type FabricGraph } from '../fabric/compile';
import { type Fabric, fabricSchema } from '../fabric/fabric';
import { type UnitLibrary, type UnitSpec, unitLibrary } from '../fabric/unit-library';
import { type Kernel, kernelSchema, type OpId } from '../graph/kernel';
import { validateKernel } from '../graph/validate';
import {
  type Objective,
  objectives,
  type Pins,
  type Placement,
  pinsSchema,
  placementSchema,
} from '../mapping/mapping';
import { type Weights, weightFaults, weightsSchema } from '../mapping/weights';
import { err, ok, type Result } from '../result';

export interface PlacementProblem {
  kernel: Kernel;
  fabric: Fabric;
  pins: Pins;
  objective: Objective;
  /** Of nets (`wire`) or connections (`path`) in the objective; 1 where none is named. */
  weights?: Weights;
  /** A placement to start from, whole or partial. Parts that are not legal are left out. */
  start?: Placement;
  /** Asks for another mapping than these instead of for the best one. */
  another?: AnotherAsk;
  /** No legal mapping is cheaper, as was proved before for this kernel, fabric and objective and no more than these pins. */
  provenBound?: number;
  /** The workspace's own units, besides the built-in ones. */
  units?: readonly UnitSpec[];
}

/** Each is held against everything that is found. */
export const MOST_AVOIDED = 50;

export const anotherSchema = z.strictObject({
  /** The other mapping costs at most this. */
  objectiveValue: z.number().nonnegative(),
  /** Whole placements: neither they nor their mirror images are an answer. */
  than: z.array(placementSchema).max(MOST_AVOIDED),
});
export type AnotherAsk = z.infer<typeof anotherSchema>;

export interface CheckedProblem extends PlacementProblem {
  graph: FabricGraph;
  library: UnitLibrary;
}

/** Sizes that the solver takes on. Above them it says so instead of running out of memory. */
export const PROBLEM_LIMITS = { ops: 2000, tiles: 4096, candidates: 8_200_000 } as const;

/** What is wrong with the input, in sentences that say what to change. */
export interface BadInput {
  code: 'bad input';
  messages: string[];
  faults: InputFault[];
}

export interface InputFault {
  part: 'kernel' | 'fabric' | 'pins' | 'start' | 'weights' | 'objective' | 'another' | 'provenBound';
  message: string;
  /** The op or connection that is at fault, where it is one. */
  id: string | null;
}

const badInput = (faults: InputFault[]): BadInput => ({
  code: 'bad input',
  messages: faults.map((fault) => fault.message),
  faults,
});

/** Checks shapes, the kernel's rules, and that pins and weights name what exists. Never throws. */
export function checkProblem(problem: PlacementProblem): Result<CheckedProblem, BadInput> {
  const shape = shapeFaults(problem);
  if (shape.length > 0) return err(badInput(shape));
  const { kernel, fabric, pins } = problem;
  const faults: InputFault[] = validateKernel(kernel)
    .filter((found) => found.severity === 'error')
    .map((found) => ({
      part: 'kernel',
      message: found.message,
      id: found.edgeIds[0] ?? found.opIds[0] ?? null,
    }));
  const graph = compileFabric(fabric);
  const opIds = new Set<string>(kernel.ops.map((op) => op.id));
  for (const [id, tile] of Object.entries(pins)) {
    const pinFault = (message: string) => faults.push({ part: 'pins', message, id });
    if (!opIds.has(id)) {
      pinFault(`A pin names the op ${id}, which the kernel does not have: remove the pin.`);
    }
    if (graph.tileIndex(tile) < 0) {
      const size = `${fabric.rows} rows and ${fabric.cols} columns`;
      pinFault(`${id} is pinned to ${tile}, but the fabric has ${size}: pin it to a tile of the fabric.`);
    }
  }
  faults.push(...anotherFaults(problem, graph));
  faults.push(
    ...weightFaults(kernel, problem.weights ?? {}).map((fault) => ({ part: 'weights' as const, ...fault })),
  );
  if (graph.tileCount * kernel.ops.length > PROBLEM_LIMITS.candidates) {
    const message = `${kernel.ops.length} ops on ${graph.tileCount} tiles are more than the solver takes on: use a smaller fabric or kernel.`;
    faults.push({ part: 'kernel', message, id: null });
  }
  if (faults.length > 0) return err(badInput(faults));
  return ok({ ...problem, graph, library: unitLibrary(problem.units ?? []) });
}

/** What is to be avoided has to be whole: a part of a placement is no placement that could be found again. */
function anotherFaults({ kernel, another }: PlacementProblem, graph: FabricGraph): InputFault[] {
  return (another?.than ?? []).flatMap((placement, i) => {
    const missing = kernel.ops.find((op) => graph.tileIndex(placement[op.id] ?? '') < 0);
    if (!missing) return [];
    const at = placement[missing.id];
    const why = at === undefined ? 'gives it no tile' : `puts it on ${at}, which the fabric does not have`;
    const message = `${missing.id}: placement ${i + 1} of those to avoid ${why}: give whole placements of this kernel on this fabric.`;
    return [{ part: 'another' as const, message, id: missing.id }];
  });
}

function shapeFaults(problem: PlacementProblem): InputFault[] {
  const parts = [
    ['kernel', kernelSchema.safeParse(problem.kernel)],
    ['fabric', fabricSchema.safeParse(problem.fabric)],
    ['pins', pinsSchema.safeParse(problem.pins)],
    ['start', placementSchema.safeParse(problem.start ?? {})],
    ['another', anotherSchema.optional().safeParse(problem.another)],
    ['provenBound', z.number().nonnegative().optional().safeParse(problem.provenBound)],
    ['weights', weightsSchema.safeParse(problem.weights ?? {})],
  ] as const;
  const faults: InputFault[] = parts.flatMap(([part, parsed]) =>
    parsed.success
      ? []
      : parsed.error.issues.slice(0, 10).map((issue) => ({
          part,
          message: `${[part, ...issue.path].join('.')}: ${issue.message}`,
          // A weight's fault is the number's; its name tells the place.
          id: part === 'weights' && issue.path.length === 2 ? String(issue.path[1]) : null,
        })),
  );
  if (!objectives.includes(problem.objective)) {
    faults.push({ part: 'objective', message: `objective: one of ${objectives.join(', ')}`, id: null });
  }
  return faults;
}

/** How an op is called in reasons: its label, or its id. */
export const opLabel = (kernel: Kernel, id: OpId): string =>
  kernel.ops.find((op) => op.id === id)?.label || id;
