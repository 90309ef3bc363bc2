'use server';

import { z } from 'zod';
import { passwordInput, personNameInput, tokenInput } from '@/app/_server/accounts/inputs';
import { acceptAs, acceptAsNew } from '@/app/_server/accounts/invite';
import { accountContext } from '@/app/_server/accounts/request-context';
import { defineAction } from '@/app/_server/define-action';
import { signInAs } from '@/app/_server/session';
import { ok } from '@/lib/result';

export const acceptAction = defineAction({
  name: 'invitation.accept',
  access: 'signed in',
  input: z.object({ token: tokenInput }),
  async run({ user, input }) {
    const joined = await acceptAs(await accountContext(), { user }, input);
    return joined.ok ? ok({ to: `/w/${joined.value.workspaceSlug}` }) : joined;
  },
});

export const acceptAsNewAction = defineAction({
  name: 'invitation.acceptAsNew',
  access: 'public',
  input: z.object({ token: tokenInput, name: personNameInput, password: passwordInput }),
  async run({ input }) {
    const joined = await acceptAsNew(await accountContext(), input);
    if (!joined.ok) return joined;
    await signInAs(joined.value.userId);
    return ok({ to: `/w/${joined.value.workspaceSlug}` });
  },
});
