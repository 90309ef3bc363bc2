'use client';

import type { Connection, FinalConnectionState, OnConnectStart } from '@xyflow/react';
import { useMemo } from 'react';
import { type ConnectionRequest, opId } from '@/lib/graph';
import { portKey } from '../store/connecting';
import { useEditor } from '../store/editor-context';

const requestOf = (connection: {
  source: string;
  target: string;
  targetHandle?: string | null;
}): ConnectionRequest => ({
  from: opId(connection.source),
  to: opId(connection.target),
  port: connection.targetHandle ?? '',
});

/** Drawing a connection by dragging from a result to an operand. */
export function useCanvasConnections() {
  const { store } = useEditor();
  return useMemo(() => {
    const onConnectStart: OnConnectStart = (_event, { nodeId, handleType }) => {
      if (nodeId !== null && handleType === 'source') {
        store.getState().startConnecting(opId(nodeId), 'drag');
      }
    };
    return {
      onConnectStart,
      isValidConnection: (connection: Connection | { source: string; target: string }) => {
        const { to, port } = requestOf(connection);
        return store.getState().connecting?.answers.get(portKey(to, port))?.ok ?? false;
      },
      onConnect: (connection: Connection) => store.getState().connect(requestOf(connection)),
      onConnectEnd: (_event: unknown, end: FinalConnectionState) => {
        const { connecting, connect, stopConnecting } = store.getState();
        if (connecting?.by !== 'drag') return;
        // Let go over an operand that refuses: connecting says why.
        if (end.isValid === false && end.toHandle?.id && end.toHandle.type === 'target') {
          connect({
            from: connecting.from,
            to: opId(end.toHandle.nodeId),
            port: end.toHandle.id,
          });
        } else stopConnecting();
      },
    };
  }, [store]);
}
