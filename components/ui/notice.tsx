import type { ReactNode } from 'react';

export type NoticeTone = 'plain' | 'proven' | 'warning' | 'broken';

const tones: Record<NoticeTone, string> = {
  plain: 'border-rule bg-surface',
  proven: 'border-verdigris! bg-verdigris-wash text-verdigris',
  warning: 'border-weld! bg-weld text-on-weld',
  broken: 'border-madder! bg-madder-wash text-madder',
};

interface NoticeProps {
  tone?: NoticeTone;
  children: ReactNode;
  /** Read out as soon as it appears. */
  live?: boolean;
  className?: string;
}

export function Notice({ tone = 'plain', children, live, className = '' }: NoticeProps) {
  return (
    <div
      role={live ? (tone === 'broken' ? 'alert' : 'status') : undefined}
      className={`rounded border px-3 py-2 text-sm ${tones[tone]} ${className}`}
    >
      {children}
    </div>
  );
}

/** What a list shows when there is nothing in it: what belongs here and the way to the first one. */
export function EmptyState({
  title,
  children,
  action,
}: {
  title: string;
  children: ReactNode;
  action?: ReactNode;
}) {
  return (
    <div className="mx-auto my-12 max-w-md rounded-md border border-dashed border-edge! px-6 py-8 text-center">
      <h2 className="mb-1 text-lg font-semibold">{title}</h2>
      <div className="mb-4 text-sm text-quiet">{children}</div>
      {action}
    </div>
  );
}
