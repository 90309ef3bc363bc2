/** The best mapping and bound of one solve while it runs, and how they become an outcome. */

import type { ProofMethod } from '../mapping/certificate';
import type { ProofNotes } from './certificate';
import { foundOutcome, nothingOutcome } from './ended-outcome';
import { compareMappings } from './legal-mapping';
import type { SolveOptions } from './options';
import {
  type BestMapping,
  gapRatioOf,
  type InfeasibleReason,
  type SolveOutcome,
  type SolvePhase,
  type SolveProgress,
  type StopReason,
} from './outcome';
import type { CheckedProblem } from './problem';
import type { WeightScale } from './weight-scale';

export interface SolveClock {
  /** Monotonic milliseconds. */
  nowMs(): number;
  shouldStop(): boolean;
  /** Why `shouldStop` is true, where it is not a person's wish. */
  stopCause?(): 'stopped' | 'memory limit';
  /** A verified mapping from another thread that has not been handed over yet; null when there is none. */
  news?(): BestMapping | null;
}

/** How often another thread's mappings are looked for. */
const NEWS_EVERY_MS = 50;

/** How often the number of nodes is reported while nothing else happens. */
const NODES_EVERY_MS = 250;

const SECOND_THREAD = 'second thread';
/** Engines whose work is counted in moves and nodes; others look at the time themselves. */
const countedEngines: readonly string[] = ['search', 'exact'];

/** While a solve runs, values and bounds are in its scale's unit; reports and outcomes are in the problem's. */
export interface SolveState {
  best(): BestMapping | null;
  bound(): number;
  elapsedMs(): number;
  remainingMs(): number;
  setPhase(phase: SolvePhase): void;
  /** Takes the mapping if it is better, and reports it. */
  offer(mapping: BestMapping): void;
  /** Takes a proven bound if it is higher, and reports it. A bound above a legal mapping is refused: false. */
  raise(bound: number, method: ProofNotes['method']): boolean;
  isProved(): boolean;
  /** Out of time or stopped by hand, whatever is proved. */
  isOutOfTime(): boolean;
  /** Out of time, stopped by hand, or proved. */
  shouldStop(): boolean;
  noteEngine(name: string): void;
  /** Nodes that the exact search has looked at. */
  noteNodes(nodes: number): void;
  /** For the certificate; passes write into it. */
  proof: ProofNotes;
  /** Only counts have decided so far how the solve went: neither time, nor a stop, nor an engine with a clock of its own. */
  isRepeatable(): boolean;
  finish(fallback: StopReason): SolveOutcome;
  infeasible(explanation: InfeasibleReason, method: ProofMethod): SolveOutcome;
}

export function solveState(
  problem: CheckedProblem,
  options: SolveOptions,
  clock: SolveClock,
  onProgress: (progress: SolveProgress) => void,
  scale: WeightScale,
): SolveState {
  const startMs = clock.nowMs();
  const elapsedMs = () => clock.nowMs() - startMs;
  const remainingMs = () => options.timeLimitMs - elapsedMs();
  const engines: string[] = [];
  let phase: SolvePhase = 'presolve';
  let best: BestMapping | null = null;
  let told: BestMapping | null = null;
  let bound = 0;
  /** Real values that are closer than this are taken as equal. */
  const tolerance = scale.kind === 'real' ? scale.step : 0;
  /** What a claim may be wrong by: nothing, unless some weights drown in the rounding of others. */
  const doubt = scale.kind === 'coarse' ? scale.step : 0;
  let nodes = 0;
  const proof: ProofNotes = { method: 'counting', searchTries: 0, levels: [], struckTiles: 0 };
  let reportedMs = 0;
  const report = () => {
    reportedMs = elapsedMs();
    onProgress({
      phase,
      best: told,
      bound: scale.toValue(bound),
      gapRatio: gapRatioOf(best?.objectiveValue ?? null, bound),
      elapsedMs: elapsedMs(),
      nodes,
    });
  };
  const isOutOfTime = () => remainingMs() <= 0 || clock.shouldStop();
  const isProved = () => best !== null && best.objectiveValue <= bound;
  const common = () => ({
    engine: engines.join(' + ') || 'presolve',
    objective: problem.objective,
    elapsedMs: Math.round(elapsedMs()),
    seed: options.seed,
    nodes,
    certificate: null,
  });
  const cause = (fallback: StopReason): StopReason => {
    if (clock.shouldStop()) return clock.stopCause?.() ?? 'stopped';
    return remainingMs() <= 0 ? 'time limit' : fallback;
  };
  const offer = (mapping: BestMapping) => {
    if (best && compareMappings(mapping, best) >= 0) return;
    best = mapping;
    told = { ...mapping, objectiveValue: scale.toValue(mapping.objectiveValue) };
    if (mapping.objectiveValue - bound <= tolerance) bound = mapping.objectiveValue;
    report();
  };
  let newsMs = 0;
  const takeNews = () => {
    if (!clock.news || elapsedMs() - newsMs < NEWS_EVERY_MS) return;
    newsMs = elapsedMs();
    for (let mapping = clock.news(); mapping; mapping = clock.news()) {
      // Its own name among the engines says that the solve cannot be repeated node for node.
      if (!engines.includes(SECOND_THREAD)) engines.push(SECOND_THREAD);
      offer({ ...mapping, objectiveValue: scale.fromValue(mapping.objectiveValue) });
    }
  };
  return {
    best: () => best,
    bound: () => bound,
    elapsedMs,
    remainingMs,
    isProved,
    setPhase: (next) => {
      phase = next;
      report();
    },
    offer,
    raise: (claimed, by) => {
      const next = claimed - doubt;
      if (!Number.isFinite(next)) return false;
      if (best && next > best.objectiveValue + Math.max(1e-6, tolerance)) return false;
      if (next > bound) {
        bound = best && next >= best.objectiveValue - tolerance ? best.objectiveValue : next;
        proof.method = by;
        report();
      }
      return true;
    },
    isOutOfTime,
    shouldStop: () => {
      takeNews();
      return isProved() || isOutOfTime();
    },
    noteEngine: (name) => {
      if (!engines.includes(name)) engines.push(name);
    },
    noteNodes: (looked) => {
      nodes = looked;
      if (elapsedMs() - reportedMs >= NODES_EVERY_MS) report();
    },
    proof,
    isRepeatable: () => !isOutOfTime() && engines.every((name) => countedEngines.includes(name)),
    finish: (fallback) =>
      told
        ? foundOutcome(told, scale.toValue(bound), cause(fallback), common())
        : nothingOutcome(scale.toValue(bound), cause(fallback), common()),
    infeasible: (explanation, by) => {
      proof.method = by;
      return {
        ...common(),
        status: 'infeasible',
        objectiveValue: null,
        bound: null,
        gapRatio: null,
        stopReason: 'proved infeasible',
        placement: null,
        routes: null,
        reason: explanation.message,
        explanation,
      };
    },
  };
}
