'use client';

import { memo, useCallback, useId, useMemo, useState } from 'react';
import { Button } from '@/components/ui/button';
import type { Objective } from '@/lib/mapping/mapping';
import { useBenchStore } from '../store/bench-context';
import {
  changedTexts,
  parseWeight,
  WEIGHT_RULE,
  type WeightRow,
  type WeightTexts,
  weightRows,
  wrongTexts,
} from './weight-entries';
import { WeightsTable } from './weights-table';

interface WeightsEditorProps {
  objective: Objective;
  texts: WeightTexts;
  onTexts: (change: (texts: WeightTexts) => WeightTexts) => void;
}

/** What each net or connection counts in the aim. Its fields are only there while it is open: they can be hundreds. */
export function WeightsEditor({ objective, texts, onTexts }: WeightsEditorProps) {
  const [open, setOpen] = useState(false);
  const changed = changedTexts(texts);
  const wrong = wrongTexts(texts);
  return (
    <details className="text-sm" open={open} onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary className="min-h-6 font-semibold">
        Weights
        <span className="font-normal text-quiet"> · {changed === 0 ? 'all 1' : `${changed} not 1`}</span>
      </summary>
      {wrong > 0 ? (
        <p role="alert" className="mt-1 text-madder">
          {wrong === 1 ? 'One weight is none' : `${wrong} weights are none`}: give a number from 0 to
          1,000,000,000.
        </p>
      ) : null}
      {open ? <WeightTable objective={objective} texts={texts} onTexts={onTexts} /> : null}
    </details>
  );
}

function WeightTable({ objective, texts, onTexts }: WeightsEditorProps) {
  const { setting } = useBenchStore();
  const rows = useMemo(() => weightRows(setting.kernel, setting.ops, objective), [setting, objective]);
  const onText = useCallback(
    (id: string, text: string) => onTexts((before) => ({ ...before, [id]: text })),
    [onTexts],
  );
  const what = objective === 'wire' ? 'net' : 'connection';
  return (
    <>
      <p className="mt-1 text-quiet">
        A hop of a {what} counts its weight. With 0 the {what} is routed, but costs nothing.
      </p>
      <div className="mt-2 max-h-72 overflow-y-auto border-y border-rule">
        <WeightsTable objective={objective}>
          {rows.map((row) => (
            <WeightField key={row.id} row={row} text={texts[row.id] ?? '1'} onText={onText} />
          ))}
        </WeightsTable>
      </div>
      <Button
        look="secondary"
        className="mt-2 w-full"
        disabled={Object.keys(texts).length === 0}
        onClick={() => onTexts(() => ({}))}
      >
        All 1 again
      </Button>
    </>
  );
}

interface WeightFieldProps {
  row: WeightRow;
  text: string;
  onText: (id: string, text: string) => void;
}

/** While it has the focus, its op is pointed at on both sides of the bench. */
const WeightField = memo(function WeightField({ row, text, onText }: WeightFieldProps) {
  const id = useId();
  const store = useBenchStore();
  const isWrong = parseWeight(text) === null;
  return (
    <tr className="border-t border-rule first:border-t-0">
      <td className="py-1 pr-2 break-words">
        <label htmlFor={id}>{row.label}</label>
      </td>
      <td className="w-24 py-1">
        <input
          id={id}
          inputMode="decimal"
          autoComplete="off"
          className="min-h-7 w-full rounded border border-edge! bg-surface px-2 text-right font-mono text-sm tabular-nums aria-invalid:border-madder!"
          value={text}
          title={WEIGHT_RULE}
          aria-invalid={isWrong || undefined}
          onChange={(event) => onText(row.id, event.target.value)}
          onFocus={() => store.getState().point(row.op, null)}
          onBlur={() => store.getState().point(null, null)}
        />
      </td>
    </tr>
  );
});
