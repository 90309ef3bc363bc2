'use client';

import { useEffect, useRef, useState } from 'react';
import { samePlacement } from '@/lib/mapping/honest-provenance';
import type { BenchCalls } from '../bench-calls';
import type { BenchContent } from '../store/bench-content';
import type { BenchStore } from '../store/bench-store';
import { isLive, type SolveSettings, solveResult } from './solve-state';
import { useSolve } from './use-solve';

interface BenchSolveParts {
  workspace: string;
  draftId: `draft_${string}`;
  /** The solve that runs, or the last one; found again after a reload. */
  firstSolveId: string | null;
  calls: Pick<BenchCalls, 'startSolve' | 'stopSolve'>;
  onError: (message: string) => void;
}

/**
 * One solve at a time for a bench. Its result goes on the bench by itself only when nothing was changed since it was
 * asked for on this page; otherwise it is offered.
 */
export function useBenchSolve(store: BenchStore, parts: BenchSolveParts) {
  const { workspace, draftId, calls, onError } = parts;
  const [solveId, setSolveId] = useState(parts.firstSolveId);
  const [starting, setStarting] = useState(false);
  const [previewing, setPreviewing] = useState(false);
  const startedWith = useRef<{ solveId: string; content: BenchContent } | null>(null);
  const { data, mutate } = useSolve(workspace, solveId);
  const solve = data ?? null;
  const result = solve ? solveResult(solve) : null;

  const finishedId = solve && !isLive(solve) ? solve.id : null;
  useEffect(() => {
    if (finishedId === null) return;
    setPreviewing(false);
    const started = startedWith.current;
    if (started?.solveId !== finishedId || !solve) return;
    startedWith.current = null;
    const found = solveResult(solve);
    if (found && store.getState().content === started.content) store.getState().takeResult(found);
    else if (found) store.getState().say('The solve has ended; its result is offered beside the fabric.');
    else store.getState().say(solve.outcome?.reason ?? 'The solve ended without a mapping.', true);
  }, [finishedId, solve, store]);

  async function start(settings: SolveSettings, fromHere: boolean): Promise<void> {
    setStarting(true);
    const { content } = store.getState();
    try {
      const answer = await calls.startSolve({
        workspace,
        draftId,
        settings,
        pins: content.pins,
        startPlacement: fromHere && Object.keys(content.placement).length > 0 ? content.placement : null,
      });
      if (!answer.ok) {
        onError(answer.error.message);
        return;
      }
      const { solveId: id, created } = answer.value;
      if (created) startedWith.current = { solveId: id, content };
      setSolveId(id);
    } catch {
      onError('The server does not answer. Nothing was started; try again.');
    } finally {
      setStarting(false);
    }
  }
  async function stop(): Promise<void> {
    if (!solve) return;
    try {
      const answer = await calls.stopSolve({ workspace, solveId: solve.id as `solve_${string}` });
      if (!answer.ok) onError(answer.error.message);
      await mutate();
    } catch {
      onError('The server does not answer. The solve goes on; try again.');
    }
  }
  return {
    solve,
    starting,
    previewing,
    setPreviewing,
    result,
    start,
    stop,
    isTaken: (content: BenchContent) => result !== null && samePlacement(result.placement, content.placement),
  };
}
