'use client';

import { useState } from 'react';
import type { Pins, Placement } from '@/lib/mapping/mapping';
import type { Ask } from '@/lib/solver/solve-ask';
import type { BenchCalls } from '../bench-calls';
import type { SolveSettings } from './solve-state';
import { useSolve } from './use-solve';

export interface SolveJobParts {
  workspace: string;
  draftId: `draft_${string}`;
  /** The solve that runs, or the last one; found again after a reload. */
  firstSolveId: string | null;
  calls: Pick<BenchCalls, 'startSolve' | 'stopSolve'>;
  onError: (message: string) => void;
  /** A solve of the other sort runs already, which belongs to the other hook. */
  onOther: (solveId: string) => void;
}

export interface SolveRequest {
  settings: SolveSettings & { ask?: Ask };
  pins: Pins;
  startPlacement: Placement | null;
}

/** One solve of a bench as it goes: asked for, watched, stopped. */
export function useSolveJob(parts: SolveJobParts) {
  const { workspace, draftId, calls, onError } = parts;
  const [solveId, setSolveId] = useState(parts.firstSolveId);
  const [starting, setStarting] = useState(false);
  const { data, mutate } = useSolve(workspace, solveId);
  const solve = data ?? null;

  /** The id where this call has made the solve; null where it failed or another solve of the bench runs. */
  async function begin(request: SolveRequest): Promise<string | null> {
    setStarting(true);
    try {
      const answer = await calls.startSolve({ workspace, draftId, ...request });
      if (!answer.ok) {
        onError(answer.error.message);
        return null;
      }
      const { solveId: id, created, asks } = answer.value;
      const isOfThisSort = (asks === null) === (request.settings.ask === undefined);
      if (isOfThisSort) setSolveId(id);
      else parts.onOther(id);
      if (!created) onError('Another solve of this bench runs already. Ask again when it has ended.');
      return created ? id : null;
    } catch {
      onError('The server does not answer. Nothing was started; try again.');
      return null;
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
  return { solve, starting, begin, stop, adopt: setSolveId };
}
