/** The placement problem that a command's options name, and where in its files a fault lies. */
import type { Fabric } from '../../lib/fabric/fabric';
import type { Kernel } from '../../lib/graph/kernel';
import { type Objective, objectives, type Pins } from '../../lib/mapping/mapping';
import { err, ok, type Result } from '../../lib/result';
import type { InputFault, PlacementProblem } from '../../lib/solver/problem';
import { type Faults, placeInFile, readFabric, readKernel, readPins } from './read-document';

/** What was given of --kernel, --fabric, --pins and --objective. */
export interface GivenProblem {
  kernel?: string;
  fabric?: string;
  pins?: string;
  objective?: string;
}

export function readProblem(given: GivenProblem): Result<PlacementProblem, Faults> {
  const kernel: Result<Kernel, Faults> = readKernel(given.kernel ?? '');
  const fabric: Result<Fabric, Faults> = readFabric(given.fabric ?? '');
  const pins: Result<Pins, Faults> = given.pins === undefined ? ok({}) : readPins(given.pins);
  const objective: Objective | undefined = objectives.find((one) => one === (given.objective ?? 'wire'));
  const faults = [kernel, fabric, pins].flatMap((part) => (part.ok ? [] : part.error));
  if (!objective) faults.push(`--objective: one of ${objectives.join(', ')}`);
  if (!kernel.ok || !fabric.ok || !pins.ok || !objective) return err(faults);
  return ok({ kernel: kernel.value, fabric: fabric.value, pins: pins.value, objective });
}

/** file:line:column of the first place that names the op or connection at fault. */
export function inputFaultLine(given: GivenProblem, { part, message, id }: InputFault): string {
  const path = (part === 'pins' ? given.pins : part === 'fabric' ? given.fabric : given.kernel) ?? '';
  return `${path}:${placeInFile(path, id)}: ${message}`;
}
