import { beforeAll, describe, expect, it } from 'vitest';
import { demoFabrics } from '@/db/seed/fabrics';
import { demoKernels } from '@/db/seed/kernels';
import { demoMappings } from '@/db/seed/mappings';
import type { Fabric } from '@/lib/fabric/fabric';
import type { Kernel } from '@/lib/graph/kernel';
import { type Certificate, certificateSchema } from '@/lib/mapping/certificate';
import type { Objective, Pins, Placement } from '@/lib/mapping/mapping';
import { weightsSchema } from '@/lib/mapping/weights';
import { certificateDifferences, comparedFields, optionsAgain, problemAgain } from '@/lib/solver/certificate';
import type { Engine } from '@/lib/solver/engines/engine';
import { highsEngine } from '@/lib/solver/engines/highs';
import { defaultSolveOptions, type SolveOptions } from '@/lib/solver/options';
import type { SolveOutcome } from '@/lib/solver/outcome';
import type { PlacementProblem } from '@/lib/solver/problem';
import { problemDigest } from '@/lib/solver/problem-digest';
import { solve } from '@/lib/solver/solve';
import { gaugeKernel, smallFabric } from '../../helpers/documents';

const kernel = (slug: string): Kernel => demoKernels.find((one) => one.slug === slug)?.kernel as Kernel;
const fabric = (key: string): Fabric => demoFabrics.find((one) => one.key === key)?.fabric as Fabric;
const problem = (slug: string, key = 'hive', objective: Objective = 'wire'): PlacementProblem => ({
  kernel: kernel(slug),
  fabric: fabric(key),
  pins: {},
  objective,
});

let engines: Engine[] = [];
beforeAll(async () => {
  engines = [await highsEngine()];
});

const LIMIT_MS = 3_600_000;

/** Each look at the clock takes `tickMs`. */
function outcomeOf(of: PlacementProblem, more: Partial<SolveOptions> = {}, tickMs = 0): SolveOutcome {
  let nowMs = 0;
  const result = solve(
    of,
    { ...defaultSolveOptions, timeLimitMs: LIMIT_MS, ...more },
    {
      nowMs: () => {
        nowMs += tickMs;
        return nowMs;
      },
      shouldStop: () => false,
      onProgress: () => undefined,
      engines,
    },
  );
  if (!result.ok) throw new Error(result.error.messages.join('\n'));
  return result.value;
}

const proved = (of: PlacementProblem, more: Partial<SolveOptions> = {}, tickMs = 0): Certificate =>
  certificateSchema.parse(outcomeOf(of, more, tickMs).certificate);

const again = (certificate: Certificate, of: PlacementProblem): SolveOutcome =>
  outcomeOf(problemAgain(certificate, of), optionsAgain(certificate, LIMIT_MS));

