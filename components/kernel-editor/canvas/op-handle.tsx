'use client';

import { Handle, type HandleProps } from '@xyflow/react';
import type { CSSProperties } from 'react';
import type { OpId, PortSpec, PortType } from '@/lib/graph';
import { portKey } from '../store/connecting';
import { useEditor, useKernelState } from '../store/editor-context';

/** The handle's form tells what travels: round for words, a diamond for flags, a square for indexes. */
const shapeClass: Record<PortType, string> = {
  word: 'port-word',
  flag: 'port-flag',
  index: 'port-index',
};

interface OperandHandleProps {
  op: OpId;
  port: PortSpec;
  position: HandleProps['position'];
  style: CSSProperties;
  /** Optional operands show only when they are used or a connection is on its way. */
  quiet?: boolean;
}

export function OperandHandle({ op, port, position, style, quiet = false }: OperandHandleProps) {
  const { store } = useEditor();
  const standing = useKernelState(({ connecting }) => {
    if (connecting === null) return 'idle';
    return connecting.answers.get(portKey(op, port.name))?.ok ? 'open' : 'refused';
  });
  const answer = () => store.getState().connecting?.answers.get(portKey(op, port.name));
  return (
    <Handle
      type="target"
      id={port.name}
      position={position}
      style={style}
      isConnectableStart={false}
      data-standing={standing}
      data-quiet={quiet || undefined}
      className={`port ${shapeClass[port.type]}`}
      title={`${port.label}: ${port.type}${port.required ? '' : ', optional'}`}
      onPointerEnter={() => {
        const found = answer();
        if (found !== undefined && !found.ok) store.getState().say(found.reason);
        else if (found?.needsDistance) {
          store.getState().say('This closes a loop: the value is carried to a later iteration.');
        }
      }}
      onClick={(event) => {
        const { connecting, connect } = store.getState();
        if (connecting?.by !== 'click') return;
        event.stopPropagation();
        connect({ from: connecting.from, to: op, port: port.name });
      }}
    />
  );
}

export function ResultHandle({
  op,
  type,
  position,
}: {
  op: OpId;
  type: 'word' | 'flag';
  position: HandleProps['position'];
}) {
  const { store } = useEditor();
  const from = useKernelState(({ connecting }) => connecting?.from === op);
  return (
    <Handle
      type="source"
      id="result"
      position={position}
      isConnectableEnd={false}
      data-standing={from ? 'from' : 'idle'}
      className={`port ${shapeClass[type]}`}
      title={`result: ${type}`}
      onClick={(event) => {
        event.stopPropagation();
        const { connecting, startConnecting, stopConnecting } = store.getState();
        if (connecting?.from === op) stopConnecting();
        else startConnecting(op, 'click');
      }}
    />
  );
}
