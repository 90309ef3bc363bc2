/** The course of a thread from a result (right side) to an operand (left side, or above for predicates). */
import { getBezierPath, getSmoothStepPath, Position } from '@xyflow/react';

export interface ThreadEnds {
  sourceX: number;
  sourceY: number;
  targetX: number;
  targetY: number;
  targetPosition: Position;
}

export interface ThreadCourse {
  path: string;
  labelX: number;
  labelY: number;
}

const CLEARANCE_PX = 52;
const ROOM_PX = 24;

/** Forward it swings over; where the operand lies behind the result it goes round below both. */
export function threadCourse(ends: ThreadEnds): ThreadCourse {
  const { sourceX, sourceY, targetX, targetY, targetPosition } = ends;
  const shared = { sourceX, sourceY, targetX, targetY, sourcePosition: Position.Right, targetPosition };
  if (targetX > sourceX + ROOM_PX || targetPosition === Position.Top) {
    const [path, labelX, labelY] = getBezierPath(shared);
    return { path, labelX, labelY };
  }
  const belowY = Math.max(sourceY, targetY) + CLEARANCE_PX;
  const [path, labelX, labelY] = getSmoothStepPath({
    ...shared,
    borderRadius: 12,
    offset: 18,
    centerY: belowY,
  });
  return { path, labelX, labelY };
}