describe('the certificate of a solve', { timeout: 30_000 }, () => {
  it('names the weights, counts levels in weighted hops, and comes out the same when solved again', () => {
    const surge = problem('surge-detector');
    const sources = [...new Set(surge.kernel.edges.map((edge) => edge.from))];
    const nets = Object.fromEntries(sources.map((source, i) => [source, [0.5, 0.1, 1][i % 3]]));
    const weighted = { ...surge, weights: weightsSchema.parse({ nets }) };
    const certificate = proved(weighted);
    const named = Object.fromEntries(Object.entries(nets).filter(([, weight]) => weight !== 1));
    expect(certificate).toMatchObject({
      weights: { nets: named },
      method: 'exact search',
      isRepeatable: true,
    });
    const cutoffs = certificate.levels.map((level) => level.cutoff);
    expect(cutoffs.length).toBeGreaterThan(0);
    // Whole tenths, below the optimum.
    expect(cutoffs.map((cutoff) => Math.round(cutoff * 10) / 10)).toEqual(cutoffs);
    expect(Math.max(...cutoffs)).toBeLessThanOrEqual(certificate.objectiveValue ?? 0);
    expect(certificateDifferences(certificate, again(certificate, surge))).toEqual([]);
    expect(certificate.problemDigest).not.toBe(problemDigest(surge));
  });

  it('tells the levels, nodes and struck choices of the exact search', () => {
    const certificate = proved(problem('surge-detector'));
    expect(certificate).toMatchObject({
      status: 'optimal',
      method: 'exact search',
      objectiveValue: 14,
      bound: 14,
      start: null,
      seed: 1,
      isRepeatable: true,
    });
    // The last level that was searched through is the one just below the optimum.
    expect(certificate.levels.at(-1)?.cutoff).toBe(13);
    expect(certificate.nodes).toBeGreaterThan(0);
    expect(certificate.struckTiles).toBeGreaterThan(0);
  });

  it.each<[string, PlacementProblem, Partial<SolveOptions>, Partial<Certificate>]>([
    [
      'five ops in a chain need 4 links',
      problem('scale-and-clamp'),
      {},
      { method: 'counting', objectiveValue: 4 },
    ],
    [
      'what each op pays its neighbours',
      problem('sparse-dot-product'),
      {},
      { method: 'bound of the stars', objectiveValue: 7 },
    ],
    [
      'too few memory units',
      problem('smoothing-filter'),
      {},
      { method: 'counting', status: 'infeasible', objectiveValue: null, bound: null },
    ],
    [
      'an engine outside, which has a clock of its own',
      { ...problem('scale-and-clamp', 'gauge', 'path'), pins: { op_raw: 'r1c3', op_level: 'r0c0' } as Pins },
      { engine: 'highs' },
      { method: 'integer program', objectiveValue: 6, nodes: 0, isRepeatable: false },
    ],
  ])(
    'names what proves it: %s',
    (_, of, options, expected) => {
      expect(proved(of, options)).toMatchObject(expected);
    },
    30_000,
  );

  it.each<[string, SolveOutcome]>([
    ['a mapping that is not proved', outcomeOf(problem('gradient'), { nodeLimit: 16 })],
    ['a solve that found nothing', outcomeOf(problem('gradient'), { timeLimitMs: 1 }, 1)],
  ])('is none for %s', (_, { certificate, status }) => {
    expect(['feasible', 'unknown']).toContain(status);
    expect(certificate).toBeNull();
  });
});

describe('an answer whose proof is not of this solve', { timeout: 30_000 }, () => {
  const of = problem('surge-detector');

  it('has no certificate where the bound was given with the problem', () => {
    const outcome = outcomeOf({ ...of, provenBound: 14 });
    expect(outcome).toMatchObject({ status: 'optimal', bound: 14, certificate: null });
  });

  it('has one where the given bound was not enough, which cannot promise the same nodes', () => {
    const certificate = proved({ ...of, provenBound: 13 });
    expect(certificate).toMatchObject({ objectiveValue: 14, method: 'exact search', isRepeatable: false });
    expect(certificateDifferences(certificate, again(certificate, of))).toEqual([]);
  });

  it('has none where there is no other mapping than a given one', () => {
    const { kernel: oneOp, fabric: one } = { kernel: gaugeKernel(), fabric: smallFabric() };
    const best = outcomeOf({ kernel: oneOp, fabric: one, pins: {}, objective: 'wire' });
    const another = { objectiveValue: best.objectiveValue ?? 0, than: [best.placement ?? {}] };
    const outcome = outcomeOf({ kernel: oneOp, fabric: one, pins: {}, objective: 'wire', another });
    expect(outcome).toMatchObject({
      status: 'infeasible',
      explanation: { code: 'no other' },
      certificate: null,
    });
    expect(best.certificate).not.toBeNull();
  });
});

describe('the digest of a problem', () => {
  it('is what stored certificates say of it', () => {
    const stored = 'sha256:0bce1b63039662a9298bdab0f0684d07c6ce23894e6d61113371ad2da39077ec';
    expect(problemDigest({ kernel: gaugeKernel(), fabric: smallFabric(), pins: {}, objective: 'wire' })).toBe(
      stored,
    );
  });
});

describe('the mappings of the demonstration', () => {
  const solved = demoMappings.flatMap((mapping) =>
    mapping.provenance.by === 'solver' && mapping.provenance.certificate
      ? [{ ...mapping, certificate: mapping.provenance.certificate }]
      : [],
  );

  it('have certificates of their own kernels and fabrics', () => {
    expect(solved.length).toBeGreaterThan(3);
    for (const { kernelSlug, fabricKey, pins, certificate } of solved) {
      const of = { kernel: kernel(kernelSlug), fabric: fabric(fabricKey), pins, objective: 'wire' } as const;
      expect(certificate.problemDigest).toBe(problemDigest(of));
    }
  });
});

