'use server';

import { z } from 'zod';
import { emailInput, passwordInput } from '@/app/_server/accounts/inputs';
import { accountContext } from '@/app/_server/accounts/request-context';
import { checkSignIn } from '@/app/_server/accounts/sign-in';
import { defineAction } from '@/app/_server/define-action';
import { signInAs, signOut } from '@/app/_server/session';
import { ok } from '@/lib/result';
import { nextPath } from '../next-path';

export const signInAction = defineAction({
  name: 'account.signIn',
  access: 'public',
  input: z.object({ email: emailInput, password: passwordInput, next: z.string().max(500).optional() }),
  async run({ input }) {
    const checked = await checkSignIn(await accountContext(), input);
    if (!checked.ok) return checked;
    await signInAs(checked.value.userId);
    return ok({ to: nextPath(input.next) });
  },
});

export const signOutAction = defineAction({
  name: 'account.signOut',
  access: 'public',
  input: z.object({}),
  async run() {
    await signOut();
    return ok({ to: '/sign-in' });
  },
});
