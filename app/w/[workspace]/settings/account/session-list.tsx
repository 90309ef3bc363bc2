'use client';

import { useRouter } from 'next/navigation';
import { useAction } from '@/app/use-action';
import { Badge } from '@/components/ui/badge';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { Moment } from '../moment';
import { endOtherSessionsAction, endSessionAction } from './actions';

interface SessionRow {
  id: string;
  browser: string;
  network: string;
  /** ISO 8601, as is the next. */
  since: string;
  lastSeen: string;
  isThis: boolean;
}

export function SessionList({ sessions }: { sessions: readonly SessionRow[] }) {
  const one = useAction(endSessionAction);
  const others = useAction(endOtherSessionsAction);
  const router = useRouter();
  const refusal = one.refusal ?? others.refusal;
  return (
    <div className="space-y-3">
      {refusal ? (
        <Notice tone="broken" live>
          {refusal.message}
        </Notice>
      ) : null}
      <ul className="divide-y divide-rule rounded-md border border-rule bg-surface">
        {sessions.map((session) => (
          <li key={session.id} className="flex flex-wrap items-center gap-x-4 gap-y-1 px-3 py-2 text-sm">
            <div className="min-w-0 flex-1">
              <p className="font-semibold">
                {session.browser} {session.isThis ? <Badge tone="active">this one</Badge> : null}
              </p>
              <p className="text-quiet">
                Network {session.network}; signed in <Moment iso={session.since} />, last used{' '}
                <Moment iso={session.lastSeen} />
              </p>
            </div>
            {session.isThis ? null : (
              <Button
                look="danger"
                busy={one.busy}
                aria-label={`End the session in ${session.browser}, network ${session.network}`}
                onClick={() => one.run({ sessionId: session.id }, () => router.refresh())}
              >
                End
              </Button>
            )}
          </li>
        ))}
      </ul>
      {sessions.length > 1 ? (
        <Button busy={others.busy} onClick={() => others.run({}, () => router.refresh())}>
          End all other sessions
        </Button>
      ) : null}
    </div>
  );
}
