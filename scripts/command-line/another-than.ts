/** Mappings that are to be avoided, from the files of `--another-than`. */
import { compileFabric } from '../../lib/fabric/compile';
import { measureMapping, objectiveOf } from '../../lib/mapping/metrics';
import { verifyMapping } from '../../lib/mapping/verify';
import { err, ok, type Result } from '../../lib/result';
import { type AnotherAsk, MOST_AVOIDED, type PlacementProblem } from '../../lib/solver/problem';
import { type Faults, readPlaced } from './read-document';

/** The other one is to cost at most what the first file's mapping costs, so that one has to be legal; all are checked. */
export function readAnotherThan(
  { kernel, fabric, objective, weights }: PlacementProblem,
  paths: readonly string[],
): Result<AnotherAsk, Faults> {
  if (paths.length > MOST_AVOIDED) return err([`--another-than: at most ${MOST_AVOIDED} files`]);
  const mappings = paths.map(readPlaced);
  const faults = mappings.flatMap((mapping, i) => {
    if (!mapping.ok) return mapping.error;
    const { placement, routes } = mapping.value;
    // Pins may have changed since it was made.
    return verifyMapping(kernel, fabric, { placement, routes, pins: {} }).map(
      ({ rule, message }) => `${paths[i]}:1:1: not a legal mapping of this kernel: ${rule}: ${message}`,
    );
  });
  const all = mappings.flatMap((mapping) => (mapping.ok ? [mapping.value] : []));
  const first = all[0];
  if (faults.length > 0 || !first) return err(faults);
  return ok({
    objectiveValue: objectiveOf(measureMapping(kernel, compileFabric(fabric), first), objective, weights),
    than: all.map(({ placement }) => placement),
  });
}
