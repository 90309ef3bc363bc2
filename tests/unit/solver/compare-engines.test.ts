import { describe, expect, it } from 'vitest';
import { compareEngines } from '../../../scripts/bench/compare-engines';

const run = (name: string, asked: string, status: string, elapsedMs: number) => ({
  case: name,
  asked,
  status,
  elapsedMs,
});

describe('the comparison of engines', () => {
  const runs = [
    run('a', 'auto', 'optimal', 10),
    run('a', 'highs', 'optimal', 200),
    run('b', 'auto', 'infeasible', 0.2),
    run('b', 'highs', 'infeasible', 5),
    run('c', 'auto', 'feasible', 900),
    run('c', 'highs', 'optimal', 800),
    run('d', 'auto', 'optimal', 30),
    run('d', 'highs', 'feasible', 900),
  ];

  it('takes the geometric mean over what both settled, times below a millisecond as one: √(20 · 5) = 10', () => {
    const [against] = compareEngines(runs, ['auto', 'highs']);
    expect(against?.timesFaster).toBeCloseTo(10, 9);
  });

  it('names what only the other one settled', () => {
    expect(compareEngines(runs, ['auto', 'highs'])).toEqual([
      expect.objectContaining({ settledByFirst: 3, settledByOther: 3, missedByFirst: ['c'] }),
    ]);
  });

  it('has no figure where no case was settled by both', () => {
    expect(compareEngines(runs.slice(6), ['auto', 'highs'])[0]?.timesFaster).toBeNull();
  });
});
