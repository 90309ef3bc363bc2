import type { Solve, SolveSettings } from './solve-state';

export interface SolvePanelProps {
  solve: Solve | null;
  /** Asked for, without an answer yet. */
  starting: boolean;
  previewing: boolean;
  readOnly: boolean;
  onStart: (settings: SolveSettings, fromHere: boolean) => void;
  onStop: () => void;
  onPreview: (on: boolean) => void;
  onTake: () => void;
  /** The solve's result is what the bench holds. */
  taken: boolean;
}
