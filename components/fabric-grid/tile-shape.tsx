import { memo } from 'react';
import type { UnitForm } from '@/lib/fabric/unit-library';
import { type Box, TILE_PX } from '@/lib/mapping/picture/fabric-geometry';
import { tileMarks } from '@/lib/mapping/picture/tile-marks';

export type TileLook = 'free' | 'taken' | 'dimmed';

interface TileShapeProps {
  box: Box;
  /** Null: a router without a PE. */
  unit: { form: UnitForm; tint: string } | null;
  look: TileLook;
  /** The tile's place in small figures, such as 3,4; empty for none. */
  place: string;
}

/** One tile: its unit's tint and form. A tile without a PE is only hinted at. */
export const TileShape = memo(function TileShape({ box, unit, look, place }: TileShapeProps) {
  if (!unit) {
    return (
      <g>
        <rect
          {...box}
          fill="var(--tile-none)"
          stroke="var(--rule)"
          strokeDasharray="1 5"
          strokeLinecap="round"
        />
      </g>
    );
  }
  const marks = tileMarks(unit.form, box);
  const line = look === 'taken' ? 'var(--ink)' : 'var(--edge)';
  return (
    <g opacity={look === 'dimmed' ? 0.28 : 1}>
      <path d={marks.outline} fill={unit.tint} stroke={line} strokeWidth={look === 'taken' ? 1.4 : 0.8} />
      {marks.strokes === '' ? null : (
        <path
          d={marks.strokes}
          fill="none"
          stroke={line}
          strokeWidth={0.9}
          strokeDasharray={marks.stitched ? '3 2.5' : undefined}
        />
      )}
      {place === '' ? null : (
        <text
          x={box.x + 5}
          y={box.y + 12}
          className="font-mono"
          fontSize={TILE_PX * 0.135}
          fill="var(--quiet)"
        >
          {place}
        </text>
      )}
    </g>
  );
});
