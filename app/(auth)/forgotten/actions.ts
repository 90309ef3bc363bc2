'use server';

import { z } from 'zod';
import { emailInput, passwordInput, tokenInput } from '@/app/_server/accounts/inputs';
import { accountContext } from '@/app/_server/accounts/request-context';
import { completeReset, requestReset } from '@/app/_server/accounts/reset';
import { defineAction } from '@/app/_server/define-action';
import { signInAs } from '@/app/_server/session';
import { ok } from '@/lib/result';

export const requestResetAction = defineAction({
  name: 'account.requestReset',
  access: 'public',
  input: z.object({ email: emailInput }),
  run: async ({ input }) => requestReset(await accountContext(), input),
});

export const completeResetAction = defineAction({
  name: 'account.completeReset',
  access: 'public',
  input: z.object({ token: tokenInput, password: passwordInput }),
  async run({ input }) {
    const done = await completeReset(await accountContext(), input);
    if (!done.ok) return done;
    await signInAs(done.value.userId);
    return ok({ to: '/' });
  },
});
