/** Which engines to try for a model, in which order and for how long. */
import type { IntegerProgram } from '../integer-program/integer-program';
import type { EngineChoice } from '../options';
import type { Engine } from './engine';

/**
 * The simplex engine is tried first on models of at most so many entries, and for so long. Measured in
 * docs/solver.md: below, it beats the start of HiGHS; above, it seldom ends at all.
 */
export const SIMPLEX_ENTRIES = 200;
export const SIMPLEX_TIME_LIMIT_MS = 300;

export interface Attempt {
  engine: Engine;
  timeLimitMs: number;
}

export function attemptsFor(
  program: IntegerProgram,
  choice: EngineChoice,
  engines: readonly Engine[],
  remainingMs: number,
): Attempt[] {
  const whole = (engine: Engine): Attempt => ({ engine, timeLimitMs: remainingMs });
  if (choice !== 'program') return engines.map(whole);
  const simplex = engines.find((engine) => engine.name === 'simplex');
  const others = engines.filter((engine) => engine !== simplex);
  const isSmall = program.entryValue.length <= SIMPLEX_ENTRIES;
  const first =
    simplex && isSmall
      ? [{ engine: simplex, timeLimitMs: Math.min(remainingMs, SIMPLEX_TIME_LIMIT_MS) }]
      : [];
  if (others.length === 0 && simplex) return [whole(simplex)];
  return [...first, ...others.map(whole)];
}
