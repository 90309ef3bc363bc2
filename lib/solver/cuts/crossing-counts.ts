/** How many nets cross a cut as its ops take sides one by one. */
import type { PlacementInstance } from '../instance';
import { FREE, INSIDE } from './forced-crossings';

export interface CrossingCounts {
  /** Of each op, `FREE` as long as it has none. */
  sides: Int8Array;
  /** Returns the nets touched. */
  put(op: number, side: number): number;
  lift(op: number): void;
  /** Ops on each side. */
  inside(): number;
  outside(): number;
  /** Channels that are missing at least, out and in together, whatever side the other ops take. */
  missing(): number;
  /** More than 0 where most of what the op is joined to stands inside, less where outside. */
  pull(op: number): number;
}

/** A net leaves or enters; `both` where its consumers are on both sides and its source has none yet: it will do either. */
type Crosses = 'no' | 'leaves' | 'enters' | 'either';

/** Nets that each op is a terminal of. */
export type NetsAt = readonly (readonly number[])[];

export function netsAtOps({ nets, opCount }: PlacementInstance): NetsAt {
  const netsAt: number[][] = Array.from({ length: opCount }, () => []);
  nets.forEach(({ source, consumers }, net) => {
    for (const op of [source, ...consumers]) netsAt[op]?.push(net);
  });
  return netsAt;
}

export function crossingCounts(
  { nets, opCount }: PlacementInstance,
  netsAt: NetsAt,
  { channelsOut, channelsIn }: { channelsOut: number; channelsIn: number },
): CrossingCounts {
  const sides = new Int8Array(opCount);
  const within = new Int32Array(nets.length);
  const beyond = new Int32Array(nets.length);
  const counts: Record<Crosses, number> = { no: nets.length, leaves: 0, enters: 0, either: 0 };
  const onSide = { inside: 0, outside: 0 };
  const crosses = (net: number): Crosses => {
    const from = sides[nets[net]?.source as number];
    const hasWithin = (within[net] as number) > 0;
    const hasBeyond = (beyond[net] as number) > 0;
    if (from === FREE) return hasWithin && hasBeyond ? 'either' : 'no';
    if (from === INSIDE) return hasBeyond ? 'leaves' : 'no';
    return hasWithin ? 'enters' : 'no';
  };
  const move = (op: number, side: number, by: 1 | -1) => {
    const own = netsAt[op] ?? [];
    for (const net of own) counts[crosses(net)]--;
    sides[op] = by === 1 ? side : FREE;
    onSide[side === INSIDE ? 'inside' : 'outside'] += by;
    const tally = side === INSIDE ? within : beyond;
    for (const net of own) {
      if (nets[net]?.source !== op) tally[net] = (tally[net] as number) + by;
      counts[crosses(net)]++;
    }
    return own.length + 1;
  };
  return {
    sides,
    put: (op, side) => move(op, side, 1),
    lift: (op) => void move(op, sides[op] as number, -1),
    inside: () => onSide.inside,
    outside: () => onSide.outside,
    missing: () => {
      const [out, back] = [counts.leaves - channelsOut, counts.enters - channelsIn];
      const spare = Math.max(0, -out) + Math.max(0, -back);
      return Math.max(0, out) + Math.max(0, back) + Math.max(0, counts.either - spare);
    },
    pull: (op) =>
      (netsAt[op] ?? []).reduce((sum, net) => {
        const source = nets[net]?.source as number;
        return (
          sum +
          (source === op ? 0 : (sides[source] as number)) +
          (within[net] as number) -
          (beyond[net] as number)
        );
      }, 0),
  };
}
