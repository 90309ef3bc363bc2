/**
 * The unit that a solve counts its objective in. Where all weights are whole multiples of one decimal, every value is
 * a whole number of it: sums are exact, and bounds may be rounded up. Otherwise values are real numbers, of about one
 * a hop, and bounds are never rounded.
 */
import type { EdgeId, Kernel, OpId } from '../graph/kernel';
import { netsOf } from '../graph/nets';
import type { Objective } from '../mapping/mapping';
import { commonUnit, fromUnits, inUnits, type WeightUnit } from '../mapping/weighted-sum';
import { edgeWeight, netWeight, objectiveName, type Weights } from '../mapping/weights';
import type { PlacementInstance } from './instance';

/** A weight, and the hops that it counts at least. */
export interface WeightedTerm {
  weight: number;
  leastHops: number;
}

/** What differences between two values are told apart. */
export interface CostGrain {
  /** Values that differ, differ by this much at least: exactly where `whole`, as far as anything is claimed otherwise. */
  step: number;
  /**
   * `whole`: values are whole multiples of the step. `real`: values that differ by less than the step are taken as
   * equal, and it is far below every weight. `coarse`: some weights are below what rounding leaves of the largest ones,
   * so a proof may miss what they cost.
   */
  kind: 'whole' | 'real' | 'coarse';
}

/** A mapping's value is about this many times its least hops at most, for the size of rounding errors. */
const HOPS_PER_LEAST_HOP = 4;
/** Part of a value that a bound from many sums of doubles may be wrong by, with room to spare. */
const RESOLUTION = 1e-10;
/** The step is far below a weight where it is less than this part of it. */
const FAR_BELOW = 1e-3;

export function costGrain(terms: readonly WeightedTerm[]): CostGrain {
  const positive = terms.filter(({ weight }) => weight > 0);
  const large = positive.reduce((sum, { weight, leastHops }) => sum + weight * leastHops, 0);
  const finest = HOPS_PER_LEAST_HOP * large * RESOLUTION;
  const unit = commonUnit(positive.map(({ weight }) => weight));
  if (unit && fromUnits(1, unit) >= finest) return { step: fromUnits(1, unit), kind: 'whole' };
  const least = positive.reduce((found, { weight }) => Math.min(found, weight), Number.POSITIVE_INFINITY);
  return { step: finest, kind: finest <= FAR_BELOW * least ? 'real' : 'coarse' };
}

/** The terms of an instance's objective. */
export const termsOf = ({ objective, pairs, nets }: PlacementInstance): WeightedTerm[] =>
  objective === 'path'
    ? pairs.map(({ weight }) => ({ weight, leastHops: 1 }))
    : nets.map(({ weight, consumers }) => ({ weight, leastHops: consumers.length }));

export interface WeightScale extends CostGrain {
  /** Every weight of the objective, in the solve's unit; so is `step`. */
  weights: Weights;
  /** What the problem's values count, for people. */
  name: string;
  /** A value in the solve's unit as the problem's weights make it. */
  toValue(inUnits: number): number;
  fromValue(value: number): number;
  /** A proven bound, rounded up where all values are whole. */
  roundUp(bound: number): number;
}

export function weightScale(kernel: Kernel, objective: Objective, weights?: Weights): WeightScale {
  const named = everyWeight(kernel, objective, weights);
  const { step, kind } = costGrain(named);
  const own = named.map(({ weight }) => weight);
  const unit = kind === 'whole' ? commonUnit(own) : powerOfTwo(own);
  const scaled = unit ?? { numerator: 1, denominator: 1 };
  const fromValue = (value: number) => (value * scaled.denominator) / scaled.numerator;
  const convert = (weight: number) => (kind === 'whole' ? inUnits(weight, scaled) : fromValue(weight));
  const record = Object.fromEntries(named.map(({ id, weight }) => [id, convert(weight)]));
  return {
    step: kind === 'whole' ? 1 : convert(step),
    kind,
    weights: objective === 'wire' ? { nets: record } : { edges: record },
    name: objectiveName(objective, weights),
    toValue: (value) => fromUnits(value, scaled),
    fromValue,
    roundUp: (bound) => (kind === 'whole' ? Math.ceil(bound - 1e-6 - 1e-12 * Math.abs(bound)) : bound),
  };
}

function everyWeight(
  kernel: Kernel,
  objective: Objective,
  weights?: Weights,
): (WeightedTerm & { id: OpId | EdgeId })[] {
  if (objective === 'wire') {
    return netsOf(kernel).map(({ source, consumers }) => ({
      id: source,
      weight: netWeight(weights, source),
      leastHops: consumers.length,
    }));
  }
  return kernel.edges
    .filter((edge) => edge.from !== edge.to)
    .map(({ id }) => ({ id, weight: edgeWeight(weights, id), leastHops: 1 }));
}

/** About the mean weight; scaling by it loses no digit. */
function powerOfTwo(weights: readonly number[]): WeightUnit {
  const mean = weights.reduce((sum, weight) => sum + weight, 0) / Math.max(1, weights.length);
  const power = Math.round(Math.log2(mean));
  return power < 0 ? { numerator: 1, denominator: 2 ** -power } : { numerator: 2 ** power, denominator: 1 };
}
