import type { MappingDraftView } from '@/db/queries/mapping-drafts';
import type { SolveView } from '@/db/queries/solve-jobs';
import type { KnownSide, SolveAsk } from '@/db/schema/solve-jobs';
import { compileFabric } from '@/lib/fabric/compile';
import type { Objective, Pins, Placement } from '@/lib/mapping/mapping';
import { measureMapping, objectiveOf } from '@/lib/mapping/metrics';
import { verifyMapping } from '@/lib/mapping/verify';
import type { Weights } from '@/lib/mapping/weights';
import { type EarlierSolve, knownAnswer } from '@/lib/solver/known-answer';
import { type Ask, otherSide, pinsOfSide } from '@/lib/solver/solve-ask';

type Bench = Pick<MappingDraftView, 'kernel' | 'fabric' | 'document'>;
type Known = EarlierSolve & { solveId: SolveView['id'] | null };

/** What a solve of an ask is given: its own pins, where it starts, and what is known already. */
export interface AskedSolve {
  pins: Pins;
  startPlacement: Placement | null;
  ask: SolveAsk;
}

/** `solves` are the bench's, in any state. A bench's kernel and fabric versions never change, so all of them count. */
export function askedSolve(
  bench: Bench,
  solves: readonly SolveView[],
  asked: {
    ask: Ask;
    objective: Objective;
    weights?: Weights;
    pins: Pins;
    startPlacement: Placement | null;
  },
): AskedSolve {
  const { ask, objective, weights, pins, startPlacement } = asked;
  const known = [...solves.map(earlierSolve), ...onTheBench(bench, objective, weights)];
  const answerFor = (wanted: Pins) => knownAnswer(wanted, objective, known, weights);
  if (ask.kind === 'another') {
    const provenBound = answerFor(pins).bound ?? 0;
    return { pins, startPlacement, ask: { ...ask, provenBound } };
  }
  const ownPins = pinsOfSide(pins, ask);
  const own = answerFor(ownPins);
  const other = pinsOfSide(pins, { ...ask, side: otherSide(ask.side) });
  return {
    pins: ownPins,
    startPlacement: own.from?.best?.placement ?? startPlacement,
    ask: {
      ...ask,
      isPinned: pins[ask.op] === ask.tile,
      other: knownSide(answerFor(other)),
      provenBound: own.bound ?? 0,
    },
  };
}

const knownSide = ({ from, ...answer }: ReturnType<typeof knownAnswer<Known>>): KnownSide => ({
  ...answer,
  solveId: from?.solveId ?? null,
});

function earlierSolve({ id, settings, pins, bound, best, outcome }: SolveView): Known {
  const isInfeasible = outcome?.status === 'infeasible' && outcome.explanation?.code !== 'no other';
  const { objective, weights } = settings;
  return { pins, objective, weights, isInfeasible, bound, best, solveId: id };
}

/** What is stored as the bench's own mapping, where it is a legal one: made by hand, it may be the only one known. */
function onTheBench({ kernel, fabric, document }: Bench, objective: Objective, weights?: Weights): Known[] {
  const { placement, routes } = document;
  if (verifyMapping(kernel.document, fabric.document, { placement, routes, pins: {} }).length > 0) return [];
  const metrics = measureMapping(kernel.document, compileFabric(fabric.document), { placement, routes });
  const best = { placement, objectiveValue: objectiveOf(metrics, objective, weights) };
  return [{ pins: {}, objective, weights, isInfeasible: false, bound: null, best, solveId: null }];
}
