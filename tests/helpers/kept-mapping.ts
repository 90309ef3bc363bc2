import { type MappingDocument, mappingSchema } from '../../lib/mapping/mapping';

/** The gauge kernel on the small fabric: both ops on the memory units, one hop apart. */
export const handDocument = (name = 'By hand'): MappingDocument =>
  mappingSchema.parse({
    format: 'pinloom.mapping',
    formatVersion: 1,
    name,
    kernel: { name: 'Gauge reading', version: 1 },
    fabric: { name: 'Two by two', version: 1 },
    placement: { op_load: 'r0c0', op_store: 'r1c0' },
    pins: {},
    routes: { op_load: ['r0c0>r1c0'] },
    provenance: { by: 'hand' },
  });

export const figures = {
  wireHops: 1,
  pathHops: 1,
  longestPathHops: 1,
  linksUsed: 1,
  fullestLinkNets: 1,
};
