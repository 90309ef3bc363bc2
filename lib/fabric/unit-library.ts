/**
 * Functional unit types: what each can do, how long it takes and how its tile looks.
 * The built-in ones stand here; a workspace adds its own and passes the joined library along.
 */
import { z } from 'zod';
import { type OpGroup, type OpKind, opKinds, opSpec } from '../graph/op-catalog';
import { type UnitId, unitIdSchema } from './fabric';

/** How a tile tells its unit's kind besides the tint. Custom units are stitched. */
export const unitForms = ['plain', 'cornerTicks', 'footBar', 'notch', 'stitched'] as const;
export type UnitForm = (typeof unitForms)[number];

export const unitOperationSchema = z.strictObject({
  /** Cycles from firing until the result can be read. */
  latencyCycles: z.number().int().min(1).max(64),
  /** Cycles from one firing to the next. */
  intervalCycles: z.number().int().min(1).max(64),
  /** Energy of one firing at 32 bits; null where no figure is known. */
  energyPj: z.number().min(0).max(1e6).nullable(),
});
export type UnitOperation = z.infer<typeof unitOperationSchema>;

export const unitSpecSchema = z.strictObject({
  id: unitIdSchema,
  label: z.string().trim().min(1).max(40),
  description: z.string().max(400),
  form: z.enum(unitForms),
  operations: z.partialRecord(z.enum(opKinds), unitOperationSchema),
  /** Silicon area; null where no figure is known. */
  areaUm2: z.number().positive().max(1e9).nullable(),
});
export type UnitSpec = z.infer<typeof unitSpecSchema>;

/** Unit types by id. */
export type UnitLibrary = ReadonlyMap<UnitId, UnitSpec>;

/**
 * Energies at 32 bits, 45 nm, 0.9 V: an integer add takes 0.1 pJ and a multiplication 3.1 pJ (M. Horowitz, ISSCC
 * 2014 Digest, pp. 10–14, Fig. 1.1.9). The table has no figure for shifts, comparisons or small memories, so
 * those stay null rather than guessed.
 */
const ADD_PJ = 0.1;
const MULTIPLY_PJ = 3.1;
const adders: ReadonlySet<OpKind> = new Set<OpKind>(['add', 'subtract', 'reduceSum']);

function energyPj(kind: OpKind): number | null {
  if (adders.has(kind)) return ADD_PJ;
  if (kind === 'multiply') return MULTIPLY_PJ;
  return kind === 'multiplyAccumulate' ? MULTIPLY_PJ + ADD_PJ : null;
}

function operationsOf(groups: readonly OpGroup[], latencyCycles: number): UnitSpec['operations'] {
  const kinds = opKinds.filter((kind) => groups.includes(opSpec(kind).group));
  return Object.fromEntries(
    kinds.map((kind) => [kind, { latencyCycles, intervalCycles: 1, energyPj: energyPj(kind) }]),
  );
}

const builtIn = (
  name: string,
  label: string,
  description: string,
  form: UnitForm,
  groups: readonly OpGroup[],
  latencyCycles: number,
): UnitSpec => ({
  id: unitIdSchema.parse(`unit_${name}`),
  label,
  description,
  form,
  operations: operationsOf(groups, latencyCycles),
  areaUm2: null,
});

export const arithmeticUnit = builtIn(
  'arithmetic',
  'Arithmetic',
  'Adds, compares, shifts, chooses and reduces; one cycle each.',
  'plain',
  ['arithmetic', 'logic', 'compare', 'choose', 'reduce'],
  1,
);
export const multiplierUnit = builtIn(
  'multiplier',
  'Multiplier',
  'Multiplies, with or without an addend, in a pipeline of two cycles.',
  'cornerTicks',
  ['multiply'],
  2,
);
export const memoryUnit = builtIn(
  'memory',
  'Memory',
  'Reads and writes the banked memory, by stride or by index.',
  'footBar',
  ['memory'],
  2,
);
export const scratchpadUnit = builtIn(
  'scratchpad',
  'Scratchpad',
  'Keeps a small table of its own beside the PE.',
  'notch',
  ['scratchpad'],
  1,
);

export const builtInUnits: readonly UnitSpec[] = [arithmeticUnit, multiplierUnit, memoryUnit, scratchpadUnit];

/** The built-in units and a workspace's own; an own unit with a built-in id is left out. */
export function unitLibrary(ownUnits: readonly UnitSpec[] = []): UnitLibrary {
  const units = new Map<UnitId, UnitSpec>();
  for (const unit of [...builtInUnits, ...ownUnits]) if (!units.has(unit.id)) units.set(unit.id, unit);
  return units;
}

export const builtInLibrary: UnitLibrary = unitLibrary();

/** The unit type with an id, or null where the library has none. */
export const unitSpec = (id: UnitId, library: UnitLibrary = builtInLibrary): UnitSpec | null =>
  library.get(id) ?? null;

/** Whether a PE with that unit implements the op kind; false for a tile without a PE and for unknown units. */
export function canHost(unit: UnitId | null, kind: OpKind, library: UnitLibrary = builtInLibrary): boolean {
  return unit !== null && library.get(unit)?.operations[kind] !== undefined;
}

/** Labels of the units that implement an op kind, for texts such as "needs a Multiplier". */
export const hostsOf = (kind: OpKind, library: UnitLibrary = builtInLibrary): UnitSpec[] =>
  [...library.values()].filter((unit) => unit.operations[kind] !== undefined);
