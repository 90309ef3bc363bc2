'use client';

import useSWR from 'swr';
import { isLive, type Solve, solveSchema } from './solve-state';

const POLL_MS = 400;

async function readSolve(address: string): Promise<Solve> {
  const response = await fetch(address, { headers: { accept: 'application/json' } });
  if (!response.ok) throw new Error(`The solve could not be read (${response.status}).`);
  return solveSchema.parse(await response.json());
}

/** A solve, asked for again and again while it is queued or running. Failures are asked again by SWR itself. */
export function useSolve(workspace: string, solveId: string | null) {
  return useSWR(solveId === null ? null : `/api/w/${workspace}/solves/${solveId}`, readSolve, {
    refreshInterval: (latest) => (latest && !isLive(latest) ? 0 : POLL_MS),
    dedupingInterval: 100,
    errorRetryInterval: 1500,
    revalidateOnFocus: false,
  });
}
