/** What a pin costs: the least objective with it, less the least objective without it, as far as both are known. */
import type { Objective } from '../mapping/mapping';
import type { SolveOutcome } from './outcome';

export type PinPrice =
  | { kind: 'exact'; hops: number }
  /** The price is one of these or between them. */
  | { kind: 'between'; leastHops: number; mostHops: number }
  /** Without the pin there is a legal mapping, with it there is none. */
  | { kind: 'makes infeasible' }
  | { kind: 'unknown' };

/** What is known of a problem's least objective: a solve's outcome, or what several solves have shown together. */
export interface Answer {
  status: SolveOutcome['status'];
  objective: Objective;
  /** Of the best legal mapping known; null where none is. */
  objectiveValue: number | null;
  /** No legal mapping is cheaper; null where nothing is proved, or where there is no legal mapping. */
  bound: number | null;
}

/**
 * Hops in the outcomes' objective. Preconditions: the same kernel, fabric and objective, and the same pins but for one
 * that only the first has. Then each legal mapping with the pin is one without it, so that a bound without the pin
 * holds with it too. `exact` exactly where both least objectives are thereby proved and exist.
 */
export function pinPrice(withPin: Answer, withoutPin: Answer): PinPrice {
  if (withPin.objective !== withoutPin.objective) return { kind: 'unknown' };
  if (withPin.status === 'infeasible') {
    return { kind: withoutPin.objectiveValue === null ? 'unknown' : 'makes infeasible' };
  }
  // Nothing found with the pin: the price has no upper end. Nothing possible without it: the outcomes contradict each other.
  if (withPin.objectiveValue === null || withoutPin.status === 'infeasible') return { kind: 'unknown' };
  const mostWith = withPin.objectiveValue;
  const leastWithout = withoutPin.bound ?? 0;
  const leastWith = Math.max(withPin.bound ?? 0, leastWithout);
  const leastHops = Math.max(0, leastWith - (withoutPin.objectiveValue ?? mostWith));
  const mostHops = Math.max(0, mostWith - leastWithout);
  return leastHops >= mostHops ? { kind: 'exact', hops: mostHops } : { kind: 'between', leastHops, mostHops };
}
