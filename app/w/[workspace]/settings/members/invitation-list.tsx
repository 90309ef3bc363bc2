'use client';

import { useRouter } from 'next/navigation';
import { useAction } from '@/app/use-action';
import { Badge } from '@/components/ui/badge';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { useToast } from '@/components/ui/toast';
import type { Id } from '@/lib/ids';
import type { Role } from '@/lib/roles';
import { Moment } from '../moment';
import { inviteAgainAction, withdrawInvitationAction } from './actions';

interface InvitationRow {
  id: Id<'invitation'>;
  email: string;
  role: Role;
  invitedByName: string;
  /** ISO 8601. */
  expiresAt: string;
  expired: boolean;
}

interface InvitationListProps {
  workspaceSlug: string;
  invitations: readonly InvitationRow[];
}

export function InvitationList({ workspaceSlug, invitations }: InvitationListProps) {
  const again = useAction(inviteAgainAction);
  const withdraw = useAction(withdrawInvitationAction);
  const router = useRouter();
  const say = useToast();
  const refusal = again.refusal ?? withdraw.refusal;
  const done = (text: string) => {
    say(text);
    router.refresh();
  };
  return (
    <div className="space-y-3">
      {refusal ? (
        <Notice tone="broken" live>
          {refusal.message}
        </Notice>
      ) : null}
      <ul className="divide-y divide-rule rounded-md border border-rule bg-surface">
        {invitations.map((invitation) => {
          const input = { workspace: workspaceSlug, invitationId: invitation.id };
          return (
            <li key={invitation.id} className="flex flex-wrap items-center gap-x-4 gap-y-2 px-3 py-2 text-sm">
              <div className="min-w-40 flex-1">
                <p className="wrap-anywhere font-semibold">{invitation.email}</p>
                <p className="text-quiet">
                  as {invitation.role}, by {invitation.invitedByName};{' '}
                  {invitation.expired ? (
                    <Badge tone="warning">expired</Badge>
                  ) : (
                    <>
                      good until <Moment iso={invitation.expiresAt} />
                    </>
                  )}
                </p>
              </div>
              <Button
                busy={again.busy}
                aria-label={`Send the invitation to ${invitation.email} again`}
                onClick={() =>
                  again.run(input, () => done(`A new link is on its way to ${invitation.email}.`))
                }
              >
                Send again
              </Button>
              <Button
                look="danger"
                busy={withdraw.busy}
                aria-label={`Withdraw the invitation to ${invitation.email}`}
                onClick={() =>
                  withdraw.run(input, () => done(`The invitation to ${invitation.email} is withdrawn.`))
                }
              >
                Withdraw
              </Button>
            </li>
          );
        })}
      </ul>
    </div>
  );
}
