'use client';

import { PanelTitle } from '../panes/figures';
import { AnotherAnswer } from './another-answer';
import { MakingStatus } from './making-status';
import { SettingsForm } from './settings-form';
import { SolveEnd } from './solve-end';
import type { SolvePanelProps } from './solve-panel-props';
import { SolveProgress } from './solve-progress';
import { isLive } from './solve-state';

/** Auto-place: settings, progress, and the end. */
export function SolvePanel(props: SolvePanelProps) {
  const { solve, readOnly, asking, busy } = props;
  const live = solve !== null && isLive(solve);
  return (
    <section aria-label="Auto-place">
      <PanelTitle>Auto-place</PanelTitle>
      <MakingStatus files={props.files} />
      {live ? (
        <SolveProgress
          solve={solve}
          stopLabel="Stop and keep the best"
          readOnly={readOnly}
          onStop={props.onStop}
          preview={{ on: props.previewing, set: props.onPreview }}
        />
      ) : null}
      {solve && !live ? <SolveEnd {...props} solve={solve} /> : null}
      <AnotherAnswer asking={asking} readOnly={readOnly} busy={busy} />
      {!busy && !readOnly ? <SettingsForm key={solve?.id} {...props} /> : null}
    </section>
  );
}
