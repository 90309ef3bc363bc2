/**
 * Lanes: nets that run beside each other in one channel keep apart.
 *
 * The pieces of a net on one channel are joined to runs where they meet end to end, so that a thread goes straight on
 * past a router. Runs of different nets that overlap or touch get different lanes, by the left-edge rule: runs
 * in order of their start, each on the first lane that is free. An even number of lanes is laid out, so none runs
 * through the middle of a router.
 */
import { LANE_REACH_PX } from './fabric-geometry';
import type { ChannelAxis, LinkPiece } from './link-pieces';

const LANE_GAP_PX = 6;
/** Runs that come closer than this end to end are treated as touching. */
const TOUCH_PX = 20;

export interface NetPiece extends LinkPiece {
  net: number;
  /** Names the piece: the same key finds its lane again. */
  key: string;
}

interface Run {
  net: number;
  low: number;
  high: number;
  keys: string[];
}

/** The distance of each piece from the middle of its channel, in px, by the piece's key. */
export function laneOffsets(pieces: readonly NetPiece[]): Map<string, number> {
  const channels = new Map<string, NetPiece[]>();
  for (const piece of pieces) {
    const name = channelName(piece.axis, piece.line);
    const there = channels.get(name);
    if (there) there.push(piece);
    else channels.set(name, [piece]);
  }
  const offsets = new Map<string, number>();
  for (const inChannel of channels.values()) {
    const lanes = assignLanes(joinRuns(inChannel));
    const gap = laneGap(lanes.length);
    lanes.forEach((runs, lane) => {
      for (const run of runs) for (const key of run.keys) offsets.set(key, laneOffset(lane, gap));
    });
  }
  return offsets;
}

const channelName = (axis: ChannelAxis, line: number) => `${axis} ${line}`;

/** Lanes 0, 1, 2, 3 … at −½, +½, −1½, +1½ … gaps. */
const laneOffset = (lane: number, gap: number): number =>
  (lane % 2 === 0 ? -1 : 1) * (Math.floor(lane / 2) + 0.5) * gap;

function laneGap(lanes: number): number {
  const outermost = Math.ceil(lanes / 2) - 0.5;
  return outermost <= 0 ? LANE_GAP_PX : Math.min(LANE_GAP_PX, LANE_REACH_PX / outermost);
}

function joinRuns(pieces: readonly NetPiece[]): Run[] {
  const runs: Run[] = pieces
    .map((piece) => ({
      net: piece.net,
      low: Math.min(piece.start, piece.end),
      high: Math.max(piece.start, piece.end),
      keys: [piece.key],
    }))
    .sort((a, b) => a.net - b.net || a.low - b.low || a.high - b.high);
  const joined: Run[] = [];
  for (const run of runs) {
    const before = joined.findLast((other) => other.net === run.net && other.high === run.low);
    if (before) {
      before.high = run.high;
      before.keys.push(...run.keys);
    } else {
      joined.push(run);
    }
  }
  return joined.sort((a, b) => a.low - b.low || a.high - b.high || a.net - b.net);
}

function assignLanes(runs: readonly Run[]): Run[][] {
  const lanes: Run[][] = [];
  for (const run of runs) {
    const free = lanes.find((lane) => (lane.at(-1)?.high ?? Number.NEGATIVE_INFINITY) + TOUCH_PX < run.low);
    if (free) free.push(run);
    else lanes.push([run]);
  }
  return lanes;
}
