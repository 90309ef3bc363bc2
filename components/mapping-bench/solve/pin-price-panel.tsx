'use client';

import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { tileLabel } from '@/lib/fabric/tiles';
import type { OpId } from '@/lib/graph/kernel';
import { shortName } from '@/lib/mapping/picture/op-label';
import { PanelTitle } from '../panes/figures';
import { useBench, useBenchStore } from '../store/bench-context';
import { OfferButtons } from './another-answer';
import { furtherAsk, type PriceView, priceAnswer, priceSentence, speaksOf } from './ask-state';
import { SolveProgress } from './solve-progress';
import { isLive, type Solve } from './solve-state';
import type { BenchAsk } from './use-bench-ask';

interface PinPricePanelProps {
  asking: BenchAsk;
  readOnly: boolean;
  /** A solve of the bench runs. */
  busy: boolean;
}

/** What a pin costs, or would cost: asked of the op that is picked up, answered by up to two solves. */
export function PinPricePanel({ asking, readOnly, busy }: PinPricePanelProps) {
  const { solve } = asking;
  const isPrice = solve?.settings.ask?.kind === 'pin price';
  if (readOnly && !isPrice) return null;
  return (
    <section aria-label="Price of a pin">
      <PanelTitle>Price of a pin</PanelTitle>
      {isPrice ? <Answered asking={asking} solve={solve} readOnly={readOnly} busy={busy} /> : null}
      {readOnly || busy ? null : <Question asking={asking} />}
    </section>
  );
}

function Question({ asking }: { asking: BenchAsk }) {
  const held = useBench((state) => state.held);
  const tile = useBench((state) => (held === null ? undefined : state.content.placement[held]));
  const isPinned = useBench((state) => held !== null && state.content.pins[held] !== undefined);
  const name = useName(held);
  if (held === null || tile === undefined) {
    return (
      <p className="mt-2 text-sm text-quiet">
        Pick up a placed op to ask what its pin costs, or what a pin would cost.
      </p>
    );
  }
  return (
    <>
      <p className="mt-2 text-sm">
        <strong>{name}</strong> {isPinned ? 'is pinned to' : 'stands on'} {tileLabel(tile)}.
      </p>
      <Button
        look="secondary"
        className="mt-1 w-full whitespace-normal!"
        busy={asking.starting}
        onClick={() => asking.askPrice(held)}
      >
        {isPinned ? 'What does this pin cost?' : 'What if it were pinned here?'}
      </Button>
    </>
  );
}

function Answered({ asking, solve, readOnly, busy }: PinPricePanelProps & { solve: Solve }) {
  const answer = priceAnswer(solve);
  const name = useName(answer?.ask.op ?? null);
  const isCurrent = useBench((state) => speaksOf(state.content.pins, solve));
  if (!answer) return null;
  const { ask } = answer;
  const where = `${name} on ${tileLabel(ask.tile)}`;
  if (isLive(solve)) {
    return (
      <SolveProgress
        solve={solve}
        title={ask.side === 'with pin' ? `Pinned: ${where}` : `Without the pin: ${name}`}
        stopLabel="Stop"
        readOnly={readOnly}
        onStop={asking.stop}
        preview={null}
      />
    );
  }
  const isKnown = answer.price.kind === 'exact' || answer.price.kind === 'makes infeasible';
  return (
    <Notice tone={isKnown ? 'proven' : 'plain'} live>
      <p className="font-semibold">{where}</p>
      <p>{priceSentence(answer)}</p>
      {isCurrent ? null : <p>The pins were changed since.</p>}
      {furtherAsk(solve) && !readOnly && !busy ? (
        <Button look="secondary" className="mt-2 whitespace-normal!" onClick={asking.askFurther}>
          {ask.side === 'with pin' ? 'Solve it without the pin too' : 'Solve it with the pin too'}
        </Button>
      ) : null}
      {asking.offered ? <OfferButtons asking={asking} readOnly={readOnly} label={takeLabel(ask)} /> : null}
    </Notice>
  );
}

const takeLabel = ({ isPinned }: PriceView): string =>
  isPinned ? 'Put it on the bench without the pin' : 'Put it on the bench with the pin';

function useName(id: OpId | null): string {
  const { setting } = useBenchStore();
  const op = id === null ? undefined : setting.ops.get(id);
  return op ? shortName(op) : '';
}
