import { type Solve, valueText } from './solve-state';

const WIDTH = 236;
const HEIGHT = 92;
const PAD = { left: 26, right: 6, top: 8, bottom: 16 };

const compact = new Intl.NumberFormat('en-GB', { notation: 'compact', maximumSignificantDigits: 3 });
/** Short also for weighted values of ten digits. */
const axisText = (value: number): string => (value < 10_000 ? valueText(value) : compact.format(value));

/** From a round number below to one above; whole ones where the values are more than one apart. */
function range(values: readonly number[]): [low: number, high: number] {
  const [least, most] = [Math.min(...values), Math.max(...values)];
  const apart = most - least;
  const grain = apart >= 1 || apart === 0 ? 1 : 10 ** Math.floor(Math.log10(apart));
  const low = Math.floor(least / grain) * grain;
  return [low, Math.max(low + grain, Math.ceil(most / grain) * grain)];
}

/** Best value and lower bound over time. The figures beside it say the same. */
export function BestChart({ history, elapsedMs }: Pick<Solve, 'history' | 'elapsedMs'>) {
  const values = history.flatMap((point) => [point.best, point.bound]).filter((value) => value !== null);
  if (values.length === 0) return null;
  const [low, high] = range(values);
  const lastMs = Math.max(1, elapsedMs, history.at(-1)?.elapsedMs ?? 0);
  const x = (ms: number) => PAD.left + ((WIDTH - PAD.left - PAD.right) * ms) / lastMs;
  const y = (value: number) =>
    HEIGHT - PAD.bottom - ((HEIGHT - PAD.top - PAD.bottom) * (value - low)) / (high - low);
  const steps = (of: 'best' | 'bound') => {
    let path = '';
    let last: number | null = null;
    for (const point of history) {
      const value = point[of];
      if (value === null) continue;
      path += path === '' ? `M${x(point.elapsedMs)} ${y(value)}` : `H${x(point.elapsedMs)}V${y(value)}`;
      last = value;
    }
    return last === null ? '' : `${path}H${x(lastMs)}`;
  };
  return (
    <svg
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      className="mt-2 block w-full border border-rule bg-surface"
      aria-hidden="true"
    >
      <path
        d={`M${PAD.left} ${PAD.top}V${HEIGHT - PAD.bottom}H${WIDTH - PAD.right}`}
        fill="none"
        stroke="var(--rule)"
      />
      <path
        d={steps('bound')}
        fill="none"
        stroke="var(--verdigris)"
        strokeWidth={1.6}
        strokeDasharray="4 3"
      />
      <path d={steps('best')} fill="none" stroke="var(--ink)" strokeWidth={1.8} />
      <g className="font-mono" fontSize={9} fill="var(--quiet)">
        <text x={PAD.left - 4} y={y(high) + 3} textAnchor="end">
          {axisText(high)}
        </text>
        <text x={PAD.left - 4} y={y(low) + 3} textAnchor="end">
          {axisText(low)}
        </text>
        <text x={WIDTH - PAD.right} y={HEIGHT - 4} textAnchor="end">
          {(lastMs / 1000).toFixed(1)} s
        </text>
      </g>
      <g fontSize={10}>
        <text x={PAD.left + 6} y={HEIGHT - 4} fill="var(--ink)">
          — best
        </text>
        <text x={PAD.left + 48} y={HEIGHT - 4} fill="var(--verdigris)">
          - - bound
        </text>
      </g>
    </svg>
  );
}
