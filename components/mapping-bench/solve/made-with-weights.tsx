'use client';

import type { Provenance } from '@/lib/mapping/mapping';
import { unequalWeights } from '@/lib/mapping/weights';
import { useBenchStore } from '../store/bench-context';
import { weightRows } from './weight-entries';
import { WeightsTable } from './weights-table';

/** More are told only when asked for. */
const WEIGHTS_SHOWN = 12;

/** The weights that the mapping was made with, so that its value can be understood; nothing where all were 1. */
export function MadeWithWeights({ provenance }: { provenance: Provenance }) {
  const { setting } = useBenchStore();
  if (provenance.by === 'hand') return null;
  const { objective, weights } = provenance;
  const unequal = new Map(unequalWeights(weights, objective));
  if (unequal.size === 0) return null;
  const rows = weightRows(setting.kernel, setting.ops, objective).filter(({ id }) => unequal.has(id));
  return (
    <details className="text-sm" open={rows.length <= WEIGHTS_SHOWN}>
      <summary className="min-h-6 text-xs font-semibold tracking-[0.12em] text-quiet uppercase">
        Weights
      </summary>
      <p className="mt-1 text-quiet">All others are 1.</p>
      <div className="mt-1">
        <WeightsTable objective={objective}>
          {rows.map(({ id, label }) => (
            <tr key={id} className="border-t border-rule">
              <td className="py-0.5 pr-2">{label}</td>
              <td className="text-right font-mono">{unequal.get(id)}</td>
            </tr>
          ))}
        </WeightsTable>
      </div>
    </details>
  );
}
