/** What is said where no other mapping than given ones was found, proved or not. */
import type { InfeasibleReason, StopReason } from '../outcome';
import type { AnotherAsk } from '../problem';

const wanted = ({ objectiveValue, than }: AnotherAsk, hops: string): string =>
  `${than.length > 0 ? 'other ' : ''}placement of at most ${objectiveValue} ${hops}`;

/** `hops` says what the objective counts: wire hops, weighted path hops. */
export function noOtherReason(asked: AnotherAsk, hops: string): InfeasibleReason {
  const besides = asked.than.length > 0 ? ' besides mirror images of the ones shown' : '';
  return {
    code: 'no other',
    message: `Proved by exhaustive search: no ${wanted(asked, hops)} exists${besides}.`,
    opIds: [],
    tileIds: [],
    edgeIds: [],
  };
}

const why: Partial<Record<StopReason, string>> = {
  'time limit': 'was found within the time limit: allow more time',
  'node limit': 'was found within the node limit: allow more nodes',
  stopped: 'had been found when the solve was stopped',
  'memory limit': 'had been found when the memory limit was reached',
  'search complete': 'was met by the search, which proves nothing: use the exact search',
  'model too large': 'was met by the search, and the problem is too large for the exact search',
  'routing gap': 'was found, but of some placement it is not settled whether it can be routed',
};

export const noOtherYet = (asked: AnotherAsk, hops: string, stop: StopReason): string =>
  `No ${wanted(asked, hops)} ${why[stop] ?? 'was found'}.`;
