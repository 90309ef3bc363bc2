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

/** Leaves pairs of tiles that cost more than the slack to the cutoff out of the question. */
export interface TripleLimits {
  cutoff: number;
  /** Asked before each triple: a true ends the pass where it stands. */
  shouldStop?: () => boolean;
}

const ROUNDING = 1e-6;

/** One pass over all triples, from the last to the first where `backward`; false when `shouldStop` ended it. */
export function passTriples(relaxation: Relaxation, backward: boolean, limits: TripleLimits): boolean {
  const { triples } = relaxation.graph;
  const slack = limits.cutoff + ROUNDING - relaxation.constant;
  for (let i = 0; i < triples.length; i++) {
    const triple = triples[backward ? triples.length - 1 - i : i] as OpTriple;
    if (relaxation.tableAt[triple.table] === -1) continue;
    if (limits.shouldStop?.()) return false;
    passTriple(relaxation, triple, slack);
  }
  return true;
}

function passTriple({ tables, tableAt, domainSize }: Relaxation, triple: OpTriple, slack: number): void {
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
      const cost = pairCost(tables, ab + entry, ac + p * sizeC, 1, bc + q * sizeC, 1, sizeC);
      give(tables, ab + entry, pairAB + entry, cost > slack ? Number.POSITIVE_INFINITY : cost / 3);
    }
  }
  for (let p = 0, entry = 0; p < sizeA; p++) {
    for (let r = 0; r < sizeC; r++, entry++) {
      const cost = pairCost(tables, ac + entry, ab + p * sizeB, 1, bc + r, sizeC, sizeB);
      give(tables, ac + entry, pairAC + entry, cost > slack ? Number.POSITIVE_INFINITY : cost / 2);
    }
  }
  for (let q = 0, entry = 0; q < sizeB; q++) {
    for (let r = 0; r < sizeC; r++, entry++) {
      const cost = pairCost(tables, bc + entry, ab + q, sizeB, ac + r, sizeC, sizeA);
      give(tables, bc + entry, pairBC + entry, cost > slack ? Number.POSITIVE_INFINITY : cost);
    }
  }
}

function addTo(tables: Float64Array, target: number, source: number, size: number): void {
  for (let i = 0; i < size; i++)
    tables[target + i] = (tables[target + i] as number) + (tables[source + i] as number);
}

/**
 * What two tiles cost in the triple at least: their own entry and the least sum of the third op's entries with each.
 * Never below 0 but by rounding, so the look ends at 0.
 */
function pairCost(
  tables: Float64Array,
  at: number,
  one: number,
  oneStep: number,
  other: number,
  otherStep: number,
  size: number,
): number {
  const own = tables[at] as number;
  if (own === Number.POSITIVE_INFINITY) return own;
  let found = Number.POSITIVE_INFINITY;
  for (let i = 0, x = one, y = other; i < size; i++, x += oneStep, y += otherStep) {
    const sum = (tables[x] as number) + (tables[y] as number);
    if (sum < found) {
      found = sum;
      if (own + sum <= 0) return 0;
    }
  }
  return own + found;
}

/** Moves that much from the triple to the pair. */
function give(tables: Float64Array, message: number, pair: number, cost: number): void {
  tables[pair] = cost;
  tables[message] = cost === Number.POSITIVE_INFINITY ? cost : (tables[message] as number) - cost;
}
