'use client';

import { type Node, type NodeProps, Position } from '@xyflow/react';
import { memo } from 'react';
import { nodeSizePx, type Op, opSpec, portsOf } from '@/lib/graph';
import { useKernelState } from '../store/editor-context';
import { indexOf, severityByOp } from '../store/kernel-facts';
import { OperandHandle, ResultHandle } from './op-handle';
import { paramText } from './op-text';
import { formOf, UnitOutline } from './unit-form';

export type OpNodeData = { op: Op };
export type OpFlowNode = Node<OpNodeData, 'op'>;

const HEADER_PX = 36;
const ROW_PX = 20;
const PREDICATE_AT_PX = 28;
const FALLBACK_AT_PX = 112;

/** One op on the canvas: its unit's form, symbol, label, width, operands and result. */
export const OpNode = memo(function OpNode({ data: { op }, selected }: NodeProps<OpFlowNode>) {
  const spec = opSpec(op.kind);
  const size = nodeSizePx(op);
  const params = paramText(op);
  return (
    <div className="op-node" style={{ width: size.widthPx, height: size.heightPx }}>
      <UnitOutline form={formOf(op.kind)} {...size} selected={selected} />
      <div className="op-print relative flex h-9 items-center gap-1.5 pr-2 pl-2.5">
        <span className="flex-none font-mono text-sm text-quiet" aria-hidden="true">
          {spec.symbol}
        </span>
        <span className="min-w-0 flex-1 truncate text-sm font-semibold">{op.label || spec.label}</span>
        <span className="figures flex-none pr-1 text-xs text-quiet">{op.widthBits}</span>
      </div>
      <div className="op-far-label" aria-hidden="true">
        <span>{op.label || spec.label}</span>
      </div>
      {spec.inputs.map((port, row) => (
        <div
          key={port.name}
          className="op-print relative flex h-5 items-center gap-1 pr-3 pl-3 text-xs leading-none text-quiet"
        >
          <span>{port.label}</span>
          <ConstantText value={op.immediates[port.name]} />
          {row === 0 && params ? <span className="ml-auto truncate font-mono">{params}</span> : null}
        </div>
      ))}
      {spec.inputs.length === 0 ? (
        <div className="op-print relative flex h-5 items-center px-3 font-mono text-xs leading-none text-quiet">
          {params}
        </div>
      ) : null}
      {spec.inputs.map((port, row) => (
        <OperandHandle
          key={port.name}
          op={op.id}
          port={port}
          position={Position.Left}
          style={{ top: HEADER_PX + ROW_PX * row + ROW_PX / 2 }}
        />
      ))}
      <OptionalOperands op={op} />
      {spec.output ? <ResultHandle op={op.id} type={spec.output} position={Position.Right} /> : null}
      <ProblemMark op={op} />
    </div>
  );
});

function ConstantText({ value }: { value: number | undefined }) {
  if (value === undefined) return null;
  return <span className="rounded-sm bg-paper px-1 font-mono text-ink">{value}</span>;
}

/** Predicate and fallback enter from above. */
function OptionalOperands({ op }: { op: Op }) {
  const ports = portsOf(op.kind).filter((port) => !port.required);
  const driven = useKernelState(({ kernel }) =>
    (indexOf(kernel).edgesInto.get(op.id) ?? [])
      .map((edge) => edge.port)
      .filter((port) => port === 'predicate' || port === 'fallback')
      .join(' '),
  );
  return ports.map((port) => {
    const constant = op.immediates[port.name];
    const used = driven.split(' ').includes(port.name) || constant !== undefined;
    const leftPx = port.name === 'predicate' ? PREDICATE_AT_PX : FALLBACK_AT_PX;
    return (
      <div key={port.name}>
        {used ? (
          <span className="absolute -top-5 text-xs whitespace-nowrap text-quiet" style={{ left: leftPx + 8 }}>
            {port.name === 'predicate' ? 'if' : 'else'} <ConstantText value={constant} />
          </span>
        ) : null}
        <OperandHandle
          op={op.id}
          port={port}
          position={Position.Top}
          style={{ left: leftPx }}
          quiet={!used}
        />
      </div>
    );
  });
}

function ProblemMark({ op }: { op: Op }) {
  const severity = useKernelState(({ kernel }) => severityByOp(kernel).get(op.id) ?? null);
  if (severity === null) return null;
  return (
    <span className={`op-problem op-problem-${severity}`} aria-hidden="true">
      !
    </span>
  );
}
