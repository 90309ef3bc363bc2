'use client';

import { type ReactNode, useState } from 'react';
import { PICTURE_CAUTION } from '@/lib/mapping/picture/mapping-svg';
import { shortName } from '@/lib/mapping/picture/op-label';
import type { BenchView } from './panes/bench-view';
import { BrokenRules, Figures, LinkUse, PanelTitle, UnitUse } from './panes/figures';
import { GridPane } from './panes/grid-pane';
import { KernelGraph } from './panes/kernel-graph';
import { OpList } from './panes/op-list';
import { StatusLine } from './panes/status-line';
import { useOpDrag } from './panes/use-op-drag';
import { PinPricePanel } from './solve/pin-price-panel';
import { SolvePanel } from './solve/solve-panel';
import type { SolvePanelProps } from './solve/solve-panel-props';
import { useBenchStore } from './store/bench-context';

interface BenchPanesProps {
  shown: BenchView;
  kernelTitle: string;
  fabricTitle: string;
  /** Null on a kept mapping. */
  solvePanel: SolvePanelProps | null;
  /** Further sections under the figures. */
  more?: ReactNode;
}

type Side = 'kernel' | 'figures';

/** The three panes; on a narrow screen the fabric comes first, the others as tabs under it. */
export function BenchPanes({ shown, kernelTitle, fabricTitle, solvePanel, more }: BenchPanesProps) {
  const { dragging, begin, wasDragged } = useOpDrag();
  const [side, setSide] = useState<Side>('kernel');
  const { setting } = useBenchStore();
  const draggedOp = dragging ? setting.ops.get(dragging.op) : undefined;
  return (
    <div className="flex min-h-0 flex-1 flex-col lg:grid lg:grid-cols-[minmax(15rem,19rem)_minmax(0,1fr)_17rem]">
      <div className="flex min-h-0 flex-col bg-surface lg:order-2">
        <div className="px-4 pt-3">
          <PanelTitle aside={fabricTitle}>{shown.preview ? 'Fabric, best so far' : 'Fabric'}</PanelTitle>
        </div>
        <GridPane shown={shown} onOpDown={begin} wasDragged={wasDragged} />
        <StatusLine shown={shown} />
      </div>
      <SideTabs side={side} onSide={setSide} />
      <div
        className={`min-h-0 flex-col border-rule bg-paper lg:order-1 lg:flex lg:border-r ${side === 'kernel' ? 'flex h-[70dvh] lg:h-auto' : 'hidden'}`}
      >
        <KernelPane title={kernelTitle} onOpDown={begin} wasDragged={wasDragged} />
      </div>
      <div
        className={`min-h-0 space-y-5 overflow-y-auto border-rule bg-paper px-4 py-3 lg:order-3 lg:block lg:border-l ${side === 'figures' ? 'block' : 'hidden'}`}
      >
        <Figures shown={shown} />
        {solvePanel ? (
          <>
            <SolvePanel {...solvePanel} />
            <PinPricePanel {...solvePanel} />
          </>
        ) : null}
        <BrokenRules shown={shown} />
        <UnitUse shown={shown} />
        {more}
        <LinkUse shown={shown} />
        <p className="text-xs text-quiet">{PICTURE_CAUTION}</p>
      </div>
      {dragging && draggedOp ? (
        <div
          className="pointer-events-none fixed z-50 rounded-sm border border-indigo! bg-surface px-2 py-1 text-sm font-semibold shadow-md"
          style={{ left: dragging.x + 12, top: dragging.y + 8 }}
        >
          {shortName(draggedOp)}
        </div>
      ) : null}
    </div>
  );
}

function SideTabs({ side, onSide }: { side: Side; onSide: (side: Side) => void }) {
  return (
    <fieldset className="flex border-y border-rule bg-surface lg:hidden">
      <legend className="sr-only">Beside the fabric</legend>
      {(['kernel', 'figures'] as const).map((name) => (
        <button
          key={name}
          type="button"
          aria-pressed={side === name}
          className="min-h-11 flex-1 border-b-2 border-transparent! text-sm aria-pressed:border-indigo! aria-pressed:font-semibold aria-pressed:text-indigo"
          onClick={() => onSide(name)}
        >
          {name === 'kernel' ? 'Kernel' : 'Figures'}
        </button>
      ))}
    </fieldset>
  );
}

interface KernelPaneProps {
  title: string;
  onOpDown: ReturnType<typeof useOpDrag>['begin'];
  wasDragged: () => boolean;
}

function KernelPane({ title, onOpDown, wasDragged }: KernelPaneProps) {
  const [asList, setAsList] = useState(false);
  return (
    <>
      <div className="px-4 pt-3">
        <PanelTitle aside={title}>Kernel</PanelTitle>
        <fieldset className="mb-1 inline-flex rounded border border-rule bg-surface">
          <legend className="sr-only">Show the kernel as</legend>
          {[false, true].map((list) => (
            <button
              key={String(list)}
              type="button"
              aria-pressed={asList === list}
              className="min-h-7 rounded px-3 text-xs aria-pressed:bg-indigo-wash aria-pressed:font-semibold aria-pressed:text-indigo"
              onClick={() => setAsList(list)}
            >
              {list ? 'List' : 'Graph'}
            </button>
          ))}
        </fieldset>
      </div>
      <div className="min-h-0 flex-1">
        {asList ? (
          <OpList onOpDown={onOpDown} wasDragged={wasDragged} />
        ) : (
          <KernelGraph onOpDown={onOpDown} wasDragged={wasDragged} />
        )}
      </div>
    </>
  );
}
