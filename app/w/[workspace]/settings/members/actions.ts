'use server';

import { z } from 'zod';
import { emailInput, roleInput } from '@/app/_server/accounts/inputs';
import { invite, inviteAgain, withdrawInvitation } from '@/app/_server/accounts/invite';
import { endMembership, setMemberRole } from '@/app/_server/accounts/manage-members';
import { accountContext } from '@/app/_server/accounts/request-context';
import { defineAction } from '@/app/_server/define-action';
import { database } from '@/db/client';
import { idSchema } from '@/lib/ids';

const workspace = z.string().max(60);

export const inviteAction = defineAction({
  name: 'invitation.create',
  access: { role: 'owner' },
  input: z.object({ workspace, email: emailInput, role: roleInput }),
  run: async ({ input, ...by }) =>
    invite(await accountContext(), by, { email: input.email, role: input.role }),
});

export const inviteAgainAction = defineAction({
  name: 'invitation.sendAgain',
  access: { role: 'owner' },
  input: z.object({ workspace, invitationId: idSchema('invitation') }),
  run: async ({ input, ...by }) => inviteAgain(await accountContext(), by, input),
});

export const withdrawInvitationAction = defineAction({
  name: 'invitation.withdraw',
  access: { role: 'owner' },
  input: z.object({ workspace, invitationId: idSchema('invitation') }),
  run: async ({ input, ...by }) => withdrawInvitation(await accountContext(), by, input),
});

export const setRoleAction = defineAction({
  name: 'member.setRole',
  access: { role: 'owner' },
  input: z.object({ workspace, userId: idSchema('user'), role: roleInput }),
  run: ({ input, ...by }) => setMemberRole(database(), by, { userId: input.userId, role: input.role }),
});

export const removeMemberAction = defineAction({
  name: 'member.remove',
  access: { role: 'owner' },
  input: z.object({ workspace, userId: idSchema('user') }),
  run: ({ input, ...by }) => endMembership(database(), by, { userId: input.userId }),
});

export const leaveAction = defineAction({
  name: 'member.leave',
  access: { role: 'viewer' },
  input: z.object({ workspace }),
  run: (by) => endMembership(database(), by, { userId: by.user.id }),
});
