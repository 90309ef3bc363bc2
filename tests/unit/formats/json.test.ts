import { readFileSync } from 'node:fs';
import Ajv2020 from 'ajv/dist/2020';
import { describe, expect, test } from 'vitest';
import { demoKernels } from '@/db/seed/kernels';
import { type Fabric, fabricSchema } from '@/lib/fabric/fabric';
import { parseCertificateJson, writeCertificateJson } from '@/lib/formats/certificate-json';
import { parseFabricJson, writeFabricJson } from '@/lib/formats/fabric-json';
import { documentNames, jsonSchemaOf, jsonSchemaText } from '@/lib/formats/json-schema';
import { MAX_JSON_DEPTH, MAX_JSON_VALUES } from '@/lib/formats/json-walk';
import { parseKernelJson, writeKernelJson } from '@/lib/formats/kernel-json';
import { parseMappingJson, writeMappingJson } from '@/lib/formats/mapping-json';
import type { ParseResult } from '@/lib/formats/parse-result';
import { parsePinsJson, writePinsJson } from '@/lib/formats/pins-json';
import { emptyKernel } from '@/lib/graph';
import { type Certificate, certificateSchema } from '@/lib/mapping/certificate';
import { type MappingDocument, mappingSchema, pinsSchema } from '@/lib/mapping/mapping';

const places = (result: ParseResult<unknown>) =>
  result.ok ? [] : result.errors.map(({ line, column, message }) => `${line}:${column} ${message}`);

const text = `{
  "format": "pinloom.kernel", "formatVersion": 1, "name": "k", "description": "",
  "ops": [
    { "id": "op_a", "kind": "load", "label": "a", "widthBits": 16,
      "params": {}, "immediates": {}, "positionPx": { "x": 0, "y": 0 } }
  ],
  "edges": []
}`;

test('the example that the following cases break is read', () => {
  expect(parseKernelJson(text).ok).toBe(true);
});

/** What is replaced by what, and the errors with line and column counted by hand in the text above. */
const broken: [string, string, string, string[]][] = [
  ['a width that does not exist', '16', '12', ['4:64 12 cannot stand here: give 8, 16 or 32.']],
  [
    'a kind that does not exist',
    '"load"',
    '"lode"',
    ['4:29 "lode" cannot stand here: give one of the 29 names known here.'],
  ],
  [
    'a field too many',
    '"params": {}',
    '"params": {}, "param": 1',
    ['5:21 There is no field “param” here: remove it or correct its name.'],
  ],
  ['a field too few', '"label": "a", ', '', ['4:5 The field “label” is missing: give a string.']],
  [
    'a constant of half a unit',
    '"immediates": {}',
    '"immediates": { "a": 0.5 }',
    ['5:42 0.5 cannot stand here: give an integer.'],
  ],
  [
    'a constant at a port that cannot be',
    '"immediates": {}',
    '"immediates": { "A": 1 }',
    ['5:37 “A” cannot be a name here. A port name is a lower-case word.'],
  ],
  [
    'two faults',
    '"x": 0, "y": 0',
    '"x": 2e6, "y": null',
    [
      '5:60 2000000 cannot stand here: give a number of at most 1000000.',
      '5:70 null cannot stand here: give a number.',
    ],
  ],
  [
    'an op twice',
    '  ],\n  "edges"',
    '  , { "id": "op_a", "kind": "load", "label": "", "widthBits": 8, "params": {}, "immediates": {}, "positionPx": { "x": 0, "y": 0 } } ],\n  "edges"',
    ['6:13 Another op has the id op_a already.'],
  ],
  [
    'a connection to nowhere',
    '"edges": []',
    '"edges": [{ "id": "edge_1", "from": "op_a", "to": "op_b", "port": "a", "distance": 0, "initialValues": [] }]',
    ['7:53 There is no op op_b in this kernel.'],
  ],
  ['a comma too many', '"edges": []', '"edges": [],', ['8:1 Found “}”, expected a name in quotation marks.']],
  ['a missing comma', '"label": "a",', '"label": "a"', ['4:50 Found “"”, expected a comma or }.']],
  [
    'a line feed in a string',
    '"name": "k"',
    '"name": "k\n"',
    ['2:61 A string cannot hold the control character U+000A as it stands: write it as an escape.'],
  ],
  ['a name twice', '"description": ""', '"name": "l"', ['2:64 The name “name” occurs twice in one object.']],
  [
    'a name of the prototype',
    '"params": {}',
    '"params": { "__proto__": 1 }',
    ['5:19 The name “__proto__” is not allowed.'],
  ],
  ['an end too early', '\n}', '', ['7:14 Found the end of the text, expected a comma or }.']],
  ['text after the end', '\n}', '\n} 1', ['8:3 Found “1”, expected the end of the text.']],
];

