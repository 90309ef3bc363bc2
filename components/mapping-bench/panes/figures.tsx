'use client';

import type { ReactNode } from 'react';
import { parseLink, tileLabel } from '@/lib/fabric/tiles';
import { unitSpec } from '@/lib/fabric/unit-library';
import { objectiveOf } from '@/lib/mapping/metrics';
import { ruleText } from '@/lib/mapping/violation';
import { objectiveLabel, valueText } from '../solve/solve-state';
import { useBench, useBenchStore } from '../store/bench-context';
import type { BenchView } from './bench-view';

export function PanelTitle({ children, aside }: { children: ReactNode; aside?: ReactNode }) {
  return (
    <div className="mb-2 flex items-baseline justify-between gap-2">
      <h2 className="text-xs font-semibold tracking-[0.12em] text-quiet uppercase">{children}</h2>
      {aside ? <span className="text-xs text-quiet">{aside}</span> : null}
    </div>
  );
}

export function Figure({ label, value, broken }: { label: string; value: ReactNode; broken?: boolean }) {
  return (
    <div className="flex items-baseline justify-between gap-3 py-0.5">
      <dt className="text-sm text-quiet">{label}</dt>
      <dd className={`font-mono text-sm font-semibold tabular-nums ${broken ? 'text-madder' : ''}`}>
        {value}
      </dd>
    </div>
  );
}

/** The mapping's figures as they stand. */
export function Figures({ shown }: { shown: BenchView }) {
  const { counted } = shown;
  const { metrics } = shown.facts;
  const { fullestLink, maxHops } = metrics;
  return (
    <section aria-label="Figures">
      <PanelTitle aside={shown.preview ? 'of the best so far' : undefined}>Figures</PanelTitle>
      <dl>
        <Figure label="Placed" value={`${metrics.placedOps} of ${metrics.totalOps}`} />
        <Figure label="Wire hops" value={metrics.totalWireHops} />
        <Figure label="Path hops" value={metrics.totalPathHops} />
        {counted ? (
          <Figure
            label={objectiveLabel(counted.objective, counted.weights)}
            value={valueText(objectiveOf(metrics, counted.objective, counted.weights))}
          />
        ) : null}
        <Figure
          label="Longest path"
          value={maxHops === null ? metrics.longestPathHops : `${metrics.longestPathHops} of ${maxHops}`}
          broken={maxHops !== null && metrics.longestPathHops > maxHops}
        />
        <Figure
          label="Fullest link"
          value={
            fullestLink
              ? `${fullestLink.nets} of ${fullestLink.channels} ${fullestLink.channels === 1 ? 'channel' : 'channels'}`
              : '–'
          }
          broken={fullestLink !== null && fullestLink.nets > fullestLink.channels}
        />
        <Figure label="Links used" value={`${metrics.linksUsed} of ${metrics.linkCount}`} />
      </dl>
    </section>
  );
}

/** PEs in use of each unit type. */
export function UnitUse({ shown }: { shown: BenchView }) {
  const { setting } = useBenchStore();
  return (
    <section aria-label="Units used">
      <PanelTitle>Units used</PanelTitle>
      <ul className="space-y-2">
        {shown.facts.metrics.unitUse.map(({ unit, used, available }) => (
          <li key={unit} className="text-sm">
            <div className="flex justify-between gap-2">
              <span>{unitSpec(unit, setting.library)?.label ?? unit}</span>
              <span className="font-mono tabular-nums">
                {used} / {available}
              </span>
            </div>
            <div className="mt-0.5 h-1.5 bg-(--channel)">
              <div
                className="h-full bg-indigo-fill"
                style={{ width: `${(100 * used) / Math.max(1, available)}%` }}
              />
            </div>
          </li>
        ))}
      </ul>
    </section>
  );
}

/** The rules that are broken, each a way to the place. */
export function BrokenRules({ shown }: { shown: BenchView }) {
  const store = useBenchStore();
  const { violations, complete, metrics } = shown.facts;
  const left = metrics.totalOps - metrics.placedOps;
  return (
    <section aria-label="Rules">
      <PanelTitle aside={violations.length === 0 ? undefined : `${violations.length} broken`}>
        Rules
      </PanelTitle>
      {violations.length === 0 ? (
        <p className={`text-sm ${complete ? 'text-verdigris' : 'text-quiet'}`}>
          {complete
            ? '✓ Legal: every rule from R1 to R7 holds.'
            : `No rule is broken so far; ${left} ${left === 1 ? 'op waits' : 'ops wait'} for a tile.`}
        </p>
      ) : (
        <ul className="space-y-1">
          {violations.map((violation) => (
            <li key={`${violation.rule} ${violation.message}`}>
              <button
                type="button"
                title={ruleText[violation.rule]}
                className="w-full rounded border border-madder! bg-madder-wash px-2 py-1 text-left text-sm text-madder"
                onClick={() => {
                  store.getState().mark(violation);
                  const tile = store.setting.graph.tileIndex(violation.tileIds[0] ?? '');
                  if (tile >= 0) store.getState().moveCursor(tile);
                }}
              >
                <strong>{violation.rule}</strong> {violation.message}
              </button>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}

const ROWS_SHOWN = 12;

/** The links that carry nets, the fullest first; pointing at one shows it on the fabric. */
export function LinkUse({ shown }: { shown: BenchView }) {
  const store = useBenchStore();
  const marked = useBench((state) => state.marks?.linkIds[0] ?? null);
  const { links, linkIndex } = store.setting.graph;
  const rows = [...shown.facts.metrics.linkLoads]
    .map(([id, nets]) => ({ id, nets, channels: links[linkIndex.get(id) ?? -1]?.channels ?? 1 }))
    .sort((a, b) => b.nets / b.channels - a.nets / a.channels || b.nets - a.nets);
  return (
    <details className="text-sm">
      <summary className="min-h-6 text-xs font-semibold tracking-[0.12em] text-quiet uppercase">
        Link occupancy
      </summary>
      {rows.length === 0 ? <p className="mt-1 text-quiet">No link carries a net yet.</p> : null}
      <ul className="mt-1">
        {rows.slice(0, ROWS_SHOWN).map(({ id, nets, channels }) => {
          const ends = parseLink(id);
          return (
            <li key={id}>
              <button
                type="button"
                aria-pressed={marked === id}
                className="flex min-h-6 w-full justify-between gap-2 text-left hover:bg-indigo-wash aria-pressed:bg-indigo-wash"
                onClick={() =>
                  store.getState().mark(marked === id ? null : { opIds: [], tileIds: [], linkIds: [id] })
                }
              >
                <span className="truncate">
                  {ends ? `${shortTile(ends.from)} → ${shortTile(ends.to)}` : id}
                  <span className="sr-only">
                    {ends ? `, ${tileLabel(ends.from)} to ${tileLabel(ends.to)}` : ''}
                  </span>
                </span>
                <span className={`font-mono tabular-nums ${nets > channels ? 'text-madder' : ''}`}>
                  {nets} / {channels}
                </span>
              </button>
            </li>
          );
        })}
      </ul>
      {rows.length > ROWS_SHOWN ? (
        <p className="text-xs text-quiet">and {rows.length - ROWS_SHOWN} more links</p>
      ) : null}
    </details>
  );
}

const shortTile = (tile: string): string =>
  tileLabel(tile).replace('row ', '').replace(' column ', '').replace(/\s/g, '');
