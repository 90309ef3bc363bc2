/** A chain of points as the text of an SVG path, its corners slightly rounded as a thread's are. */
import type { Point } from './fabric-geometry';

const CORNER_PX = 5;
const text = (value: number): string => String(Math.round(value * 100) / 100);
const at = (point: Point): string => `${text(point.x)} ${text(point.y)}`;

export function threadPath(chain: readonly Point[]): string {
  const [first, ...rest] = chain;
  if (!first || rest.length === 0) return '';
  const parts = [`M${at(first)}`];
  rest.forEach((point, i) => {
    const before = chain[i] ?? first;
    const after = rest[i + 1];
    if (!after) {
      parts.push(`L${at(point)}`);
      return;
    }
    const radius = Math.min(CORNER_PX, distance(before, point) / 2, distance(point, after) / 2);
    parts.push(`L${at(towards(point, before, radius))}Q${at(point)} ${at(towards(point, after, radius))}`);
  });
  return parts.join('');
}

const distance = (a: Point, b: Point): number => Math.hypot(b.x - a.x, b.y - a.y);

function towards(from: Point, to: Point, by: number): Point {
  const length = distance(from, to);
  if (length === 0) return from;
  return { x: from.x + ((to.x - from.x) * by) / length, y: from.y + ((to.y - from.y) * by) / length };
}
