/**
 * A problem's digest: SHA-256 of its canonical text. Two problems have the same one where they differ in nothing but what
 * only people read (names, labels, descriptions, places on the editor's canvas), the order of members, weights that do not
 * count in the objective, and what is known or asked besides: a start, a bound, another mapping.
 */
import type { Fabric } from '../fabric/fabric';
import { canHost, type UnitLibrary, unitLibrary } from '../fabric/unit-library';
import type { Kernel } from '../graph/kernel';
import { effectiveWeights } from '../mapping/weights';
import type { PlacementProblem } from './problem';
import { sha256Hex } from './sha256';

/** Precondition: the problem's documents fit their schemas. Cost: linear in them. */
export const problemDigest = (problem: PlacementProblem): string =>
  `sha256:${sha256Hex(canonicalText(digested(problem)))}`;

/** Whole but for what is known or asked besides, so that a later part of the problem is in it without being named here. */
function digested({ kernel, fabric, units, ...more }: PlacementProblem): object {
  const { start: _, another: __, provenBound: ___, ...rest } = more;
  const weights = effectiveWeights(more.weights, more.objective);
  const hosts = hostedKinds(kernel, fabric, unitLibrary(units ?? []));
  return { ...rest, weights, kernel: bareKernel(kernel), fabric: bareFabric(fabric), hosts };
}

function bareKernel({ name: _, description: __, ops, ...kernel }: Kernel): object {
  return { ...kernel, ops: ops.map(({ label: _, positionPx: __, ...op }) => op) };
}

function bareFabric({ name: _, description: __, ...fabric }: Fabric): object {
  return fabric;
}

/** What the fabric's units can do of what the kernel asks for: libraries may change while documents do not. */
function hostedKinds(kernel: Kernel, fabric: Fabric, library: UnitLibrary): Record<string, string[]> {
  const kinds = [...new Set(kernel.ops.map((op) => op.kind))].sort();
  const units = new Set(fabric.units.filter((unit) => unit !== null));
  return Object.fromEntries(
    [...units].map((unit) => [unit, kinds.filter((kind) => canHost(unit, kind, library))]),
  );
}

/** JSON with the members of every object in the order of their names (UTF-16 units) and no spaces. */
export function canonicalText(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(canonicalText).join(',')}]`;
  if (typeof value !== 'object' || value === null) return JSON.stringify(value);
  const members = Object.entries(value)
    .filter(([, member]) => member !== undefined)
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([name, member]) => `${JSON.stringify(name)}:${canonicalText(member)}`);
  return `{${members.join(',')}}`;
}
