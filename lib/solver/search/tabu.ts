/**
 * Robust tabu search over placements for many pairs (É. Taillard, "Robust taboo search for the quadratic assignment
 * problem", Parallel Computing 17 (1991) 443–455): always the best exchange of two tiles' contents, where an op does
 * not go back for a while to a tile that it left. Free tiles hold blanks, so a move to a free tile is an exchange.
 *
 * What every exchange would change is kept in a table and brought up to date in constant time an entry.
 * Same random stream, same result. Cost of a step: (tiles²/2) entries; memory 8 bytes × 4 × tiles².
 */
import type { PlacementInstance } from '../instance';
import { hopTable } from './placement-cost';
import type { Random } from './random';

export interface TabuSearch {
  /** Steps on from where it is; returns the best tiling since the last `restart` and its cost. */
  run(steps: number, random: Random, shouldStop: () => boolean): { tiling: Int32Array; cost: number };
  /** Goes on from a tiling, all memory forgotten. */
  restart(tiling: Int32Array): void;
}

interface Table {
  size: number;
  opCount: number;
  flow: Float64Array;
  hops: Float64Array;
  /** Tile of each op or blank. */
  at: Int32Array;
  /** delta[i · size + j], i < j: what exchanging i and j changes; Infinity where that is not allowed. */
  delta: Float64Array;
  allowed: Uint8Array;
  /** The step until which item i does not go to tile t. */
  tabuUntil: Float64Array;
  /** Scratch of one exchange, by item. */
  flowOut: Float64Array;
  flowIn: Float64Array;
  hopsOut: Float64Array;
  hopsIn: Float64Array;
}

export function tabuSearch(instance: PlacementInstance): TabuSearch {
  const table = emptyTable(instance);
  const { size, opCount, at, delta } = table;
  let step = 0;
  let current = 0;
  let best = { tiling: new Int32Array(0), cost: Number.POSITIVE_INFINITY };
  const note = () => {
    best = { tiling: at.slice(0, opCount), cost: current };
  };
  return {
    restart: (tiling) => {
      fill(table, tiling);
      step = 0;
      current = totalOf(table);
      note();
    },
    run: (steps, random, shouldStop) => {
      for (let k = 0; k < steps; k++) {
        if ((k & 63) === 63 && shouldStop()) break;
        step++;
        const chosen = bestExchange(table, step, best.cost - current);
        if (chosen < 0) continue;
        const [u, v] = [Math.floor(chosen / size), chosen % size];
        current += delta[chosen] as number;
        exchange(table, u, v, step, random);
        if (current < best.cost - 1e-9) note();
      }
      return best;
    },
  };
}

function emptyTable(instance: PlacementInstance): Table {
  const { opCount, tileCount: size, candidates } = instance;
  const flow = new Float64Array(size * size);
  for (const { from, to, weight } of instance.pairs) flow[from * size + to] = weight;
  const allowed = new Uint8Array(size * size).fill(1, opCount * size);
  candidates.forEach((list, op) => {
    for (const tile of list) allowed[op * size + tile] = 1;
  });
  return {
    size,
    opCount,
    flow,
    hops: Float64Array.from(hopTable(instance, (hops) => hops)),
    at: new Int32Array(size),
    delta: new Float64Array(size * size),
    allowed,
    tabuUntil: new Float64Array(size * size),
    flowOut: new Float64Array(size),
    flowIn: new Float64Array(size),
    hopsOut: new Float64Array(size),
    hopsIn: new Float64Array(size),
  };
}

function fill(table: Table, tiling: Int32Array): void {
  const { size, opCount, at, delta, tabuUntil } = table;
  const taken = new Uint8Array(size);
  tiling.forEach((tile, op) => {
    at[op] = tile;
    taken[tile] = 1;
  });
  let blank = opCount;
  for (let tile = 0; tile < size; tile++) if (!taken[tile]) at[blank++] = tile;
  for (let i = 0; i < opCount; i++) {
    for (let j = i + 1; j < size; j++) delta[i * size + j] = exchangeDelta(table, i, j);
  }
  tabuUntil.fill(0);
}

function totalOf({ size, opCount, flow, hops, at }: Table): number {
  let sum = 0;
  for (let i = 0; i < opCount; i++) {
    for (let j = 0; j < opCount; j++) {
      const weight = flow[i * size + j] as number;
      if (weight > 0) sum += weight * (hops[(at[i] as number) * size + (at[j] as number)] as number);
    }
  }
  return sum;
}

