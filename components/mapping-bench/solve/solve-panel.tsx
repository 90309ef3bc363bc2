'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { CheckboxField, SelectField, TextField } from '@/components/ui/field';
import { PanelTitle } from '../panes/figures';
import { BestChart } from './best-chart';
import { MakingStatus } from './making-status';
import { SolveEnd } from './solve-end';
import type { SolvePanelProps } from './solve-panel-props';
import { durationText, isLive, phaseText, type Solve, type SolveSettings } from './solve-state';

/** Auto-place: settings, progress, and the end. */
export function SolvePanel(props: SolvePanelProps) {
  const { solve, readOnly } = props;
  const live = solve !== null && isLive(solve);
  return (
    <section aria-label="Auto-place">
      <PanelTitle>Auto-place</PanelTitle>
      <MakingStatus />
      {live ? <Progress {...props} solve={solve} /> : null}
      {solve && !live ? <SolveEnd {...props} solve={solve} /> : null}
      {!live && !readOnly ? <SettingsForm key={solve?.id} {...props} /> : null}
    </section>
  );
}

const engines = [
  { value: 'auto', label: 'Exact search' },
  { value: 'program', label: 'Integer program' },
  { value: 'search', label: 'Local search only' },
];
const aims = [
  { value: 'wire', label: 'Fewest wire hops' },
  { value: 'path', label: 'Fewest path hops' },
];
const times = [
  { value: '5', label: '5 s' },
  { value: '20', label: '20 s' },
  { value: '60', label: '60 s' },
  { value: 'own', label: 'Other …' },
];
const LONGEST_S = 600;

const firstSettings: SolveSettings = { objective: 'wire', engine: 'auto', timeLimitMs: 20_000, seed: 1 };

/** Opens with the settings of the last solve: the form is away while one runs, and after a reload. */
function SettingsForm({ starting, onStart, solve }: SolvePanelProps) {
  const last = solve?.settings ?? firstSettings;
  const lastSeconds = String(last.timeLimitMs / 1000);
  const isListed = times.some(({ value }) => value === lastSeconds);
  const [objective, setObjective] = useState(last.objective);
  const [engine, setEngine] = useState(last.engine);
  const [time, setTime] = useState(isListed ? lastSeconds : 'own');
  const [ownSeconds, setOwnSeconds] = useState(isListed ? '120' : lastSeconds);
  const [seed, setSeed] = useState(String(last.seed));
  const [fromHere, setFromHere] = useState(true);
  const seconds = Number(time === 'own' ? ownSeconds : time);
  const timeError =
    Number.isFinite(seconds) && seconds >= 1 && seconds <= LONGEST_S ? null : 'From 1 to 600 seconds';
  const seedNumber = Number(seed);
  const seedError =
    Number.isInteger(seedNumber) && seedNumber >= 0 && seedNumber < 2 ** 31 ? null : 'A whole number from 0';
  return (
    <form
      className="mt-3 space-y-2"
      onSubmit={(event) => {
        event.preventDefault();
        if (timeError || seedError) return;
        onStart({ objective, engine, timeLimitMs: Math.round(seconds * 1000), seed: seedNumber }, fromHere);
      }}
    >
      <div className="grid grid-cols-2 gap-2">
        <SelectField
          label="Aim"
          className="col-span-2"
          choices={aims}
          value={objective}
          onChange={(event) => setObjective(event.target.value as SolveSettings['objective'])}
        />
        <SelectField
          label="Time limit"
          choices={times}
          value={time}
          onChange={(event) => setTime(event.target.value)}
        />
        {time === 'own' ? (
          <TextField
            label="Seconds"
            inputMode="numeric"
            value={ownSeconds}
            error={timeError}
            onChange={(event) => setOwnSeconds(event.target.value)}
          />
        ) : null}
        <TextField
          label="Seed"
          inputMode="numeric"
          value={seed}
          error={seedError}
          onChange={(event) => setSeed(event.target.value)}
        />
        <SelectField
          label="Engine"
          className="col-span-2"
          choices={engines}
          value={engine}
          onChange={(event) => setEngine(event.target.value as SolveSettings['engine'])}
        />
      </div>
      <CheckboxField
        label="Begin with what is placed"
        checked={fromHere}
        onChange={(event) => setFromHere(event.target.checked)}
      />
      <Button type="submit" look="secondary" className="w-full" busy={starting}>
        {solve ? 'Auto-place again' : 'Auto-place the rest'}
      </Button>
    </form>
  );
}

function Progress({ solve, previewing, readOnly, onStop, onPreview }: SolvePanelProps & { solve: Solve }) {
  const { bestObjective, bound, gapRatio } = solve;
  const queued = solve.state === 'queued';
  return (
    <div className="mt-2">
      <p className="text-sm" role="status">
        {queued ? 'Waiting for a worker' : phaseText(solve.phase)}
        {solve.cancelRequested ? ', stopping' : ''}
      </p>
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
          ['Best', bestObjective ?? '–'],
          ['Bound', bound === null ? '–' : Math.round(bound * 100) / 100],
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
      <CheckboxField
        label="Show the best on the fabric"
        className="mt-2"
        checked={previewing}
        onChange={(event) => onPreview(event.target.checked)}
      />
      {readOnly ? null : (
        <Button look="danger" className="mt-2 w-full" disabled={solve.cancelRequested} onClick={onStop}>
          Stop and keep the best
        </Button>
      )}
    </div>
  );
}
