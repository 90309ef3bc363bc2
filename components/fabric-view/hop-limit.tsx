import type { Fabric } from '@/lib/fabric/fabric';
import { maxHops } from '@/lib/fabric/max-hops';

const figure = (value: number) => value.toLocaleString('en-GB', { maximumFractionDigits: 6 });

/** The formula with its numbers: "floor((5,000 − 400) / 600) = 7". Null: there is no clock. */
export function hopFormula(clock: Fabric['clock']): string | null {
  if (!clock) return null;
  const { periodPs, entryDelayPs, hopDelayPs } = clock;
  return `floor((${figure(periodPs)} − ${figure(entryDelayPs)}) / ${figure(hopDelayPs)}) = ${maxHops({ clock })}`;
}

interface HopLimitProps {
  /** `undefined` while the times on the screen are not all valid. */
  clock: Fabric['clock'] | undefined;
}

/** How far a value reaches within one cycle, worked out before the reader's eyes. */
export function HopLimit({ clock }: HopLimitProps) {
  if (clock === undefined)
    return <p className="text-sm text-quiet">Enter all three times to see the longest path.</p>;
  const limit = maxHops({ clock });
  if (clock === null || limit === null)
    return <p className="text-sm text-quiet">Paths of any length are allowed.</p>;
  return (
    <p className="text-sm" role="status">
      <span className="text-quiet">Longest path: </span>
      <span className="font-mono">{hopFormula(clock)}</span> {limit === 1 ? 'hop' : 'hops'}
      {limit === 0 ? (
        <span className="block text-madder">
          No value would reach a neighbour: lengthen the period or shorten the delays.
        </span>
      ) : null}
    </p>
  );
}
