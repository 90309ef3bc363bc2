/**
 * The fabric document: a grid of tiles with a router and at most one processing element (PE) each.
 * One schema for the forms, the server, the importers and the command line.
 */
import { z } from 'zod';

export const FABRIC_LIMITS = { side: 64, channels: 16, bufferDepth: 1024, nameLength: 80 } as const;

/** `r2c3`: row 2, column 3, counted from 0 at the top left. The same text is used in files and in memory. */
export const tileIdSchema = z
  .string()
  .regex(/^r(0|[1-9]\d?)c(0|[1-9]\d?)$/, 'A tile is named r<row>c<column>, such as r2c3')
  .brand<'TileId'>();
/** `r2c3>r2c4`: the directed link from one router to another. */
export const linkIdSchema = z
  .string()
  .regex(
    /^r(0|[1-9]\d?)c(0|[1-9]\d?)>r(0|[1-9]\d?)c(0|[1-9]\d?)$/,
    'A link is named <tile>><tile>, such as r2c3>r2c4',
  )
  .brand<'LinkId'>();
export const unitIdSchema = z
  .string()
  .regex(
    /^unit_[a-z0-9_]{1,40}$/,
    'A unit id is "unit_" and up to 40 lower-case letters, digits or underscores',
  )
  .brand<'UnitId'>();

export type TileId = z.infer<typeof tileIdSchema>;
export type LinkId = z.infer<typeof linkIdSchema>;
export type UnitId = z.infer<typeof unitIdSchema>;

export const topologies = ['mesh', 'torus', 'diagonal'] as const;
export type Topology = (typeof topologies)[number];

export const fabricSchema = z
  .strictObject({
    format: z.literal('pinloom.fabric'),
    formatVersion: z.literal(1),
    name: z.string().trim().min(1).max(FABRIC_LIMITS.nameLength),
    description: z.string().max(2000),
    rows: z.number().int().min(1).max(FABRIC_LIMITS.side),
    cols: z.number().int().min(1).max(FABRIC_LIMITS.side),
    topology: z.enum(topologies),
    /** Row by row, the unit of each tile's PE; null is a tile that has a router only. */
    units: z.array(unitIdSchema.nullable()),
    /** Word-wide wires of every link that `linkChannels` does not name. */
    channels: z.number().int().min(1).max(FABRIC_LIMITS.channels),
    /** Links of the preset that are missing (faulty). */
    removedLinks: z.array(linkIdSchema),
    /** Links besides the preset (express). */
    addedLinks: z.array(linkIdSchema),
    linkChannels: z.record(linkIdSchema, z.number().int().min(1).max(FABRIC_LIMITS.channels)),
    /** Entries of each PE's output FIFO. */
    bufferDepth: z.number().int().min(1).max(FABRIC_LIMITS.bufferDepth),
    /** Null: no limit on the hops of a path. */
    clock: z
      .strictObject({
        periodPs: z.number().positive().max(1e9),
        entryDelayPs: z.number().min(0).max(1e9),
        hopDelayPs: z.number().positive().max(1e9),
      })
      .nullable(),
    memoryBanks: z.number().int().min(1).max(1024),
  })
  .check((ctx) => {
    const { rows, cols, units } = ctx.value;
    if (units.length !== rows * cols) {
      ctx.issues.push({
        code: 'custom',
        path: ['units'],
        input: units,
        message: `${rows} rows of ${cols} need ${rows * cols} entries, found ${units.length}`,
      });
    }
  });

export type Fabric = z.infer<typeof fabricSchema>;
