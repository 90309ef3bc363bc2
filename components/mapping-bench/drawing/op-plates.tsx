import { memo } from 'react';
import type { FabricGraph } from '@/lib/fabric/compile';
import type { Op, OpId } from '@/lib/graph/kernel';
import type { ArrivingNet } from '@/lib/mapping/picture/consumer-hops';
import { knotPlaces } from '@/lib/mapping/picture/consumer-hops';
import { positionOf, TILE_PX, tileBox } from '@/lib/mapping/picture/fabric-geometry';
import { labelLines, shortName } from '@/lib/mapping/picture/op-label';
import { threadStyle } from '@/lib/mapping/picture/thread-style';
import type { Lit } from '../store/lit';

interface OpPlatesProps {
  graph: FabricGraph;
  byTile: ReadonlyMap<number, OpId>;
  ops: ReadonlyMap<OpId, Op>;
  pins: Readonly<Record<OpId, unknown>>;
  arriving: ReadonlyMap<OpId, readonly ArrivingNet[]>;
  lit: Lit | null;
  held: OpId | null;
}

/** The ops on their tiles: name, pin, and a numbered knot for each net that ends here. */
export function OpPlates({ graph, byTile, ops, pins, arriving, lit, held }: OpPlatesProps) {
  return (
    <g>
      {[...byTile].map(([tile, id]) => {
        const op = ops.get(id);
        if (!op) return null;
        const { row, col } = positionOf(graph, tile);
        return (
          <OpPlate
            key={id}
            op={op}
            row={row}
            col={col}
            pinned={pins[id] !== undefined}
            arriving={arriving.get(id) ?? none}
            part={lit === null ? 'plain' : lit.op === id ? 'pointed' : lit.near.has(id) ? 'near' : 'far'}
            held={held === id}
          />
        );
      })}
    </g>
  );
}

const none: readonly ArrivingNet[] = [];
const LINE_PX = 13;

interface OpPlateProps {
  op: Op;
  row: number;
  col: number;
  pinned: boolean;
  arriving: readonly ArrivingNet[];
  part: 'plain' | 'pointed' | 'near' | 'far';
  held: boolean;
}

const OpPlate = memo(function OpPlate({ op, row, col, pinned, arriving, part, held }: OpPlateProps) {
  const { x, y } = tileBox(row, col);
  const lines = labelLines(shortName(op));
  const places = knotPlaces(arriving.length, TILE_PX);
  const first = y + (lines.length > 1 ? 27 : 33);
  return (
    <g opacity={held ? 0.55 : 1}>
      {part === 'pointed' || held ? (
        <rect
          x={x - 2}
          y={y - 2}
          width={TILE_PX + 4}
          height={TILE_PX + 4}
          rx={2}
          fill="none"
          stroke="var(--indigo)"
          strokeWidth={2.6}
          strokeDasharray={held ? '5 4' : undefined}
        />
      ) : null}
      {part === 'near' ? (
        <rect
          x={x - 1}
          y={y - 1}
          width={TILE_PX + 2}
          height={TILE_PX + 2}
          fill="none"
          stroke="var(--indigo)"
          strokeWidth={1.5}
        />
      ) : null}
      {lines.map((line, i) => (
        <text
          key={i}
          x={x + TILE_PX / 2}
          y={first + i * LINE_PX}
          textAnchor="middle"
          fontSize={12.5}
          fontWeight={650}
          fill={part === 'far' ? 'var(--quiet)' : 'var(--ink)'}
        >
          {line}
        </text>
      ))}
      {pinned ? <PinMark x={x + TILE_PX - 15} y={y + 4} /> : null}
      {arriving.map((net, i) => {
        const at = places[i] ?? { x: 0, y: 0 };
        return (
          <g key={net.source}>
            <circle
              cx={x + at.x}
              cy={y + at.y}
              r={7.6}
              fill={`var(--thread-${threadStyle(net.net).colour})`}
            />
            <text
              x={x + at.x}
              y={y + at.y + 3.6}
              textAnchor="middle"
              className="font-mono"
              fontSize={10}
              fontWeight={700}
              fill="var(--surface)"
            >
              {net.hops}
            </text>
          </g>
        );
      })}
    </g>
  );
});

/** A pin's head and shaft. */
function PinMark({ x, y }: { x: number; y: number }) {
  return (
    <g>
      <circle cx={x + 5} cy={y + 4} r={4} fill="var(--indigo)" />
      <path d={`M${x + 5} ${y + 7}v7`} stroke="var(--indigo)" strokeWidth={1.8} strokeLinecap="round" />
    </g>
  );
}
