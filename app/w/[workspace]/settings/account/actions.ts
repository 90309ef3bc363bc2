'use server';

import { cookies } from 'next/headers';
import { z } from 'zod';
import { changePassword } from '@/app/_server/accounts/change-password';
import { passwordInput, personNameInput } from '@/app/_server/accounts/inputs';
import { accountContext } from '@/app/_server/accounts/request-context';
import { defineAction } from '@/app/_server/define-action';
import { notFound } from '@/app/_server/errors';
import { secureCookies } from '@/app/_server/settings';
import { THEME_COOKIE, themes } from '@/components/shell/theme';
import { database } from '@/db/client';
import { renameAccount } from '@/db/queries/accounts';
import { endSessionOf, endSessionsOf } from '@/db/queries/sessions';
import { err, ok } from '@/lib/result';

export const renameAccountAction = defineAction({
  name: 'account.rename',
  access: 'signed in',
  input: z.object({ name: personNameInput }),
  async run({ user, input }) {
    await renameAccount(database(), { userId: user.id, name: input.name });
    return ok(null);
  },
});

export const changePasswordAction = defineAction({
  name: 'account.changePassword',
  access: 'signed in',
  input: z.object({ current: passwordInput, password: passwordInput, endOthers: z.boolean() }),
  run: async ({ user, session, input }) => changePassword(await accountContext(), { user, session }, input),
});

export const endSessionAction = defineAction({
  name: 'account.endSession',
  access: 'signed in',
  input: z.object({ sessionId: z.string().regex(/^[0-9a-f]{64}$/) }),
  async run({ user, input }) {
    const ended = await endSessionOf(database(), { userId: user.id, id: input.sessionId });
    return ended ? ok(null) : err(notFound('session'));
  },
});

export const endOtherSessionsAction = defineAction({
  name: 'account.endOtherSessions',
  access: 'signed in',
  input: z.object({}),
  async run({ user, session }) {
    return ok({ ended: await endSessionsOf(database(), { userId: user.id, keepId: session.id }) });
  },
});

const YEAR_SECONDS = 31_536_000;

/** Of this browser, not of the account: a bright office and a dark train want different themes. */
export const chooseThemeAction = defineAction({
  name: 'account.chooseTheme',
  access: 'signed in',
  input: z.object({ theme: z.enum(themes) }),
  async run({ input }) {
    const attributes = { path: '/', sameSite: 'lax', httpOnly: true, secure: secureCookies() } as const;
    (await cookies()).set(THEME_COOKIE, input.theme, { ...attributes, maxAge: YEAR_SECONDS });
    return ok(null);
  },
});
