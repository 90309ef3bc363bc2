'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useAction } from '@/app/use-action';
import { Badge } from '@/components/ui/badge';
import { Button } from '@/components/ui/button';
import { ConfirmDialog } from '@/components/ui/dialog';
import { SelectField } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import { useToast } from '@/components/ui/toast';
import type { Id } from '@/lib/ids';
import { type Role, roles } from '@/lib/roles';
import { removeMemberAction, setRoleAction } from './actions';

interface MemberRow {
  userId: Id<'user'>;
  name: string;
  email: string;
  role: Role;
  isYou: boolean;
}

interface MemberListProps {
  workspaceSlug: string;
  members: readonly MemberRow[];
  manages: boolean;
}

export function MemberList({ workspaceSlug, members, manages }: MemberListProps) {
  const setRole = useAction(setRoleAction);
  const remove = useAction(removeMemberAction);
  const [removing, setRemoving] = useState<MemberRow | null>(null);
  const router = useRouter();
  const say = useToast();
  const refusal = setRole.refusal ?? remove.refusal;

  const changeRole = (member: MemberRow, role: Role) =>
    setRole.run({ workspace: workspaceSlug, userId: member.userId, role }, () => {
      say(`${member.name} is ${role} now.`);
      router.refresh();
    });
  const removeNow = (member: MemberRow) =>
    remove.run({ workspace: workspaceSlug, userId: member.userId }, () => {
      setRemoving(null);
      say(`${member.name} is no member any more.`);
      router.refresh();
    });

  return (
    <div className="space-y-3">
      {refusal ? (
        <Notice tone="broken" live>
          {refusal.message}
        </Notice>
      ) : null}
      <ul className="divide-y divide-rule rounded-md border border-rule bg-surface">
        {members.map((member) => (
          <li key={member.userId} className="flex flex-wrap items-center gap-x-4 gap-y-2 px-3 py-2 text-sm">
            <div className="min-w-40 flex-1">
              <p className="font-semibold">
                {member.name} {member.isYou ? <Badge>you</Badge> : null}
              </p>
              <p className="wrap-anywhere text-quiet">{member.email}</p>
            </div>
            {manages ? (
              <>
                <SelectField
                  label={`Role of ${member.name}`}
                  labelHidden
                  // A refused change shows the stored role again.
                  value={member.role}
                  disabled={setRole.busy}
                  choices={roles.map((role) => ({ value: role, label: role }))}
                  onChange={(event) => {
                    const role = roles.find((one) => one === event.target.value);
                    if (role) changeRole(member, role);
                  }}
                />
                {member.isYou ? null : (
                  <Button
                    look="danger"
                    aria-label={`Remove ${member.name}`}
                    onClick={() => setRemoving(member)}
                  >
                    Remove
                  </Button>
                )}
              </>
            ) : (
              <span>{member.role}</span>
            )}
          </li>
        ))}
      </ul>
      <ConfirmDialog
        open={removing !== null}
        title={`Remove ${removing?.name ?? ''}?`}
        confirmLabel="Remove the member"
        busy={remove.busy}
        onClose={() => setRemoving(null)}
        onConfirm={() => removing && removeNow(removing)}
      >
        Access ends at once. What this member made stays in the workspace.
      </ConfirmDialog>
    </div>
  );
}