test.each(broken)('%s is reported at its place', (_, find, replacement, errors) => {
  expect(places(parseKernelJson(text.replace(find, replacement)))).toEqual(errors);
});

test('lines end with CR LF, LF or CR', () => {
  for (const end of ['\r\n', '\n', '\r']) {
    expect(places(parseKernelJson(text.replaceAll('\n', end).replace('16', '12')))).toEqual([
      '4:64 12 cannot stand here: give 8, 16 or 32.',
    ]);
  }
});

test('a byte order mark is passed over', () => {
  expect(parseKernelJson(`\ufeff${text}`).ok).toBe(true);
});

test.each([
  [
    'a text of more than 4 MB',
    ' '.repeat(4_000_001),
    'The text has 4000001 characters; at most 4000000 are read.',
  ],
  ['nesting', '['.repeat(1_000_000), `Objects and arrays nest deeper than ${MAX_JSON_DEPTH} levels.`],
  ['values', `[${'0,'.repeat(MAX_JSON_VALUES)}0]`, `The text has more than ${MAX_JSON_VALUES} values.`],
  ['a string without end', `"${'x'.repeat(3_900_000)}`, 'This string has no closing quotation mark.'],
  ['an empty text', '', 'Found the end of the text, expected a value.'],
  [
    'another document',
    '{"format":"pinloom.fabric"}',
    '"pinloom.fabric" cannot stand here: give "pinloom.kernel".',
  ],
])('%s: refused', (_, hostile, message) => {
  const result = parseKernelJson(hostile);
  expect(result.ok ? [] : result.errors.map((error) => error.message)).toContain(message);
});

test('names that only the prototype of objects has are names like any other', () => {
  const odd = text.replace('"immediates": {}', '"immediates": { "constructor": 1, "toString": 2 }');
  const result = parseKernelJson(odd);
  expect(result.ok && result.value.ops[0]?.immediates).toEqual({ constructor: 1, toString: 2 });
});

const fabric: Fabric = fabricSchema.parse({
  format: 'pinloom.fabric',
  formatVersion: 1,
  name: 'f',
  description: '',
  rows: 2,
  cols: 2,
  topology: 'mesh',
  units: ['unit_arithmetic', null, 'unit_memory', 'unit_multiplier'],
  channels: 1,
  removedLinks: ['r0c0>r0c1'],
  addedLinks: [],
  linkChannels: { 'r1c0>r0c0': 2 },
  bufferDepth: 4,
  clock: { periodPs: 1000.5, entryDelayPs: 0, hopDelayPs: 120 },
  memoryBanks: 4,
});
const mapping = mappingSchema.parse({
  format: 'pinloom.mapping',
  formatVersion: 1,
  name: 'm',
  kernel: { name: 'k', version: 3 },
  fabric: { name: 'f', version: null },
  placement: { op_b: 'r0c1', op_a: 'r0c0' },
  pins: { op_a: 'r0c0' },
  routes: { op_a: ['r0c0>r0c1'] },
  provenance: {
    by: 'solver',
    engine: 'search',
    objective: 'wire',
    timeLimitMs: 10000,
    seed: 1,
    status: 'feasible',
    objectiveValue: 12,
    bound: 10.5,
    elapsedMs: 800,
    changedByHand: false,
  },
});

const certificate: Certificate = certificateSchema.parse({
  format: 'pinloom.certificate',
  formatVersion: 1,
  engineVersion: 3,
  problemDigest: `sha256:${'0a'.repeat(32)}`,
  objective: 'path',
  pins: { op_b: 'r0c1', op_a: 'r0c0' },
  start: { op_b: 'r0c1', op_a: 'r0c0' },
  engine: 'auto',
  seed: 7,
  searchTries: 4,
  status: 'optimal',
  objectiveValue: 12.5,
  bound: 12.5,
  method: 'exact search',
  nodes: 100,
  levels: [
    { cutoff: 11.5, nodes: 20 },
    { cutoff: 12, nodes: 70 },
  ],
  struckTiles: 3000,
  isRepeatable: true,
});

