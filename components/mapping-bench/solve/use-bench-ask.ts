'use client';

import { useEffect, useMemo, useRef, useState } from 'react';
import type { OpId } from '@/lib/graph/kernel';
import { samePlacement } from '@/lib/mapping/honest-provenance';
import type { Pins, Placement } from '@/lib/mapping/mapping';
import { objectiveOf } from '@/lib/mapping/metrics';
import { objectiveName } from '@/lib/mapping/weights';
import { type Ask, pinsOfSide } from '@/lib/solver/solve-ask';
import type { BenchContent } from '../store/bench-content';
import { useBench } from '../store/bench-context';
import type { BenchStore } from '../store/bench-store';
import { avoidedPlacements, furtherAsk, priceAnswer, priceSentence, supposedSide } from './ask-state';
import {
  anotherSentence,
  isLive,
  type Solve,
  type SolveResult,
  type SolveSettings,
  solveResult,
  valueText,
} from './solve-state';
import { useSolve } from './use-solve';
import { type SolveJobParts, useSolveJob } from './use-solve-job';

/** A mapping that an ask has found, with the pins that it goes on the bench with. */
export interface OfferedMapping {
  result: SolveResult;
  pins: Pins;
}

interface Started {
  solveId: string;
  content: BenchContent;
  /** The other side of a pin's price is solved next, where that would tell more. */
  goesOn: boolean;
}

/**
 * Questions beside the bench's own solve. Another mapping of equal cost goes on the bench by itself when nothing was
 * changed since; what a pin's price supposes never does.
 */
export function useBenchAsk(store: BenchStore, parts: SolveJobParts & { settings: SolveSettings }) {
  const { solve, starting, begin, stop, adopt } = useSolveJob(parts);
  const [previewing, setPreviewing] = useState(false);
  const startedWith = useRef<Started | null>(null);
  const [askedOf, setAskedOf] = useState<BenchContent | null>(null);
  /** In this visit, put on the bench or not. */
  const found = useRef<Placement[]>([]);
  const offered = useOffered(parts.workspace, solve);

  async function ask(question: Ask, goesOn: boolean): Promise<void> {
    const { content } = store.getState();
    const settings = { ...parts.settings, ask: question };
    const { pins, placement } = content;
    const startPlacement = Object.keys(placement).length > 0 ? placement : null;
    const id = await begin({ settings, pins, startPlacement });
    if (id === null) return;
    startedWith.current = { solveId: id, content, goesOn };
    setAskedOf(content);
  }

  const onFinished = (ended: Solve) => {
    setPreviewing(false);
    const started = startedWith.current;
    if (started?.solveId !== ended.id) return;
    startedWith.current = null;
    const { say, content, takeResult } = store.getState();
    const answer = priceAnswer(ended);
    if (answer) {
      const further = ended.state === 'done' && started.goesOn ? furtherAsk(ended) : null;
      if (further) void ask(further, false);
      else say(priceSentence(answer));
      return;
    }
    const result = solveResult(ended);
    if (result) found.current.push(result.placement);
    if (result && content === started.content) takeResult(result, { said: takenText(ended) });
    else say(anotherSentence(ended));
  };
  const finish = useRef(() => {});
  finish.current = () => {
    if (solve) onFinished(solve);
  };
  const finishedId = solve && !isLive(solve) ? solve.id : null;
  // Once for each solve that ends, whatever else of it changes afterwards.
  useEffect(() => {
    if (finishedId !== null) finish.current();
  }, [finishedId]);

  return {
    solve,
    starting,
    stop,
    adopt,
    /** What the bench held when it was asked on this page. */
    askedOf,
    offered,
    previewing,
    setPreviewing,
    askAnother: () => {
      const { past, content, future, facts } = store.getState();
      const steps = [...past, ...future].map((step) => step.content.placement);
      const opCount = store.setting.kernel.ops.length;
      return ask(
        {
          kind: 'another',
          objectiveValue: objectiveOf(facts.metrics, parts.settings.objective, parts.settings.weights),
          than: avoidedPlacements([...found.current, ...steps, content.placement], opCount),
        },
        false,
      );
    },
    askPrice: (op: OpId) => {
      const { pins, placement } = store.getState().content;
      const tile = pins[op] ?? placement[op];
      if (tile === undefined) return;
      const side = pins[op] === undefined ? 'with pin' : 'without pin';
      void ask({ kind: 'pin price', op, tile, side }, true);
    },
    askFurther: () => {
      const further = solve && furtherAsk(solve);
      if (further) void ask(further, false);
    },
    take: (said: string) => {
      if (offered) store.getState().takeResult(offered.result, { said, pins: offered.pins });
      setPreviewing(false);
    },
    isTaken: (content: BenchContent) =>
      offered !== null && samePlacement(offered.result.placement, content.placement),
    /** Whether the bench holds what any of this visit's questions has found. */
    hasFound: (content: BenchContent) =>
      found.current.some((placement) => samePlacement(placement, content.placement)),
  };
}

export type BenchAsk = ReturnType<typeof useBenchAsk>;

/** What was found for the question; of a pin's price that of the supposed side, from whichever solve has it. */
function useOffered(workspace: string, solve: Solve | null): OfferedMapping | null {
  const pins = useBench((state) => state.content.pins);
  const ask = solve?.settings.ask;
  const isOther = ask?.kind === 'pin price' && ask.side !== supposedSide(ask);
  const { data: other } = useSolve(workspace, isOther ? ask.other.solveId : null);
  const from = isOther ? other : solve;
  return useMemo(() => {
    const result = from && solveResult(from);
    if (!result || !ask) return null;
    const ownPins = ask.kind === 'another' ? pins : pinsOfSide(pins, { ...ask, side: supposedSide(ask) });
    return { result, pins: ownPins };
  }, [from, ask, pins]);
}

const takenText = ({ best, settings: { objective, weights } }: Solve): string =>
  `Another mapping, of ${valueText(best?.objectiveValue ?? 0)} ${objectiveName(objective, weights)}, is on the bench. Undo brings back the former.`;
