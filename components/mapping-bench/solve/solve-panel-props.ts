import type { ProofFiles } from './proof-words';
import type { Solve, SolveSettings } from './solve-state';
import type { BenchAsk } from './use-bench-ask';

export interface SolvePanelProps {
  solve: Solve | null;
  /** Asked for, without an answer yet. */
  starting: boolean;
  previewing: boolean;
  readOnly: boolean;
  /** As chosen last. */
  settings: SolveSettings;
  onSettings: (settings: SolveSettings) => void;
  onStart: (settings: SolveSettings, fromHere: boolean) => void;
  onStop: () => void;
  onPreview: (on: boolean) => void;
  onTake: () => void;
  /** The solve's result is what the bench holds. */
  taken: boolean;
  /** What kernel, fabric and certificate are called as files. */
  files: ProofFiles;
  asking: BenchAsk;
  /** A solve of the bench runs, whatever it was asked. */
  busy: boolean;
}
