'use client';

import { useEffect, useMemo, useState } from 'react';
import { Button } from '@/components/ui/button';
import { CheckboxField, SelectField, TextField } from '@/components/ui/field';
import type { SolvePanelProps } from './solve-panel-props';
import type { SolveSettings } from './solve-state';
import { textsOf, weightsFrom, wrongTexts } from './weight-entries';
import { WeightsEditor } from './weights-editor';

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

/** Opens with the settings that were used last: the form is away while a solve runs, and after a reload. */
export function SettingsForm({ starting, onStart, onSettings, settings: last, solve }: SolvePanelProps) {
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
  const [nets, setNets] = useState(() => textsOf(last.weights?.nets));
  const [edges, setEdges] = useState(() => textsOf(last.weights?.edges));
  const [texts, setTexts] = objective === 'wire' ? ([nets, setNets] as const) : ([edges, setEdges] as const);
  const weights = useMemo(() => weightsFrom(nets, edges), [nets, edges]);
  const timeLimitMs = Math.round(seconds * 1000);
  const isValid = !timeError && !seedError && wrongTexts(texts) === 0;
  const settings = useMemo(
    () => ({ objective, engine, timeLimitMs, seed: seedNumber, ...(weights && { weights }) }),
    [objective, engine, timeLimitMs, seedNumber, weights],
  );
  // Other questions to the solver go by what is chosen here.
  useEffect(() => {
    if (isValid) onSettings(settings);
  }, [isValid, settings, onSettings]);
  return (
    <form
      className="mt-3 space-y-2"
      onSubmit={(event) => {
        event.preventDefault();
        if (isValid) onStart(settings, fromHere);
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
      <WeightsEditor objective={objective} texts={texts} onTexts={setTexts} />
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
