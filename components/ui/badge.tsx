import type { ReactNode } from 'react';

export type BadgeTone = 'plain' | 'proven' | 'warning' | 'broken' | 'active';

const tones: Record<BadgeTone, string> = {
  plain: 'border-edge! text-quiet',
  proven: 'border-verdigris! bg-verdigris-wash text-verdigris',
  warning: 'border-weld! bg-weld text-on-weld',
  broken: 'border-madder! bg-madder-wash text-madder',
  active: 'border-indigo! bg-indigo-wash text-indigo',
};

/** A state in one or two words; the word carries the meaning, the tint only helps. */
export function Badge({ tone = 'plain', children }: { tone?: BadgeTone; children: ReactNode }) {
  return (
    <span
      className={`inline-flex items-center rounded border px-1.5 text-xs font-semibold whitespace-nowrap ${tones[tone]}`}
    >
      {children}
    </span>
  );
}
