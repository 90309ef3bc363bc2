/** `prove`: solves a certificate's problem again and tells whether everything comes out as it says. */
import { compileFabric } from '../../lib/fabric/compile';
import type { Certificate } from '../../lib/mapping/certificate';
import type { MappingDocument } from '../../lib/mapping/mapping';
import { measureMapping, objectiveOf } from '../../lib/mapping/metrics';
import { verifyMapping } from '../../lib/mapping/verify';
import { err, ok, type Result } from '../../lib/result';
import {
  type CertificateDifference,
  certificateDifferences,
  comparedFields,
  optionsAgain,
  problemAgain,
} from '../../lib/solver/certificate';
import { ENGINE_VERSION } from '../../lib/solver/engine-version';
import { SOLVE_LIMITS } from '../../lib/solver/options';
import type { SolveOutcome } from '../../lib/solver/outcome';
import type { PlacementProblem } from '../../lib/solver/problem';
import { problemDigest } from '../../lib/solver/problem-digest';
import { readArguments, wholeNumber } from './arguments';
import { printDocument, printFaults } from './print';
import {
  type Faults,
  readCertificate,
  readFabric,
  readKernel,
  readMapping,
  readPins,
  readWeights,
} from './read-document';
import { withSolver } from './solve';
import { usage } from './usage';

const names = ['kernel', 'fabric', 'certificate', 'pins', 'weights', 'mapping', 'time-limit-ms'] as const;
type Given = Partial<Record<(typeof names)[number], string>>;

interface ProveInput {
  certificate: Certificate;
  problem: PlacementProblem;
  mapping: MappingDocument | null;
  timeLimitMs: number;
}

export async function prove(args: readonly string[]): Promise<0 | 1 | 2> {
  const given = readArguments(args, names, ['kernel', 'fabric', 'certificate']);
  if (!given.ok) return printFaults(given.error);
  if (given.value.help) {
    process.stdout.write(usage);
    return 0;
  }
  const input = readInput(given.value);
  if (!input.ok) return printFaults(input.error);
  const { certificate, problem, mapping, timeLimitMs } = input.value;
  const other = otherProblem(given.value, certificate, problem);
  if (other) return printFaults([other]);
  const options = optionsAgain(certificate, timeLimitMs);
  const outcome = await withSolver(given.value, options, (solve) => solve(problem));
  if (!outcome.ok) return printFaults(outcome.error);
  const differences = [
    ...certificateDifferences(certificate, outcome.value),
    ...(mapping ? mappingDifferences(certificate, problem, mapping) : []),
  ];
  printDocument(answer(certificate, outcome.value, mapping, differences));
  return differences.length === 0 ? 0 : 1;
}

function readInput(given: Given): Result<ProveInput, Faults> {
  const kernel = readKernel(given.kernel ?? '');
  const fabric = readFabric(given.fabric ?? '');
  const certificate = readCertificate(given.certificate ?? '');
  const pins = given.pins === undefined ? ok(null) : readPins(given.pins);
  const mapping = given.mapping === undefined ? ok(null) : readMapping(given.mapping);
  const weights = given.weights === undefined ? ok(null) : readWeights(given.weights);
  const parts = [kernel, fabric, certificate, pins, weights, mapping];
  const faults: Faults = parts.flatMap((part) => (part.ok ? [] : part.error));
  const timeLimitMs = wholeNumber(given['time-limit-ms'] ?? String(SOLVE_LIMITS.timeLimitMs)) ?? 0;
  if (timeLimitMs < 1 || timeLimitMs > SOLVE_LIMITS.timeLimitMs) {
    faults.push(`--time-limit-ms: a whole number from 1 to ${SOLVE_LIMITS.timeLimitMs}`);
  }
  if (
    !kernel.ok ||
    !fabric.ok ||
    !certificate.ok ||
    !pins.ok ||
    !weights.ok ||
    !mapping.ok ||
    faults.length > 0
  ) {
    return err(faults);
  }
  const again = problemAgain(certificate.value, { kernel: kernel.value, fabric: fabric.value });
  const problem = {
    ...again,
    ...(pins.value && { pins: pins.value }),
    ...(weights.value && { weights: weights.value }),
  };
  return ok({ certificate: certificate.value, problem, mapping: mapping.value, timeLimitMs });
}

/** What to say where the certificate is not of the problem that the files are; null where it is. */
function otherProblem(given: Given, { problemDigest: certified }: Certificate, problem: PlacementProblem) {
  const found = problemDigest(problem);
  if (found === certified) return null;
  const files = [given.kernel, given.fabric, given.pins, given.weights]
    .filter((file) => file !== undefined)
    .join(', ');
  return `${given.certificate}:1:1: problemDigest: This certificate is of another problem: its digest is ${certified}, that of ${files} is ${found}.`;
}

/** Whether the mapping is a legal one of the problem, with the value that was proved. */
function mappingDifferences(
  certificate: Certificate,
  { kernel, fabric, pins, objective, weights }: PlacementProblem,
  { placement, routes }: MappingDocument,
): CertificateDifference[] {
  const broken = verifyMapping(kernel, fabric, { placement, routes, pins });
  if (broken.length > 0) {
    const found = broken.map(({ rule, message }) => `${rule}: ${message}`);
    return [{ what: 'mapping', certificate: 'legal', found }];
  }
  const metrics = measureMapping(kernel, compileFabric(fabric), { placement, routes });
  const value = objectiveOf(metrics, objective, weights);
  return value === certificate.objectiveValue
    ? []
    : [{ what: 'mapping', certificate: certificate.objectiveValue, found: value }];
}

function answer(
  certificate: Certificate,
  outcome: SolveOutcome,
  mapping: MappingDocument | null,
  differences: readonly CertificateDifference[],
): object {
  return {
    agrees: differences.length === 0,
    differences,
    compared: [...comparedFields(certificate, outcome.certificate), ...(mapping ? ['mapping'] : [])],
    engineVersion: { certificate: certificate.engineVersion, found: ENGINE_VERSION },
    elapsedMs: outcome.elapsedMs,
  };
}
