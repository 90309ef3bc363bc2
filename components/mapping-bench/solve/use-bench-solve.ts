'use client';

import { useCallback, useEffect, useRef, useState } from 'react';
import { samePlacement } from '@/lib/mapping/honest-provenance';
import type { BenchContent } from '../store/bench-content';
import type { BenchStore } from '../store/bench-store';
import { firstSettings, isLive, type SolveSettings, solveResult } from './solve-state';
import { type SolveJobParts, useSolveJob } from './use-solve-job';

/**
 * One solve at a time for a bench. Its result goes on the bench by itself only when nothing was changed since it was
 * asked for on this page; otherwise it is offered.
 */
export function useBenchSolve(store: BenchStore, parts: SolveJobParts) {
  const { solve, starting, begin, stop, adopt } = useSolveJob(parts);
  const [previewing, setPreviewing] = useState(false);
  const [chosen, setChosen] = useState<{ after: string | null; settings: SolveSettings } | null>(null);
  const startedWith = useRef<{ solveId: string; content: BenchContent } | null>(null);
  const after = solve?.id ?? null;
  const choose = useCallback((settings: SolveSettings) => setChosen({ after, settings }), [after]);
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
    const { content } = store.getState();
    const { pins, placement } = content;
    const startPlacement = fromHere && Object.keys(placement).length > 0 ? placement : null;
    const id = await begin({ settings, pins, startPlacement });
    if (id !== null) startedWith.current = { solveId: id, content };
  }
  return {
    solve,
    /** Those of the solve, until others are chosen after it. */
    settings: chosen?.after === after ? chosen.settings : (solve?.settings ?? firstSettings),
    choose,
    starting,
    previewing,
    setPreviewing,
    result,
    start,
    stop,
    adopt,
    isTaken: (content: BenchContent) => result !== null && samePlacement(result.placement, content.placement),
  };
}

export type BenchSolve = ReturnType<typeof useBenchSolve>;
