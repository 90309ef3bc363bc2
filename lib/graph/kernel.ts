/**
 * The kernel document: a dataflow graph of one vectorised loop body.
 * One schema for the editor, the server, the importers and the command line.
 */
import { z } from 'zod';
import { opKinds } from './op-catalog';

export const KERNEL_LIMITS = {
  ops: 2000,
  edges: 8000,
  distance: 64,
  labelLength: 60,
  nameLength: 80,
} as const;

export const opIdSchema = z
  .string()
  .regex(/^op_[A-Za-z0-9_]{1,60}$/, 'An op id is "op_" and up to 60 letters, digits or underscores')
  .brand<'OpId'>();
export const edgeIdSchema = z
  .string()
  .regex(/^edge_[A-Za-z0-9_]{1,60}$/, 'An edge id is "edge_" and up to 60 letters, digits or underscores')
  .brand<'EdgeId'>();

export type OpId = z.infer<typeof opIdSchema>;
export type EdgeId = z.infer<typeof edgeIdSchema>;

/** Word widths in bits that a data path of the fabric carries. */
export const wordWidthsBits = [8, 16, 32] as const;
export const widthBitsSchema = z.union(wordWidthsBits.map((w) => z.literal(w)));
export type WidthBits = z.infer<typeof widthBitsSchema>;

const int32 = z
  .number()
  .int()
  .min(-(2 ** 31))
  .max(2 ** 31 - 1);
const portNameSchema = z.string().regex(/^[a-z][A-Za-z0-9]{0,30}$/, 'A port name is a lower-case word');
const dataNameSchema = z
  .string()
  .regex(/^[A-Za-z_][A-Za-z0-9_]{0,39}$/, 'A data name is up to 40 letters, digits or underscores');

export const opSchema = z.strictObject({
  id: opIdSchema,
  kind: z.enum(opKinds),
  label: z.string().trim().max(KERNEL_LIMITS.labelLength),
  widthBits: widthBitsSchema,
  /** Values of the parameters that the op's kind declares; integers, or names of arrays and choices. */
  params: z.record(z.string(), z.union([int32, dataNameSchema])),
  /** Operands given as constants, by port. A port has an edge or an immediate, never both. */
  immediates: z.record(portNameSchema, int32),
  /** Top left corner on the editor's canvas, in px at zoom 1. */
  positionPx: z.strictObject({ x: z.number().min(-1e6).max(1e6), y: z.number().min(-1e6).max(1e6) }),
});

export const edgeSchema = z.strictObject({
  id: edgeIdSchema,
  from: opIdSchema,
  to: opIdSchema,
  port: portNameSchema,
  /** Iterations that the value is carried; 0 is the same iteration. */
  distance: z.number().int().min(0).max(KERNEL_LIMITS.distance),
  /** The values read in the first `distance` iterations; missing ones are 0. */
  initialValues: z.array(int32).max(KERNEL_LIMITS.distance),
});

export const kernelSchema = z.strictObject({
  format: z.literal('pinloom.kernel'),
  formatVersion: z.literal(1),
  name: z.string().trim().min(1).max(KERNEL_LIMITS.nameLength),
  description: z.string().max(2000),
  ops: z.array(opSchema).max(KERNEL_LIMITS.ops),
  edges: z.array(edgeSchema).max(KERNEL_LIMITS.edges),
});

export type Op = z.infer<typeof opSchema>;
export type Edge = z.infer<typeof edgeSchema>;
export type Kernel = z.infer<typeof kernelSchema>;

export const emptyKernel = (name: string): Kernel => ({
  format: 'pinloom.kernel',
  formatVersion: 1,
  name,
  description: '',
  ops: [],
  edges: [],
});