/** What exchanging items r and s changes. Cost: linear in the ops. */
function exchangeDelta({ size, opCount, flow, hops, at }: Table, r: number, s: number): number {
  const p = at[r] as number;
  const q = at[s] as number;
  let sum =
    ((flow[r * size + s] as number) - (flow[s * size + r] as number)) *
    ((hops[q * size + p] as number) - (hops[p * size + q] as number));
  for (let k = 0; k < opCount; k++) {
    if (k === r || k === s) continue;
    const t = at[k] as number;
    sum +=
      ((flow[k * size + r] as number) - (flow[k * size + s] as number)) *
        ((hops[t * size + q] as number) - (hops[t * size + p] as number)) +
      ((flow[r * size + k] as number) - (flow[s * size + k] as number)) *
        ((hops[q * size + t] as number) - (hops[p * size + t] as number));
  }
  return sum;
}

/** The best exchange that is not tabu, or that leads below the best (`aspiration`); −1 where there is none. */
function bestExchange(table: Table, step: number, aspiration: number): number {
  const { size, opCount, at, delta, allowed, tabuUntil } = table;
  /** An exchange not made for this long is made whatever it costs. */
  const longAgo = step - LONG_AGO * size * size;
  let best = -1;
  let least = Number.POSITIVE_INFINITY;
  let isForced = false;
  for (let i = 0; i < opCount; i++) {
    const p = at[i] as number;
    for (let j = i + 1; j < size; j++) {
      const q = at[j] as number;
      if (!allowed[i * size + q] || !allowed[j * size + p]) continue;
      const change = delta[i * size + j] as number;
      const one = tabuUntil[i * size + q] as number;
      const other = tabuUntil[j * size + p] as number;
      const force = (j < opCount ? Math.max(one, other) : one) < longAgo;
      if (isForced && !force) continue;
      const isTabu = one > step && (j >= opCount || other > step);
      if (isTabu && !force && change >= aspiration - 1e-9) continue;
      if (force && !isForced) least = Number.POSITIVE_INFINITY;
      if (change >= least) continue;
      isForced ||= force;
      least = change;
      best = i * size + j;
    }
  }
  return best;
}

const LONG_AGO = 5;

/** Exchanges u and v and brings the table up to date. */
function exchange(table: Table, u: number, v: number, step: number, random: Random): void {
  const { size, opCount, at, delta, tabuUntil } = table;
  const p = at[u] as number;
  const q = at[v] as number;
  at[u] = q;
  at[v] = p;
  tabuUntil[u * size + p] = step + tenure(size, random);
  tabuUntil[v * size + q] = step + tenure(size, random);
  differences(table, u, v);
  const { flowOut, flowIn, hopsOut, hopsIn } = table;
  for (let i = 0; i < opCount; i++) {
    if (i === u || i === v) {
      for (let j = i + 1; j < size; j++) delta[i * size + j] = exchangeDelta(table, i, j);
      continue;
    }
    const [outFlow, inFlow] = [flowOut[i] as number, flowIn[i] as number];
    const [outHops, inHops] = [hopsOut[i] as number, hopsIn[i] as number];
    for (let j = i + 1, entry = i * size + i + 1; j < size; j++, entry++) {
      delta[entry] =
        (delta[entry] as number) +
        (outFlow - (flowOut[j] as number)) * ((hopsOut[j] as number) - outHops) +
        (inFlow - (flowIn[j] as number)) * ((hopsIn[j] as number) - inHops);
    }
    if (u > i) delta[i * size + u] = exchangeDelta(table, i, u);
    if (v > i) delta[i * size + v] = exchangeDelta(table, i, v);
  }
}

/** For every item: its flow to u less that to v, its hops to u less those to v, and both the other way. */
function differences(
  { size, flow, hops, at, flowOut, flowIn, hopsOut, hopsIn }: Table,
  u: number,
  v: number,
): void {
  const [p, q] = [at[u] as number, at[v] as number];
  for (let i = 0; i < size; i++) {
    const t = at[i] as number;
    flowOut[i] = (flow[i * size + u] as number) - (flow[i * size + v] as number);
    flowIn[i] = (flow[u * size + i] as number) - (flow[v * size + i] as number);
    hopsOut[i] = (hops[t * size + p] as number) - (hops[t * size + q] as number);
    hopsIn[i] = (hops[p * size + t] as number) - (hops[q * size + t] as number);
  }
}

/** Between a step and about eight times the size, mostly short: as robust over the kinds of instance as any. */
function tenure(size: number, random: Random): number {
  const part = random.unit();
  return 1 + Math.floor(part * part * part * 8 * size);
}
