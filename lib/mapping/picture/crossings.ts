/**
 * Over and under: where two threads cross, one passes under with a small gap, as in a weave.
 *
 * Along each thread over and under take turns as far as the other threads allow: crossings are decided in the order in
 * which they lie along the threads, and each goes against what its two threads did last. Cost: every pair of lines.
 */
import type { Point } from './fabric-geometry';

/** A line that is drawn in one go. */
export type Chain = readonly Point[];

const GAP_PX = 4;
const SAME_PX = 1e-6;

interface Line {
  thread: number;
  chain: number;
  /** Index of the line's first point in its chain. */
  at: number;
  a: Point;
  b: Point;
}

interface Crossing {
  /** The two lines, and how far along each (0 to 1) they meet. */
  lines: readonly [Line, Line];
  along: readonly [number, number];
  under: 0 | 1;
}

/** The threads' chains with gaps cut into whichever passes under at each crossing. */
export function weaveChains(threads: readonly (readonly Chain[])[]): Chain[][] {
  const lines = threads.flatMap((chains, thread) => chains.flatMap((chain, i) => linesOf(chain, thread, i)));
  const cuts = new Map<string, number[]>();
  for (const crossing of decide(findCrossings(lines))) {
    const line = crossing.lines[crossing.under];
    const key = lineKey(line.thread, line.chain, line.at);
    cuts.set(key, [...(cuts.get(key) ?? []), crossing.along[crossing.under]]);
  }
  return threads.map((chains, thread) =>
    chains.flatMap((chain, i) => cutChain(chain, (at) => cuts.get(lineKey(thread, i, at)) ?? [])),
  );
}

const lineKey = (thread: number, chain: number, at: number) => `${thread}:${chain}:${at}`;

function linesOf(chain: Chain, thread: number, index: number): Line[] {
  return chain.slice(1).map((b, at) => ({ thread, chain: index, at, a: chain[at] ?? b, b }));
}

function findCrossings(lines: readonly Line[]): Crossing[] {
  const found: Crossing[] = [];
  lines.forEach((first, i) => {
    for (const second of lines.slice(i + 1)) {
      if (first.thread === second.thread) continue;
      const along = meet(first, second);
      if (along) found.push({ lines: [first, second], along, under: 0 });
    }
  });
  return found;
}

/** Where two lines cross, as parts of each; null where they do not or run alongside each other. */
function meet(p: Line, q: Line): readonly [number, number] | null {
  const [px, py] = [p.b.x - p.a.x, p.b.y - p.a.y];
  const [qx, qy] = [q.b.x - q.a.x, q.b.y - q.a.y];
  const turn = px * qy - py * qx;
  if (Math.abs(turn) < SAME_PX) return null;
  const [dx, dy] = [q.a.x - p.a.x, q.a.y - p.a.y];
  const s = (dx * qy - dy * qx) / turn;
  const t = (dx * py - dy * px) / turn;
  const inside = (value: number) => value >= -SAME_PX && value <= 1 + SAME_PX;
  return inside(s) && inside(t) ? [s, t] : null;
}

function decide(crossings: readonly Crossing[]): Crossing[] {
  const lastUnder = new Map<string, boolean>();
  const name = (line: Line) => `${line.thread}:${line.chain}`;
  const ordered = [...crossings].sort(
    (p, q) =>
      p.lines[0].thread - q.lines[0].thread ||
      p.lines[0].chain - q.lines[0].chain ||
      p.lines[0].at - q.lines[0].at ||
      p.along[0] - q.along[0],
  );
  return ordered.map((crossing) => {
    const [first, second] = crossing.lines;
    const firstUnder = lastUnder.get(name(first));
    const secondUnder = lastUnder.get(name(second));
    const under =
      firstUnder === undefined && secondUnder === undefined
        ? 0
        : firstUnder
          ? 1
          : secondUnder === false
            ? 1
            : 0;
    lastUnder.set(name(first), under === 0);
    lastUnder.set(name(second), under === 1);
    return { ...crossing, under };
  });
}

/** Cuts a gap of GAP_PX to both sides of each place; a gap near a corner does not reach round it. */
function cutChain(chain: Chain, cutsAt: (line: number) => readonly number[]): Chain[] {
  const parts: Point[][] = [];
  let part: Point[] = chain[0] ? [chain[0]] : [];
  const close = () => {
    if (part.length > 1) parts.push(part);
  };
  chain.slice(1).forEach((b, at) => {
    const a = chain[at] ?? b;
    const length = Math.hypot(b.x - a.x, b.y - a.y);
    for (const along of [...cutsAt(at)].sort((s, t) => s - t)) {
      const from = Math.max(0, along - GAP_PX / length);
      const until = Math.min(1, along + GAP_PX / length);
      part.push(between(a, b, from));
      close();
      part = [between(a, b, until)];
    }
    part.push(b);
  });
  close();
  return parts.map(withoutRepeats).filter((points) => points.length > 1);
}

const between = (a: Point, b: Point, part: number): Point => ({
  x: a.x + (b.x - a.x) * part,
  y: a.y + (b.y - a.y) * part,
});

const withoutRepeats = (points: readonly Point[]): Point[] =>
  points.filter((point, i) => {
    const before = points[i - 1];
    return !before || Math.hypot(point.x - before.x, point.y - before.y) > SAME_PX;
  });
