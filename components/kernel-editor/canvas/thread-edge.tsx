'use client';

import { type Edge, type EdgeProps, Position } from '@xyflow/react';
import { memo } from 'react';
import { threadCourse } from './thread-path';
import { threadStyle } from './thread-style';

export type ThreadData = { number: number; distance: number };
export type ThreadFlowEdge = Edge<ThreadData, 'thread'>;

/**
 * One connection as a thread. The paper-coloured edge under it leaves a gap in what it crosses, as in a weave. A value
 * that is carried to a later iteration runs as a double dashed line with its distance on a badge.
 */
export const ThreadEdge = memo(function ThreadEdge(props: EdgeProps<ThreadFlowEdge>) {
  const { selected, data } = props;
  const distance = data?.distance ?? 0;
  const { colour, dash } = threadStyle(data?.number ?? 0);
  const { path, labelX, labelY } = threadCourse({
    ...props,
    targetPosition: props.targetPosition ?? Position.Left,
  });
  const carried = distance > 0;
  return (
    <>
      <path d={path} fill="none" stroke="var(--paper)" strokeWidth={carried ? 8 : 6} />
      {selected ? (
        <path d={path} fill="none" stroke="var(--indigo)" strokeOpacity={0.35} strokeWidth={9} />
      ) : null}
      <path
        d={path}
        fill="none"
        stroke={colour}
        strokeWidth={carried ? 4 : selected ? 2.5 : 1.75}
        strokeDasharray={carried ? '9 4' : dash}
      />
      {carried ? <path d={path} fill="none" stroke="var(--paper)" strokeWidth={1.5} /> : null}
      <path
        d={path}
        fill="none"
        stroke="transparent"
        strokeWidth={16}
        className="react-flow__edge-interaction"
      />
      {carried ? <DistanceBadge x={labelX} y={labelY} distance={distance} colour={colour} /> : null}
    </>
  );
});

function DistanceBadge({
  x,
  y,
  distance,
  colour,
}: {
  x: number;
  y: number;
  distance: number;
  colour: string;
}) {
  const widthPx = distance > 9 ? 40 : 34;
  return (
    <g transform={`translate(${x - widthPx / 2} ${y - 9})`}>
      <title>
        Carried {distance} {distance === 1 ? 'iteration' : 'iterations'}
      </title>
      <rect width={widthPx} height={18} rx={9} fill="var(--surface)" stroke={colour} strokeWidth={1.5} />
      <text
        x={widthPx / 2}
        y={13}
        textAnchor="middle"
        fontSize={12}
        fontWeight={600}
        fill="var(--ink)"
        className="figures"
      >
        ↻ {distance}
      </text>
    </g>
  );
}
