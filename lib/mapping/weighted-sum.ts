/** Sums of weighted hops without the rounding of decimal fractions: 0.1 · 3 is 0.3. */

/** A number of which every weight is a whole multiple: numerator / denominator, both whole. */
export interface WeightUnit {
  numerator: number;
  denominator: number;
}

const MOST_DECIMALS = 12;
/** Multiples above this would not leave room for exact sums. */
const MOST_MULTIPLE = 1e12;

/**
 * The largest decimal of which all weights are whole multiples; null where they have more digits than exact sums have
 * room for, such as a third. 1 where no weight is above 0.
 */
export function commonUnit(weights: readonly number[]): WeightUnit | null {
  for (let decimals = 0; decimals <= MOST_DECIMALS; decimals++) {
    const denominator = 10 ** decimals;
    const wholes = weights.map((weight) => Math.round(weight * denominator));
    if (wholes.some((whole) => whole > MOST_MULTIPLE)) return null;
    if (weights.some((weight, i) => (wholes[i] as number) / denominator !== weight)) continue;
    const numerator = wholes.reduce(greatestCommonDivisor, 0);
    return numerator === 0 ? { numerator: 1, denominator: 1 } : { numerator, denominator };
  }
  return null;
}

export function greatestCommonDivisor(a: number, b: number): number {
  let [x, y] = [Math.abs(a), Math.abs(b)];
  while (y > 0) [x, y] = [y, x % y];
  return x;
}

/** How many units a weight of theirs is. */
export const inUnits = (weight: number, { numerator, denominator }: WeightUnit): number =>
  Math.round((weight * denominator) / numerator);

/** The value of a number of units, rounded once. */
export const fromUnits = (units: number, { numerator, denominator }: WeightUnit): number =>
  (units * numerator) / denominator;

/** Σ weight · hops. */
export function weightedSum(terms: readonly (readonly [weight: number, hops: number])[]): number {
  const unit = commonUnit(terms.map(([weight]) => weight));
  if (!unit) return terms.reduce((sum, [weight, hops]) => sum + weight * hops, 0);
  return fromUnits(
    terms.reduce((sum, [weight, hops]) => sum + inUnits(weight, unit) * hops, 0),
    unit,
  );
}
