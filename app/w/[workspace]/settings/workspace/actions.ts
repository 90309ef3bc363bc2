'use server';

import { z } from 'zod';
import { workspaceNameInput } from '@/app/_server/accounts/inputs';
import { setWorkspaceName } from '@/app/_server/accounts/manage-members';
import { defineAction } from '@/app/_server/define-action';
import { database } from '@/db/client';

export const renameWorkspaceAction = defineAction({
  name: 'workspace.rename',
  access: { role: 'owner' },
  input: z.object({ workspace: z.string().max(60), name: workspaceNameInput }),
  run: ({ input, ...by }) => setWorkspaceName(database(), by, { name: input.name }),
});
