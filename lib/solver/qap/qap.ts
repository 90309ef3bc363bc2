/**
 * The quadratic assignment problem (Koopmans and Beckmann 1957): facilities get locations of their own so that
 * Σ flow[i, j] · distance[p(i), p(j)] is least, over all i and j, i = j included. Neither matrix need be symmetric.
 */
export interface QapProblem {
  n: number;
  /** Between facilities, at [i · n + j]. Whole numbers. */
  flow: Float64Array;
  /** Between locations, at [p · n + q]. Whole numbers. */
  distance: Float64Array;
}

/**
 * The objective of an assignment, straight from the two matrices; null unless each facility has a location of its
 * own. Shares no code with the solver and the instance that it works on: it is what checks them.
 */
export function qapValue(problem: QapProblem, locationOf: ArrayLike<number>): number | null {
  const { n, flow, distance } = problem;
  if (locationOf.length !== n) return null;
  const taken = new Set<number>();
  for (let i = 0; i < n; i++) {
    const location = locationOf[i] as number;
    if (!Number.isInteger(location) || location < 0 || location >= n) return null;
    taken.add(location);
  }
  if (taken.size !== n) return null;
  let sum = 0;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const hop = (locationOf[i] as number) * n + (locationOf[j] as number);
      sum += (flow[i * n + j] as number) * (distance[hop] as number);
    }
  }
  return sum;
}
