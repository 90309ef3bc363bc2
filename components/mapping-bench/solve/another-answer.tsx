'use client';

import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { objectiveName } from '@/lib/mapping/weights';
import { useBench } from '../store/bench-context';
import { SolveProgress } from './solve-progress';
import { anotherSentence, isLive, valueText } from './solve-state';
import type { BenchAsk } from './use-bench-ask';

interface AnotherAnswerProps {
  asking: BenchAsk;
  readOnly: boolean;
  /** A solve of the bench runs. */
  busy: boolean;
}

/** "Show another of equal cost", for a mapping that a solve has made, and what came of it. */
export function AnotherAnswer({ asking, readOnly, busy }: AnotherAnswerProps) {
  const content = useBench((state) => state.content);
  const isLegal = useBench((state) => state.facts.legal);
  const { solve, offered } = asking;
  const ask = solve?.settings.ask;
  // That there is no other is said of the mapping that was asked about.
  const isOfThis = offered !== null || asking.askedOf === null || asking.askedOf === content;
  const mayAsk = !readOnly && !busy && isLegal && content.provenance.by === 'solver';
  return (
    <>
      {solve && ask?.kind === 'another' ? (
        isLive(solve) ? (
          <SolveProgress
            solve={solve}
            title={`Another of at most ${valueText(ask.objectiveValue)} ${objectiveName(solve.settings.objective, solve.settings.weights)}`}
            stopLabel="Stop looking"
            readOnly={readOnly}
            onStop={asking.stop}
            preview={null}
          />
        ) : asking.isTaken(content) || !isOfThis ? null : (
          <Notice className="mt-2" live>
            <p>{anotherSentence(solve)}</p>
            {offered ? <OfferButtons asking={asking} readOnly={readOnly} label="Put on the bench" /> : null}
          </Notice>
        )
      ) : null}
      {mayAsk ? (
        <Button look="secondary" className="mt-2 w-full" busy={asking.starting} onClick={asking.askAnother}>
          Show another of equal cost
        </Button>
      ) : null}
    </>
  );
}

/** Look at an offered mapping, and take it. */
export function OfferButtons({
  asking,
  readOnly,
  label,
}: {
  asking: BenchAsk;
  readOnly: boolean;
  label: string;
}) {
  return (
    <div className="mt-2 flex flex-wrap gap-2">
      <Button
        look="secondary"
        aria-pressed={asking.previewing}
        onClick={() => asking.setPreviewing(!asking.previewing)}
      >
        {asking.previewing ? 'Back to mine' : 'Look at it'}
      </Button>
      {readOnly ? null : (
        <Button
          look="primary"
          className="whitespace-normal!"
          onClick={() => asking.take('The mapping found is on the bench. Undo brings back what was there.')}
        >
          {label}
        </Button>
      )}
    </div>
  );
}