describe('writing and reading', () => {
  test('a fabric comes back as it was', () => {
    expect(parseFabricJson(writeFabricJson(fabric))).toEqual({ ok: true, value: fabric });
    const free = { ...fabric, clock: null };
    expect(parseFabricJson(writeFabricJson(free))).toEqual({ ok: true, value: free });
  });
  test('a fabric with too few units is reported at its units', () => {
    const cut = writeFabricJson(fabric).replace('"rows": 2', '"rows": 3');
    expect(places(parseFabricJson(cut))).toEqual(['9:12 3 rows of 2 need 6 entries, found 4']);
  });
  test('a mapping comes back as it was, its records in the order of names', () => {
    const written = writeMappingJson(mapping);
    expect(parseMappingJson(written)).toEqual({ ok: true, value: mapping });
    expect(written).toContain('"placement": { "op_a": "r0c0", "op_b": "r0c1" }');
    const byHand = { ...mapping, provenance: { by: 'hand' as const } };
    expect(parseMappingJson(writeMappingJson(byHand))).toEqual({ ok: true, value: byHand });
  });
  test('a certificate comes back as it was, alone and within a mapping, its records in the order of names', () => {
    const written = writeCertificateJson(certificate);
    expect(parseCertificateJson(written)).toEqual({ ok: true, value: certificate });
    expect(written).toContain('"pins": { "op_a": "r0c0", "op_b": "r0c1" }');
    expect(parseCertificateJson(writeCertificateJson({ ...certificate, start: null })).ok).toBe(true);
    const provenance = { ...mapping.provenance, certificate } as MappingDocument['provenance'];
    const proved = { ...mapping, provenance };
    expect(parseMappingJson(writeMappingJson(proved))).toEqual({ ok: true, value: proved });
  });
  test('pins come back as they were', () => {
    const pins = pinsSchema.parse({ op_b: 'r1c1', op_a: 'r0c0' });
    expect(parsePinsJson(writePinsJson(pins))).toEqual({ ok: true, value: pins });
    expect(places(parsePinsJson('{"format":"pinloom.pins","formatVersion":1,"pins":{"op_a":"r1"}}'))).toEqual(
      ['1:59 "r1" cannot stand here. A tile is named r<row>c<column>, such as r2c3.'],
    );
  });
});

describe('the JSON Schemas in docs/formats', () => {
  test.each(documentNames)('%s.schema.json is what the program checks against', (name) => {
    expect(readFileSync(`docs/formats/${name}.schema.json`, 'utf8')).toBe(jsonSchemaText(name));
  });

  // Judged by another validator (ajv 8, draft 2020-12) than the one that reads the documents here.
  const ajv = new Ajv2020({ strict: true });
  const checks = new Map(documentNames.map((name) => [name, ajv.compile(jsonSchemaOf(name))]));
  const accepts = (name: (typeof documentNames)[number], written: string) =>
    checks.get(name)?.(JSON.parse(written));

  test('every demo kernel, a fabric, a mapping, pins and a certificate fit their schemas', () => {
    for (const { kernel } of demoKernels) expect(accepts('kernel', writeKernelJson(kernel))).toBe(true);
    expect(accepts('kernel', writeKernelJson(emptyKernel('k')))).toBe(true);
    expect(accepts('fabric', writeFabricJson(fabric))).toBe(true);
    expect(accepts('mapping', writeMappingJson(mapping))).toBe(true);
    expect(accepts('pins', writePinsJson(mapping.pins))).toBe(true);
    expect(accepts('certificate', writeCertificateJson(certificate))).toBe(true);
  });

  test.each([
    ['a width that does not exist', '16', '12'],
    ['a kind that does not exist', '"load"', '"lode"'],
    ['a field too many', '"params": {}', '"params": {}, "param": 1'],
    ['a field too few', '"label": "a", ', ''],
    ['a constant at a port that cannot be', '"immediates": {}', '"immediates": { "A": 1 }'],
    ['another document', 'pinloom.kernel', 'pinloom.fabric'],
  ])('%s does not fit the kernel schema', (_, find, replacement) => {
    expect(accepts('kernel', text)).toBe(true);
    expect(accepts('kernel', text.replace(find, replacement))).toBe(false);
  });
});
