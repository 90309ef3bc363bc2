'use server';

import { z } from 'zod';
import { workspaceNameInput } from '@/app/_server/accounts/inputs';
import { makeWorkspace } from '@/app/_server/accounts/make-workspace';
import { accountContext } from '@/app/_server/accounts/request-context';
import { defineAction } from '@/app/_server/define-action';
import { ok } from '@/lib/result';

export const makeWorkspaceAction = defineAction({
  name: 'workspace.create',
  access: 'signed in',
  input: z.object({ name: workspaceNameInput }),
  async run({ user, input }) {
    const made = await makeWorkspace(await accountContext(), { user }, input);
    return made.ok ? ok({ to: `/w/${made.value.slug}` }) : made;
  },
});
