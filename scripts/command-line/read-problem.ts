/** The placement problem that a command's options name, and where in its files a fault lies. */
import type { Fabric } from '../../lib/fabric/fabric';
import type { Kernel } from '../../lib/graph/kernel';
import { type Objective, objectives, type Pins } from '../../lib/mapping/mapping';
import type { Weights } from '../../lib/mapping/weights';
import { err, ok, type Result } from '../../lib/result';
import type { InputFault, PlacementProblem } from '../../lib/solver/problem';
import { type Faults, placeInFile, readFabric, readKernel, readPins, readWeights } from './read-document';

/** What was given of --kernel, --fabric, --pins, --objective and --weights. */
export interface GivenProblem {
  kernel?: string;
  fabric?: string;
  pins?: string;
  objective?: string;
  weights?: string;
}

export function readProblem(given: GivenProblem): Result<PlacementProblem, Faults> {
  const kernel: Result<Kernel, Faults> = readKernel(given.kernel ?? '');
  const fabric: Result<Fabric, Faults> = readFabric(given.fabric ?? '');
  const pins: Result<Pins, Faults> = given.pins === undefined ? ok({}) : readPins(given.pins);
  const objective: Objective | undefined = objectives.find((one) => one === (given.objective ?? 'wire'));
  const weights: Result<Weights, Faults> = given.weights === undefined ? ok({}) : readWeights(given.weights);
  const faults = [kernel, fabric, pins, weights].flatMap((part) => (part.ok ? [] : part.error));
  if (!objective) faults.push(`--objective: one of ${objectives.join(', ')}`);
  if (!kernel.ok || !fabric.ok || !pins.ok || !weights.ok || !objective) return err(faults);
  return ok({
    kernel: kernel.value,
    fabric: fabric.value,
    pins: pins.value,
    objective,
    ...(given.weights !== undefined && { weights: weights.value }),
  });
}

/** file:line:column of the first place that names the op or connection at fault. */
export function inputFaultLine(given: GivenProblem, { part, message, id }: InputFault): string {
  const isOwnFile = part === 'pins' || part === 'weights' || part === 'fabric';
  const path = given[isOwnFile ? part : 'kernel'] ?? '';
  return `${path}:${placeInFile(path, id)}: ${message}`;
}
