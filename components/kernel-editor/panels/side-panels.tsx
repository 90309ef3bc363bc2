'use client';

import { type ReactNode, useState } from 'react';
import { useKernelState } from '../store/editor-context';
import { problemsOf } from '../store/kernel-facts';
import { Inspector } from './inspector';
import { Palette } from './palette';
import { ProblemList, problemSummary } from './problem-list';
import { useWide } from './use-wide';

/** The canvas with its panels: at both sides where there is room, else in a sheet at the foot. */
export function SidePanels({ children }: { children: ReactNode }) {
  const wide = useWide();
  const readOnly = useKernelState((state) => state.readOnly);
  if (!wide) {
    return (
      <div className="flex min-h-0 flex-1 flex-col">
        <div className="flex min-h-0 flex-1 flex-col">{children}</div>
        <Sheet />
      </div>
    );
  }
  return (
    <div className="flex min-h-0 flex-1">
      {readOnly ? null : (
        <div className="flex w-52 flex-none flex-col border-r border-rule bg-surface">
          <Palette />
        </div>
      )}
      <div className="flex min-w-0 flex-1 flex-col">{children}</div>
      <div className="flex w-72 flex-none flex-col border-l border-rule bg-surface">
        <Inspector />
        <ProblemsSection />
      </div>
    </div>
  );
}

const useProblemText = (): string => useKernelState((state) => problemSummary(problemsOf(state.kernel)));

function ProblemsSection() {
  const text = useProblemText();
  const some = text !== 'no problems';
  return (
    <section aria-label="Problems" className="flex max-h-[45%] flex-none flex-col border-t border-rule">
      <h2 className={`flex-none px-3 pt-2 text-sm font-semibold ${some ? 'text-madder' : ''}`}>
        Problems: <span className="figures">{text}</span>
      </h2>
      <div className="min-h-0 overflow-y-auto">
        <ProblemList />
      </div>
    </section>
  );
}

type SheetTab = 'palette' | 'inspector' | 'problems';

function Sheet() {
  const [tab, setTab] = useState<SheetTab | null>(null);
  const readOnly = useKernelState((state) => state.readOnly);
  const problems = useProblemText();
  const tabs: readonly { id: SheetTab; label: string }[] = [
    ...(readOnly ? [] : [{ id: 'palette', label: 'Operations' } as const]),
    { id: 'inspector', label: 'Inspector' },
    { id: 'problems', label: problems === 'no problems' ? 'Problems' : problems },
  ];
  return (
    <div className="flex flex-none flex-col border-t border-rule bg-surface">
      <div className="flex" role="toolbar" aria-label="Panels">
        {tabs.map(({ id, label }) => (
          <button
            key={id}
            type="button"
            aria-expanded={tab === id}
            className={`min-h-11 flex-1 border-t-2 px-2 text-sm ${
              tab === id ? 'border-indigo! font-semibold text-indigo' : 'border-transparent!'
            }`}
            onClick={() => setTab(tab === id ? null : id)}
          >
            {label}
          </button>
        ))}
      </div>
      {tab === null ? null : (
        <div className="flex h-[38dvh] flex-col overflow-y-auto border-t border-rule">
          {tab === 'palette' ? <Palette /> : tab === 'inspector' ? <Inspector /> : <ProblemList />}
        </div>
      )}
    </div>
  );
}
