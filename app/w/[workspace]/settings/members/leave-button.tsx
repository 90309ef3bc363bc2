'use client';

import { useState } from 'react';
import { useAction } from '@/app/use-action';
import { Button } from '@/components/ui/button';
import { ConfirmDialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import { leaveAction } from './actions';

export function LeaveButton({
  workspaceSlug,
  workspaceName,
}: {
  workspaceSlug: string;
  workspaceName: string;
}) {
  const { run, busy, refusal } = useAction(leaveAction);
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button look="quiet" onClick={() => setOpen(true)}>
        Leave the workspace
      </Button>
      <ConfirmDialog
        open={open}
        title={`Leave ${workspaceName}?`}
        confirmLabel="Leave"
        busy={busy}
        onClose={() => setOpen(false)}
        onConfirm={() => run({ workspace: workspaceSlug }, () => window.location.assign('/'))}
      >
        What you made stays here. To come back, an owner has to invite you.
        {refusal ? (
          <Notice tone="broken" live className="mt-3">
            {refusal.message}
          </Notice>
        ) : null}
      </ConfirmDialog>
    </>
  );
}
