'use client';

import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import type { TileId } from '@/lib/fabric/fabric';
import type { OpId } from '@/lib/graph/kernel';
import { objectiveName } from '@/lib/mapping/weights';
import { useBench, useBenchStore } from '../store/bench-context';
import { BestChart } from './best-chart';
import { ProofDetails } from './proof-details';
import type { SolvePanelProps } from './solve-panel-props';
import { durationText, gapText, type Solve, solveResult, stopText, valueText } from './solve-state';

/** How the last solve of this bench ended, and its result if the bench does not hold it already. */
export function SolveEnd(props: SolvePanelProps & { solve: Solve }) {
  const { solve, taken } = props;
  const result = solveResult(solve);
  const { outcome } = solve;
  if (result && taken) return <BestChart history={solve.history} elapsedMs={solve.elapsedMs} />;
  if (result) return <Offer {...props} />;
  if (outcome?.status === 'infeasible') return <Infeasible {...props} />;
  const why =
    outcome?.reason ??
    (solve.state === 'cancelled'
      ? 'It was stopped before a mapping was found.'
      : `No mapping was found${outcome?.stopReason ? `: ${stopText(outcome.stopReason)}` : ''}.`);
  return (
    <Notice className="mt-2" tone={solve.state === 'failed' ? 'broken' : 'plain'} live>
      {solve.state === 'failed' ? why : `No mapping yet. ${why} A longer time may help.`}
    </Notice>
  );
}

function Offer({ solve, previewing, readOnly, onPreview, onTake }: SolvePanelProps & { solve: Solve }) {
  const isOwn = useBench(
    ({ content: { provenance } }) => provenance.by === 'hand' || provenance.changedByHand,
  );
  const result = solveResult(solve);
  if (result?.provenance.by !== 'solver') return null;
  const { objectiveValue, bound, objective, weights, elapsedMs, status } = result.provenance;
  return (
    <Notice className="mt-2" tone={status === 'optimal' ? 'proven' : 'plain'} live>
      <p className="font-semibold">
        {status === 'optimal' ? 'Proved optimal' : `Feasible, ${gapText(objectiveValue, bound)}`} ·{' '}
        {durationText(elapsedMs)}
      </p>
      <p>
        A solve found {valueText(objectiveValue)} {objectiveName(objective, weights)}.{' '}
        {isOwn ? 'Your own changes are untouched.' : 'Another mapping is on the bench.'}
      </p>
      <div className="mt-2 flex flex-wrap gap-2">
        <Button look="secondary" aria-pressed={previewing} onClick={() => onPreview(!previewing)}>
          {previewing ? 'Back to mine' : 'Look at it'}
        </Button>
        {readOnly ? null : (
          <Button look="primary" onClick={onTake}>
            Put on the bench
          </Button>
        )}
      </div>
    </Notice>
  );
}

function Infeasible({ solve, files }: SolvePanelProps & { solve: Solve }) {
  const store = useBenchStore();
  const { outcome } = solve;
  const explanation = outcome?.explanation;
  const named = (explanation?.opIds.length ?? 0) + (explanation?.tileIds.length ?? 0);
  const certificate = outcome?.certificate;
  return (
    <>
      <Notice className="mt-2" tone="broken" live>
        <p className="font-semibold">No mapping is possible</p>
        <p>{outcome?.reason}</p>
        {explanation && named > 0 ? (
          <Button
            look="danger"
            className="mt-2"
            onClick={() =>
              store.getState().mark({
                opIds: explanation.opIds as OpId[],
                tileIds: explanation.tileIds as TileId[],
                linkIds: [],
              })
            }
          >
            Show where
          </Button>
        ) : null}
      </Notice>
      {certificate ? <ProofDetails certificate={certificate} files={files} href={null} /> : null}
    </>
  );
}