describe('a problem solved again by its certificate', { timeout: 30_000 }, () => {
  // An optimal mapping, so that trying it alone leaves the proof less to do than any first slice would.
  const start = outcomeOf(problem('wavelet-step')).placement as Placement;
  const pins = { op_even: 'r3c0' } as Pins;

  it.each<[string, PlacementProblem, Partial<SolveOptions>]>([
    ['as it was', problem('fourier-butterfly'), {}],
    ['with another seed', problem('surge-detector'), { seed: 77 }],
    ['under a node limit', problem('wavelet-step', 'slope'), { nodeLimit: 5000 }],
    ['from a start', { ...problem('wavelet-step'), start }, { searchTries: 1 }],
    ['with pins', { ...problem('wavelet-step'), pins }, {}],
    ['infeasible', problem('tilt-direction'), {}],
  ])(
    'comes to the same nodes and levels: %s',
    (_, of, options) => {
      const certificate = proved(of, options);
      const outcome = again(certificate, of);
      expect(certificateDifferences(certificate, outcome)).toEqual([]);
      expect(outcome.certificate).toEqual(certificate);
    },
    30_000,
  );

  it('does so although its share of the time had cut off the search', () => {
    const of = problem('wavelet-step');
    const whole = proved(of);
    const cut = proved(of, {}, 4000);
    expect(cut.searchTries).toBeLessThan(whole.searchTries);
    expect(again(cut, of).certificate).toEqual(cut);
  }, 30_000);
});

describe('a certificate held against a second solve', { timeout: 30_000 }, () => {
  const of = problem('surge-detector');
  let certificate: Certificate;
  let outcome: SolveOutcome;
  beforeAll(() => {
    certificate = proved(of);
    outcome = again(certificate, of);
  });

  it.each<[string, Partial<Certificate>]>([
    ['problemDigest', { problemDigest: `sha256:${'0'.repeat(64)}` }],
    ['status', { status: 'infeasible' }],
    ['objectiveValue', { objectiveValue: 15 }],
    ['bound', { bound: 15 }],
    ['method', { method: 'counting' }],
    ['nodes', { nodes: 4800 }],
    ['levels', { levels: [{ cutoff: 12.5, nodes: 1 }] }],
    ['struckTiles', { struckTiles: 1 }],
  ])('differs where only %s was changed', (what, change) => {
    const differences = certificateDifferences({ ...certificate, ...change }, outcome);
    expect(differences).toHaveLength(1);
    expect(differences[0]).toMatchObject({
      what,
      certificate: Object.values(change)[0],
      found: outcome.certificate?.[what as keyof Certificate],
    });
  });

  it.each<[string, Partial<Certificate>]>([
    ['another engine version', { engineVersion: 99 }],
    ['a solve that time had ended', { isRepeatable: false }],
  ])('need not have the same nodes, only the same answer, after %s', (_, change) => {
    const other = { ...certificate, ...change, nodes: 9999, levels: [], method: 'counting' as const };
    expect(certificateDifferences(other, outcome)).toEqual([]);
    expect(certificateDifferences({ ...other, bound: 13 }, outcome)).toHaveLength(1);
    expect(comparedFields(other, outcome.certificate)).toEqual([
      'problemDigest',
      'status',
      'objectiveValue',
      'bound',
    ]);
  });

  it('differs where the second solve proves nothing', () => {
    const cutShort = outcomeOf(of, { nodeLimit: 16 });
    expect(certificateDifferences(certificate, cutShort)).toEqual([
      { what: 'status', certificate: 'optimal', found: 'feasible (node limit)' },
    ]);
  });
});

describe('the schema', () => {
  let certificate: Certificate;
  beforeAll(() => {
    certificate = proved(problem('surge-detector'));
  }, 30_000);

  it.each<[string, object]>([
    ['an optimum without a value', { objectiveValue: null, bound: null }],
    ['an optimum above its bound', { bound: 13 }],
    ['no mapping, but a value', { status: 'infeasible' }],
    ['more nodes in the levels than in all', { nodes: 3 }],
    ['a digest of another kind', { problemDigest: 'md5:00' }],
    ['a format version that is not known', { formatVersion: 2 }],
    ['a field that is not known', { proof: 'trust me' }],
  ])('refuses %s', (_, change) => {
    expect(certificateSchema.safeParse({ ...certificate, ...change }).success).toBe(false);
  });
});
