/** The JSON Schemas (draft 2020-12) of the documents, made from the schemas that the program itself uses. */
import { z } from 'zod';
import { fabricSchema } from '../fabric/fabric';
import { kernelSchema } from '../graph/kernel';
import { certificateSchema } from '../mapping/certificate';
import { mappingSchema } from '../mapping/mapping';
import { pinsDocumentSchema } from './pins-json';
import { weightsDocumentSchema } from './weights-json';

const documents = {
  kernel: { title: 'Pinloom kernel', schema: kernelSchema },
  fabric: { title: 'Pinloom fabric', schema: fabricSchema },
  mapping: { title: 'Pinloom mapping', schema: mappingSchema },
  pins: { title: 'Pinloom pins', schema: pinsDocumentSchema },
  weights: { title: 'Pinloom weights', schema: weightsDocumentSchema },
  certificate: { title: 'Pinloom certificate', schema: certificateSchema },
} as const;

export type DocumentName = keyof typeof documents;
export const documentNames = Object.keys(documents) as DocumentName[];

/** The schema of a document, as it stands in docs/formats/<name>.schema.json. */
export function jsonSchemaOf(name: DocumentName): Record<string, unknown> {
  const { title, schema } = documents[name];
  const { $schema, ...rest } = z.toJSONSchema(schema, { target: 'draft-2020-12', io: 'input' });
  return { $schema, title, ...rest };
}

/** The file's text. */
export const jsonSchemaText = (name: DocumentName): string =>
  `${JSON.stringify(jsonSchemaOf(name), null, 2)}\n`;
