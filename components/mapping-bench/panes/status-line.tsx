'use client';

import { tileLabel } from '@/lib/fabric/tiles';
import { netsOf } from '@/lib/graph/nets';
import { shortName } from '@/lib/mapping/picture/op-label';
import { useBench, useBenchStore } from '../store/bench-context';
import type { BenchView } from './bench-view';

/** The foot of the bench: what was said last (read out), and what is pointed at. */
export function StatusLine({ shown }: { shown: BenchView }) {
  const store = useBenchStore();
  const said = useBench((state) => state.said);
  const held = useBench((state) => state.held);
  const tile = useBench((state) => state.pointedTile);
  const readOnly = useBench((state) => state.readOnly);
  const pointed = usePointedText(shown);
  const refusal = held !== null && tile !== null ? store.getState().refusal(held, tile) : null;
  return (
    <div className="flex min-h-10 flex-none flex-wrap items-center gap-x-4 border-t border-rule bg-paper px-4 py-1.5 text-sm">
      <p role="status" className={said.refused || refusal ? 'text-madder' : 'text-ink'}>
        {refusal ?? said.text}
      </p>
      {pointed && !refusal ? <p className="text-quiet">{pointed}</p> : null}
      {!pointed && !refusal && said.text === '' ? <Hint readOnly={readOnly} /> : null}
    </div>
  );
}

/** What one can do here; fingers have no keys and drag the page. */
function Hint({ readOnly }: { readOnly: boolean }) {
  if (readOnly) return <p className="text-quiet">Point at an op to see its nets on both sides.</p>;
  return (
    <>
      <p className="text-quiet pointer-coarse:hidden">
        Drag an op to a tile, or pick op and tile. Keys: Enter picks up and puts down, P pins, Delete takes
        off.
      </p>
      <p className="hidden text-quiet pointer-coarse:block">Tap an op, then a tile.</p>
    </>
  );
}

function usePointedText(shown: BenchView): string | null {
  const store = useBenchStore();
  const { kernel, ops } = store.setting;
  const id = useBench((state) => state.pointedOp);
  const tile = useBench((state) => (id === null ? undefined : state.content.placement[id]));
  const op = id === null ? undefined : ops.get(id);
  if (!op || id === null) return null;
  const parts = [`${shortName(op)}: ${tile === undefined ? 'not placed' : tileLabel(tile)}`];
  const net = netsOf(kernel).find((candidate) => candidate.source === id);
  if (net) {
    const hops = shown.facts.metrics.netWireHops.get(id);
    const names = net.consumers.map((consumer) => shortName(ops.get(consumer) ?? op));
    const list =
      names.length > 3 ? `${names.slice(0, 3).join(', ')} and ${names.length - 3} more` : names.join(', ');
    parts.push(
      `feeds ${list}${hops === undefined ? '' : ` over ${hops} wire ${hops === 1 ? 'hop' : 'hops'}`}`,
    );
  }
  return parts.join(' · ');
}
