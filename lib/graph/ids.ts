/** Ids of ops and edges: parsing, and making new ones that are free. */
import { type EdgeId, edgeIdSchema, type OpId, opIdSchema } from './kernel';

const BODY_LENGTH = 60;

/** The text as an op id. Throws when it is not one: for ids that the program itself wrote. */
export const opId = (text: string): OpId => opIdSchema.parse(text);

/** The text as an edge id. Throws when it is not one. */
export const edgeId = (text: string): EdgeId => edgeIdSchema.parse(text);

/** The letters, digits and underscores of a hint, without an id's own prefix. */
const idBody = (hint: string): string => hint.replace(/^(op|edge)_/, '').replace(/[^A-Za-z0-9_]/g, '');

function freeId(taken: ReadonlySet<string>, prefix: string, hint: string, fallback: string): string {
  const body = (idBody(hint) || fallback).slice(0, BODY_LENGTH);
  if (!taken.has(prefix + body)) return prefix + body;
  // Counting goes on from a number at the hint's end, so a copy of add7 becomes add8, not add72.
  const digits = /\d{1,6}$/.exec(body)?.[0] ?? '';
  const stem = body.slice(0, body.length - digits.length).slice(0, BODY_LENGTH - 8);
  for (let count = digits === '' ? 2 : Number(digits) + 1; ; count++) {
    const id = `${prefix}${stem}${count}`;
    if (!taken.has(id)) return id;
  }
}

/** An op id that is not in `taken`, as near to the hint as the alphabet of ids allows. */
export const freshOpId = (taken: ReadonlySet<string>, hint: string): OpId =>
  opId(freeId(taken, 'op_', hint, 'op1'));

/** An edge id that is not in `taken`. Without a hint they are numbered from edge_1. */
export const freshEdgeId = (taken: ReadonlySet<string>, hint = '1'): EdgeId =>
  edgeId(freeId(taken, 'edge_', hint, '1'));

/** Every id in use, of ops and edges. */
export const takenIds = (kernel: {
  ops: readonly { id: string }[];
  edges: readonly { id: string }[];
}): Set<string> => new Set([...kernel.ops.map((op) => op.id), ...kernel.edges.map((edge) => edge.id)]);
