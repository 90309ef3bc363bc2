/** Fabrics as JSON: the document of `fabric.schema.json`. */
import { type Fabric, fabricSchema } from '../fabric/fabric';
import { parseJsonDocument } from './json-document';
import { jsonText, sortedRecord } from './json-text';
import type { ParseResult } from './parse-result';

/** Reads a fabric. Whether its links exist on its grid is for `validateFabric` to say. */
export const parseFabricJson = (text: string): ParseResult<Fabric> => parseJsonDocument(text, fabricSchema);

/** The same fabric always gives the same text; reading it gives the fabric back. */
export const writeFabricJson = (fabric: Fabric): string =>
  jsonText({
    format: fabric.format,
    formatVersion: fabric.formatVersion,
    name: fabric.name,
    description: fabric.description,
    rows: fabric.rows,
    cols: fabric.cols,
    topology: fabric.topology,
    units: fabric.units,
    channels: fabric.channels,
    removedLinks: fabric.removedLinks,
    addedLinks: fabric.addedLinks,
    linkChannels: sortedRecord(fabric.linkChannels),
    bufferDepth: fabric.bufferDepth,
    clock:
      fabric.clock === null
        ? null
        : {
            periodPs: fabric.clock.periodPs,
            entryDelayPs: fabric.clock.entryDelayPs,
            hopDelayPs: fabric.clock.hopDelayPs,
          },
    memoryBanks: fabric.memoryBanks,
  });
