/**
 * Passes costs between the pairs of each triple: a triple takes its pairs' costs in, and gives each pair back a part of
 * what its two tiles cost together at least, whatever the third op does. What a cycle of ops cannot do on a grid, such as
 * closing a triangle of single hops, becomes a cost of pairs in this way, and the ops' stars can gather it.
 *
 * Method: message passing on the dual of the relaxation with clusters of three (Globerson and Jaakkola 2007; Sontag and
 * others 2008). A triple's own costs are never stored: they are the sum of its three messages, one for each pair.
 * Cost of a triple: three times the product of its ops' domains.
 */
import type { OpTriple } from './cost-graph';
import type { Relaxation } from './relaxation';

/** One pass over all triples, from the last to the first where `backward`; false when `shouldStop` ended it. */
export function passTriples(relaxation: Relaxation, backward: boolean, shouldStop?: () => boolean): boolean {
  const { triples } = relaxation.graph;
  for (let i = 0; i < triples.length; i++) {
    const triple = triples[backward ? triples.length - 1 - i : i] as OpTriple;
    if (relaxation.tableAt[triple.table] === -1) continue;
    if (shouldStop?.()) return false;
    passTriple(relaxation, triple);
  }
  return true;
}

function passTriple({ tables, tableAt, domainSize }: Relaxation, triple: OpTriple): void {
  const sizeA = domainSize[triple.a] as number;
  const sizeB = domainSize[triple.b] as number;
  const sizeC = domainSize[triple.c] as number;
  const ab = tableAt[triple.table] as number;
  const ac = tableAt[triple.table + 1] as number;
  const bc = tableAt[triple.table + 2] as number;
  const pairAB = tableAt[triple.ab] as number;
  const pairAC = tableAt[triple.ac] as number;
  const pairBC = tableAt[triple.bc] as number;
  addTo(tables, ab, pairAB, sizeA * sizeB);
  addTo(tables, ac, pairAC, sizeA * sizeC);
  addTo(tables, bc, pairBC, sizeB * sizeC);
  for (let p = 0, entry = 0; p < sizeA; p++) {
    for (let q = 0; q < sizeB; q++, entry++) {
      const other = least(tables, ac + p * sizeC, 1, bc + q * sizeC, 1, sizeC);
      give(tables, ab + entry, pairAB + entry, other, 1 / 3);
    }
  }
  for (let p = 0, entry = 0; p < sizeA; p++) {
    for (let r = 0; r < sizeC; r++, entry++) {
      const other = least(tables, ab + p * sizeB, 1, bc + r, sizeC, sizeB);
      give(tables, ac + entry, pairAC + entry, other, 1 / 2);
    }
  }
  for (let q = 0, entry = 0; q < sizeB; q++) {
    for (let r = 0; r < sizeC; r++, entry++) {
      const other = least(tables, ab + q, sizeB, ac + r, sizeC, sizeA);
      give(tables, bc + entry, pairBC + entry, other, 1);
    }
  }
}

function addTo(tables: Float64Array, target: number, source: number, size: number): void {
  for (let i = 0; i < size; i++)
    tables[target + i] = (tables[target + i] as number) + (tables[source + i] as number);
}

/** The least sum of two rows of entries. */
function least(
  tables: Float64Array,
  one: number,
  oneStep: number,
  other: number,
  otherStep: number,
  size: number,
): number {
  let found = Number.POSITIVE_INFINITY;
  for (let i = 0; i < size; i++) {
    const sum = (tables[one + i * oneStep] as number) + (tables[other + i * otherStep] as number);
    if (sum < found) found = sum;
  }
  return found;
}

/** The pair gets a part of what its two tiles cost in the triple at least. */
function give(tables: Float64Array, message: number, pair: number, other: number, part: number): void {
  const own = tables[message] as number;
  // Below 0 by rounding only.
  const given = own === Number.POSITIVE_INFINITY ? own : Math.max(0, own + other) * part;
  tables[pair] = given;
  tables[message] = given === Number.POSITIVE_INFINITY ? given : own - given;
}
