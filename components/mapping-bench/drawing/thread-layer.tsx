import { memo } from 'react';
import type { OpId } from '@/lib/graph/kernel';
import { threadPath } from '@/lib/mapping/picture/thread-path';
import { threadStyle } from '@/lib/mapping/picture/thread-style';
import type { Thread } from '@/lib/mapping/picture/threads';

interface ThreadLayerProps {
  threads: readonly Thread[];
  /** Sources of the nets that stand out; null: all alike. */
  lit: ReadonlySet<OpId> | null;
}

/** The threads in their channels, a knot on each hop. What is not lit steps back. */
export function ThreadLayer({ threads, lit }: ThreadLayerProps) {
  return (
    <g>
      {threads.map((thread) => (
        <ThreadLine
          key={thread.source}
          thread={thread}
          strength={lit === null ? 'plain' : lit.has(thread.source) ? 'strong' : 'faint'}
        />
      ))}
    </g>
  );
}

interface ThreadLineProps {
  thread: Thread;
  strength: 'plain' | 'strong' | 'faint';
}

const ThreadLine = memo(function ThreadLine({ thread, strength }: ThreadLineProps) {
  const { colour, dashes } = threadStyle(thread.net);
  const stroke = `var(--thread-${colour})`;
  const width = strength === 'strong' ? 3 : 2.2;
  return (
    <g opacity={strength === 'faint' ? 0.22 : 1}>
      <path
        d={thread.chains.map(threadPath).join('')}
        fill="none"
        stroke={stroke}
        strokeWidth={width}
        strokeDasharray={dashes.join(' ') || undefined}
        strokeLinejoin="round"
      />
      {thread.knots.map((knot, i) => (
        <circle key={i} cx={knot.x} cy={knot.y} r={strength === 'strong' ? 3.4 : 2.7} fill={stroke} />
      ))}
      {thread.wrapEnds.map((end, i) => (
        <circle
          key={`wrap ${i}`}
          cx={end.x}
          cy={end.y}
          r={3}
          fill="var(--surface)"
          stroke={stroke}
          strokeWidth={1.6}
        />
      ))}
    </g>
  );
});
