/** What the bench asks of the server. The page hands in the actions, so the bench knows none of them. */
import type { BenchDocument } from '@/lib/mapping/bench-document';
import type { Pins, Placement, Provenance } from '@/lib/mapping/mapping';
import type { Result } from '@/lib/result';
import type { Ask, AskKind } from '@/lib/solver/solve-ask';
import type { SolveSettings } from './solve/solve-state';

export interface CallError {
  code: string;
  message: string;
}
type Answer<T> = Promise<Result<T, CallError>>;
type DraftId = `draft_${string}`;
interface OfDraft {
  workspace: string;
  draftId: DraftId;
}

export interface BenchCalls {
  saveBench(input: OfDraft & { revision: number; document: BenchDocument; provenance: Provenance }): Answer<
    | { type: 'saved'; revision: number; atMs: number }
    | {
        type: 'conflict';
        theirs: { document: BenchDocument; provenance: Provenance; revision: number; changedBy: string };
      }
  >;
  saveBenchAsNew(
    input: OfDraft & { name: string; document: BenchDocument; provenance: Provenance },
  ): Answer<{ draftId: DraftId }>;
  keepAsMapping(
    input: OfDraft & { name: string; revision: number },
  ): Answer<{ mappingId: `mapping_${string}` }>;
  renameBench(input: OfDraft & { name: string }): Answer<{ name: string }>;
  startSolve(
    input: OfDraft & {
      settings: SolveSettings & { ask?: Ask };
      pins: Pins;
      startPlacement: Placement | null;
    },
  ): Answer<{ solveId: `solve_${string}`; created: boolean; asks: AskKind | null }>;
  stopSolve(input: { workspace: string; solveId: `solve_${string}` }): Answer<{ state: string }>;
}
