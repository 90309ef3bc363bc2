/**
 * Simulated annealing (Kirkpatrick, Gelatt and Vecchi 1983) of ops and routes together: a move puts an op on
 * another tile, in exchange where it is taken, and grows the trees of its nets anew around those of all others.
 *
 * The cost is the objective of the trees plus a price for every net beyond a link's channels; the price rises from
 * slice start to end, as in negotiated routing (McMurchie and Ebeling 1995). Most moves are refused before any tree
 * grows: the trees of the nets that stay, and least trees without congestion for those that change, already cost too
 * much. Same random stream, same result.
 */
import { type AnnealMoves, pickTile } from './anneal';
import type { Random } from './random';
import { growNet, liftNet, putAside, type RoutedNets, shuffleTies, takeBack, treesOf } from './routed-nets';

export interface RoutedSchedule {
  moves: number;
  startTemperature: number;
  endTemperature: number;
  /** What a net beyond the channels costs at the start and at the end. */
  startOverfull: number;
  endOverfull: number;
  /** Looked at every 256 moves. */
  shouldStop(): boolean;
}

export interface RoutedTiling {
  tiling: Int32Array;
  /** Objective of the trees; a legal mapping's where nothing is overfull. */
  cost: number;
  overfull: number;
  trees: number[][];
}

/** Anneals from `start`: the best without an overfull link, else the best by cost with a high price for these. */
export function annealRouted(
  moves: AnnealMoves,
  state: RoutedNets,
  start: Int32Array,
  schedule: RoutedSchedule,
  random: Random,
): RoutedTiling {
  const run = startRun(moves, state, start, schedule, random);
  const movable = moves.instance.candidates.flatMap((list, op) => (list.length > 1 ? [op] : []));
  const steps = Math.max(1, schedule.moves);
  const cooling = (schedule.endTemperature / schedule.startTemperature) ** (1 / steps);
  let temperature = schedule.startTemperature;
  for (let move = 0; move < schedule.moves; move++, temperature *= cooling) {
    if ((move & 255) === 255) {
      if (schedule.shouldStop()) break;
      shuffleTies(state, random);
      const part = move / steps;
      run.overfullCost = schedule.startOverfull + (schedule.endOverfull - schedule.startOverfull) * part;
    }
    const room = -temperature * Math.log(1 - random.unit());
    if (movable.length === 0 || random.unit() < REROUTE_SHARE) tryReroute(run, room, random);
    else tryMove(run, movable[random.below(movable.length)] as number, room, random);
  }
  return run.best;
}

/** Moves that only give a net another tree. */
const REROUTE_SHARE = 0.1;
/** What an overfull link counts when two results are compared, in hops. */
export const OVERFULL_HOPS = 4;

interface Run {
  moves: AnnealMoves;
  state: RoutedNets;
  tiling: Int32Array;
  opAt: Int32Array;
  overfullCost: number;
  /** Sum of the trees' lengths. */
  length: number;
  /** The nets of the move at hand, and what each would cost alone. */
  nets: Int32Array;
  alone: Float64Array;
  netStamp: Int32Array;
  stamp: number;
  best: RoutedTiling;
  bestScore: number;
}

function startRun(
  moves: AnnealMoves,
  state: RoutedNets,
  start: Int32Array,
  schedule: RoutedSchedule,
  random: Random,
): Run {
  const { instance } = moves;
  const netCount = instance.nets.length;
  const tiling = start.slice();
  const opAt = new Int32Array(instance.tileCount).fill(-1);
  tiling.forEach((tile, op) => {
    opAt[tile] = op;
  });
  shuffleTies(state, random);
  for (let net = 0; net < netCount; net++) liftNet(state, net);
  let length = 0;
  for (let net = 0; net < netCount; net++) {
    growNet(state, net, tiling, schedule.startOverfull);
    length += state.length[net] as number;
  }
  const run: Run = {
    moves,
    state,
    tiling,
    opAt,
    overfullCost: schedule.startOverfull,
    length,
    nets: new Int32Array(netCount),
    alone: new Float64Array(netCount),
    netStamp: new Int32Array(netCount),
    stamp: 0,
    best: { tiling, cost: length, overfull: state.overfull, trees: [] },
    bestScore: Number.POSITIVE_INFINITY,
  };
  noteBest(run);
  return run;
}

function noteBest(run: Run): void {
  const { length, state } = run;
  const score = length + OVERFULL_HOPS * state.overfull;
  if (score >= run.bestScore - 1e-9) return;
  run.bestScore = score;
  run.best = { tiling: run.tiling.slice(), cost: length, overfull: state.overfull, trees: treesOf(state) };
}

function tryReroute(run: Run, room: number, random: Random): void {
  const { state } = run;
  if (state.length.length === 0) return;
  run.nets[0] = random.below(state.length.length);
  run.alone[0] = 0;
  regrow(run, 1, room);
}

function tryMove(run: Run, op: number, room: number, random: Random): void {
  const { tiling, opAt } = run;
  const from = tiling[op] as number;
  const to = pickTile(run.moves, tiling, op, random);
  if (to === from) return;
  const other = opAt[to] as number;
  if (other >= 0 && !run.moves.isCandidate(other, from)) return;
  tiling[op] = to;
  if (other >= 0) tiling[other] = from;
  opAt[from] = other;
  opAt[to] = op;
  const count = gatherNets(run, op, other);
  if (regrow(run, count, room)) return;
  tiling[op] = from;
  if (other >= 0) tiling[other] = to;
  opAt[from] = op;
  opAt[to] = other;
}

/** The nets of one or two ops, each once, with what they cost alone on the tiling as it is now. */
function gatherNets(run: Run, op: number, other: number): number {
  const { state, moves, tiling } = run;
  const stamp = ++run.stamp;
  let count = 0;
  for (let which = 0; which < 2; which++) {
    const one = which === 0 ? op : other;
    if (one < 0) break;
    for (const net of state.netsOfOp[one] as readonly number[]) {
      if (run.netStamp[net] === stamp) continue;
      run.netStamp[net] = stamp;
      run.nets[count] = net;
      run.alone[count++] = moves.cost.net(net, tiling);
    }
  }
  return count;
}

/** Grows the first `count` nets of the move anew; takes all back and says false where that costs over `room` more. */
function regrow(run: Run, count: number, room: number): boolean {
  const { state, nets, alone } = run;
  const limit = run.length + run.overfullCost * state.overfull + room;
  let after = run.length;
  for (let k = 0; k < count; k++) after += (alone[k] as number) - (state.length[nets[k] as number] as number);
  if (after > limit) return false;
  for (let k = 0; k < count; k++) {
    liftNet(state, nets[k] as number);
    putAside(state, nets[k] as number, k);
  }
  let grown = 0;
  while (grown < count && after + run.overfullCost * state.overfull <= limit) {
    const net = nets[grown] as number;
    growNet(state, net, run.tiling, run.overfullCost);
    after += (state.length[net] as number) - (alone[grown++] as number);
  }
  if (grown === count && after + run.overfullCost * state.overfull <= limit) {
    run.length = after;
    noteBest(run);
    return true;
  }
  for (let k = 0; k < grown; k++) liftNet(state, nets[k] as number);
  for (let k = 0; k < count; k++) takeBack(state, nets[k] as number, k);
  return false;
}
