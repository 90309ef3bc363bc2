/** A fixed piece of work, by which the times of one run can be compared with those of another machine. */
import { median } from './measurement';

const COUNT = 400_000;
const REPEATS = 5;

/** Fills and sorts an array of numbers that are the same at every call (a linear congruence), in ms; the median of 5. */
export function yardstickMs(): number {
  const times: number[] = [];
  for (let repeat = 0; repeat < REPEATS; repeat++) {
    const startMs = performance.now();
    let state = 1;
    const numbers = Float64Array.from({ length: COUNT }, () => {
      state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
      return state;
    });
    numbers.sort();
    times.push(performance.now() - startMs);
  }
  return median(times) ?? Number.NaN;
}
