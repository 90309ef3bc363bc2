import { Button } from '@/components/ui/button';
import { CheckboxField } from '@/components/ui/field';
import { isWeighted, objectiveName } from '@/lib/mapping/weights';
import { BestChart } from './best-chart';
import { boundText, durationText, phaseText, type Solve, valueText } from './solve-state';

interface SolveProgressProps {
  solve: Solve;
  /** What it is for, where that is not the bench's best mapping. */
  title?: string;
  stopLabel: string;
  readOnly: boolean;
  onStop: () => void;
  /** Null where its best is not to be looked at. */
  preview: { on: boolean; set: (on: boolean) => void } | null;
}

/** A solve while it is queued or runs. */
export function SolveProgress({ solve, title, stopLabel, readOnly, onStop, preview }: SolveProgressProps) {
  const { bestObjective, bound, gapRatio } = solve;
  const { objective, weights } = solve.settings;
  const queued = solve.state === 'queued';
  return (
    <div className="mt-2">
      <p className="text-sm" role="status">
        {title ? <span className="block font-semibold">{title}</span> : null}
        {queued ? 'Waiting for a worker' : phaseText(solve.phase)}
        {solve.cancelRequested ? ', stopping' : ''}
      </p>
      {isWeighted(weights, objective) ? (
        <p className="text-sm text-quiet">Values are {objectiveName(objective, weights)}.</p>
      ) : null}
      <div
        className="mt-1 h-1.5 bg-(--channel)"
        role="progressbar"
        aria-label="Time used"
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={Math.min(100, Math.round((100 * solve.elapsedMs) / solve.settings.timeLimitMs))}
      >
        <div
          className="h-full bg-indigo-fill"
          style={{ width: `${Math.min(100, (100 * solve.elapsedMs) / solve.settings.timeLimitMs)}%` }}
        />
      </div>
      <dl className="mt-2 grid grid-cols-3 gap-x-2 gap-y-1 text-sm">
        {[
          ['Best', bestObjective === null ? '–' : valueText(bestObjective)],
          ['Bound', bound === null ? '–' : boundText(bound, objective, weights)],
          ['Gap', gapRatio === null ? '–' : `${Math.round(gapRatio * 100)} %`],
          ['Time', durationText(solve.elapsedMs)],
          ['Nodes', solve.nodes.toLocaleString('en-GB')],
        ].map(([label, value]) => (
          <div key={label}>
            <dt className="text-xs text-quiet">{label}</dt>
            <dd className="font-mono font-semibold tabular-nums">{value}</dd>
          </div>
        ))}
      </dl>
      <BestChart history={solve.history} elapsedMs={solve.elapsedMs} />
      {preview ? (
        <CheckboxField
          label="Show the best on the fabric"
          className="mt-2"
          checked={preview.on}
          onChange={(event) => preview.set(event.target.checked)}
        />
      ) : null}
      {readOnly ? null : (
        <Button look="danger" className="mt-2 w-full" disabled={solve.cancelRequested} onClick={onStop}>
          {stopLabel}
        </Button>
      )}
    </div>
  );
}
