/** Makes the certificate of a proved answer, and holds two of one problem against each other. */
import type { Certificate, ProofMethod } from '../mapping/certificate';
import { effectiveWeights } from '../mapping/weights';
import { ENGINE_VERSION } from './engine-version';
import type { ExactLevel } from './exact/exact-search';
import type { SolveOptions } from './options';
import type { SolveOutcome } from './outcome';
import type { PlacementProblem } from './problem';
import { problemDigest } from './problem-digest';

/** What the passes of a solve leave behind for its certificate. */
export interface ProofNotes {
  /** Of the highest bound, or of the infeasibility; null where the bound was given with the problem. */
  method: ProofMethod | null;
  /** Placements that the search has tried to route before the proof. */
  searchTries: number;
  levels: readonly ExactLevel[];
  struckTiles: number;
}

/**
 * Null where nothing is proved, or not here: a bound that was given with the problem had its proof elsewhere, and that
 * there is no other mapping than given ones says nothing of the problem itself.
 */
export function certificateOf(
  problem: PlacementProblem,
  options: SolveOptions,
  outcome: SolveOutcome,
  { method, searchTries, levels, struckTiles, isRepeatable }: ProofNotes & { isRepeatable: boolean },
): Certificate | null {
  const { status, objectiveValue, bound, nodes } = outcome;
  const weights = effectiveWeights(problem.weights, problem.objective);
  if ((status !== 'optimal' && status !== 'infeasible') || method === null || problem.another) return null;
  return {
    format: 'pinloom.certificate',
    formatVersion: 1,
    engineVersion: ENGINE_VERSION,
    problemDigest: problemDigest(problem),
    objective: problem.objective,
    ...(weights && { weights }),
    pins: problem.pins,
    start: problem.start ?? null,
    engine: options.engine,
    seed: options.seed,
    searchTries,
    status,
    objectiveValue,
    bound,
    method,
    nodes,
    levels: levels.map(({ cutoff, nodes: visited }) => ({ cutoff, nodes: visited })),
    struckTiles,
    // A given bound may end the search sooner, and the certificate does not hold it.
    isRepeatable: isRepeatable && !problem.provenBound,
  };
}

/** The problem that a certificate is about, to be solved again: kernel and fabric as they are given. */
export const problemAgain = (
  { objective, weights, pins, start }: Certificate,
  { kernel, fabric, units }: Pick<PlacementProblem, 'kernel' | 'fabric' | 'units'>,
): PlacementProblem => ({
  kernel,
  fabric,
  objective,
  pins,
  ...(weights && { weights }),
  ...(start && { start }),
  ...(units && { units }),
});

/** The options that lead to the same nodes, as long as `timeLimitMs` is not reached. */
export const optionsAgain = (
  { engine, seed, searchTries }: Certificate,
  timeLimitMs: number,
): SolveOptions => ({ engine, seed, searchTries, timeLimitMs, nodeLimit: null });

/** A field in which the certificate and what was found now differ. */
export interface CertificateDifference {
  what: string;
  certificate: unknown;
  found: unknown;
}

const always = ['problemDigest', 'status', 'objectiveValue', 'bound'] as const;
const ifRepeatable = ['method', 'nodes', 'levels', 'struckTiles'] as const;

/** The fields that must come out equal. How it was proved only where nothing but counts decided that, then and now. */
export function comparedFields(
  certificate: Certificate,
  again: Certificate | null,
): (keyof Certificate & string)[] {
  const isRepeatable =
    certificate.isRepeatable &&
    certificate.engineVersion === ENGINE_VERSION &&
    (again?.isRepeatable ?? false);
  return [...always, ...(isRepeatable ? ifRepeatable : [])];
}

/** Holds a certificate against the outcome of solving its problem again. Empty: they agree. */
export function certificateDifferences(
  certificate: Certificate,
  outcome: SolveOutcome,
): CertificateDifference[] {
  const again = outcome.certificate;
  if (!again) {
    const found = `${outcome.status} (${outcome.stopReason})`;
    return [{ what: 'status', certificate: certificate.status, found }];
  }
  return comparedFields(certificate, again)
    .filter((what) => JSON.stringify(certificate[what]) !== JSON.stringify(again[what]))
    .map((what) => ({ what, certificate: certificate[what], found: again[what] }));
}
