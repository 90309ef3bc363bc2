'use server';

import { z } from 'zod';
import {
  emailInput,
  passwordInput,
  personNameInput,
  tokenInput,
  workspaceNameInput,
} from '@/app/_server/accounts/inputs';
import { accountContext } from '@/app/_server/accounts/request-context';
import { completeSignUp, requestSignUp } from '@/app/_server/accounts/sign-up';
import { defineAction } from '@/app/_server/define-action';
import { signInAs } from '@/app/_server/session';
import { ok } from '@/lib/result';

export const requestSignUpAction = defineAction({
  name: 'account.requestSignUp',
  access: 'public',
  input: z.object({ email: emailInput }),
  run: async ({ input }) => requestSignUp(await accountContext(), input),
});

export const completeSignUpAction = defineAction({
  name: 'account.completeSignUp',
  access: 'public',
  input: z.object({
    token: tokenInput,
    name: personNameInput,
    workspaceName: workspaceNameInput,
    password: passwordInput,
  }),
  async run({ input }) {
    const made = await completeSignUp(await accountContext(), input);
    if (!made.ok) return made;
    await signInAs(made.value.userId);
    return ok({ to: `/w/${made.value.workspaceSlug}` });
  },
});
