/** The nets of an instance as the joint router takes them, and the granularity of its costs. */
import { greatestCommonDivisor } from '../../mapping/weighted-sum';
import type { PlacementInstance } from '../instance';
import { costGrain, termsOf } from '../weight-scale';
import type { StandingNet } from './joint-routing';

export interface StandingNets {
  /** Nets of the op whose terminals all stand, now that it does; in the instance's order. */
  completedBy(op: number, tileOf: Int32Array): NumberedNet[];
  /** Nets of two consumers whose source stands and just one consumer does (objective `wire`). */
  openNets(tileOf: Int32Array): StandingNet[];
  /** The pairs' cost when all ops stand (objective `path`, nothing routed). */
  pairCost(tileOf: Int32Array): number;
}

export interface NumberedNet extends StandingNet {
  /** Its place in the instance's nets. */
  index: number;
}

export function standingNets(instance: PlacementInstance): StandingNets {
  const { pairs, distance, tileCount } = instance;
  const weightOf = new Map(pairs.map(({ from, to, weight }) => [`${from}>${to}`, weight]));
  const nets = instance.nets.map(({ source, consumers, weight }, index) => ({
    index,
    ops: [source, ...consumers],
    weight,
    pathWeights: consumers.map((to) => weightOf.get(`${source}>${to}`) ?? 0),
  }));
  const netsOf = Array.from({ length: instance.opCount }, (_, op) =>
    nets.filter(({ ops }) => ops.includes(op)),
  );
  return {
    completedBy(op, tileOf) {
      const found: NumberedNet[] = [];
      for (const { index, ops, weight, pathWeights } of netsOf[op] as typeof nets) {
        if (ops.some((terminal) => (tileOf[terminal] as number) < 0)) continue;
        found.push({ index, tiles: ops.map((terminal) => tileOf[terminal] as number), weight, pathWeights });
      }
      return found;
    },
    openNets(tileOf) {
      const found: StandingNet[] = [];
      if (instance.objective !== 'wire') return found;
      for (const { ops, weight } of nets) {
        if (ops.length !== 3) continue;
        const [source, left, right] = ops.map((op) => tileOf[op] as number) as [number, number, number];
        if (source < 0 || left < 0 === right < 0) continue;
        const openTiles = instance.candidates[ops[left < 0 ? 1 : 2] as number] ?? [];
        found.push({ tiles: [source, left < 0 ? right : left], weight, pathWeights: [], openTiles });
      }
      return found;
    },
    pairCost: (tileOf) =>
      pairs.reduce(
        (sum, { from, to, weight }) =>
          sum + weight * (distance[(tileOf[from] as number) * tileCount + (tileOf[to] as number)] as number),
        0,
      ),
  };
}

/**
 * Objectives that differ, differ by this much at least: the weights' greatest common divisor where they are whole or
 * decimals with room for exact sums, or next to nothing.
 */
export function costStep(instance: PlacementInstance): number {
  const terms = termsOf(instance);
  if (terms.every(({ weight }) => Number.isInteger(weight))) {
    return terms.reduce((divisor, { weight }) => greatestCommonDivisor(divisor, weight), 0) || 1;
  }
  return costGrain(terms).step;
}
