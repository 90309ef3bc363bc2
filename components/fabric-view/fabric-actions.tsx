'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { Button, ButtonLink } from '@/components/ui/button';
import { Menu, type MenuItem } from '@/components/ui/menu';
import { FABRIC_LIMITS } from '@/lib/fabric/fabric';
import type { Id } from '@/lib/ids';
import type { FabricCommands } from '../fabric-list/fabric-commands';
import { useFabricChanges } from '../fabric-list/use-fabric-changes';
import { AskTextDialog } from './ask-text-dialog';

export type PageCommands = Pick<FabricCommands, 'archive' | 'duplicate' | 'rename' | 'keepVersion'>;

interface FabricActionsProps {
  workspace: string;
  fabric: { id: Id<'fabric'>; name: string; revision: number; archived: boolean };
  /** Left out for those who may only look. */
  commands?: PageCommands;
}

/** What can be done with a fabric, the main thing last: place a kernel on it. */
export function FabricActions({ workspace, fabric, commands }: FabricActionsProps) {
  const exportHref = `/api/w/${workspace}/fabrics/${fabric.id}/export`;
  if (!commands) {
    return (
      <ButtonLink href={exportHref} download>
        Export JSON
      </ButtonLink>
    );
  }
  return <EditorActions {...{ workspace, fabric, commands, exportHref }} />;
}

type EditorActionsProps = Required<FabricActionsProps> & { exportHref: string };

function EditorActions({ workspace, fabric, commands, exportHref }: EditorActionsProps) {
  const router = useRouter();
  const [asking, setAsking] = useState<'name' | 'version' | null>(null);
  const [busy, setBusy] = useState(false);
  const changes = useFabricChanges({ workspace, commands, onChanged: () => router.refresh() });
  const of = { workspace, fabricId: fabric.id };
  const duplicate = async () => {
    const copy = await changes.duplicate(fabric);
    if (copy) router.push(`/w/${workspace}/fabrics/${copy}`);
  };
  const restore = async () => {
    setBusy(true);
    await changes.setArchived(fabric, false);
    setBusy(false);
  };
  const items: MenuItem[] = [
    ...(fabric.archived
      ? []
      : [{ id: 'rename', label: 'Rename…', onSelect: () => setAsking('name') } satisfies MenuItem]),
    { id: 'duplicate', label: 'Duplicate', onSelect: () => void duplicate() },
    { id: 'export', label: 'Export JSON', href: exportHref },
    ...(fabric.archived
      ? []
      : [
          {
            id: 'archive',
            label: 'Archive',
            onSelect: () => void changes.setArchived(fabric, true),
          } satisfies MenuItem,
        ]),
  ];
  return (
    <>
      <Menu label="More ▾" ariaLabel="More" items={items} />
      {fabric.archived ? (
        <Button look="primary" busy={busy} onClick={() => void restore()}>
          Restore
        </Button>
      ) : (
        <>
          <Button onClick={() => setAsking('version')}>Keep version</Button>
          <ButtonLink href={`/w/${workspace}/mappings/new?fabric=${fabric.id}`} look="primary">
            Place a kernel here
          </ButtonLink>
        </>
      )}
      <AskTextDialog
        open={asking === 'name'}
        title="Rename the fabric"
        label="Name"
        initial={fabric.name}
        maxLength={FABRIC_LIMITS.nameLength}
        required
        confirmLabel="Rename"
        onClose={() => setAsking(null)}
        onConfirm={async (name) => {
          const answer = await commands.rename({ ...of, name });
          return answer.ok ? { ok: true, said: `Renamed to ${name}.` } : { ok: false, error: answer.error };
        }}
        onDone={() => router.refresh()}
      />
      <AskTextDialog
        open={asking === 'version'}
        title="Keep this state as a version"
        label="Note (optional)"
        hint="A version never changes; mappings stand on versions."
        initial=""
        maxLength={80}
        confirmLabel="Keep version"
        onClose={() => setAsking(null)}
        onConfirm={async (label) => {
          const answer = await commands.keepVersion({ ...of, revision: fabric.revision, label });
          if (!answer.ok) return { ok: false, error: answer.error };
          const { number, created } = answer.value;
          return {
            ok: true,
            said: created ? `Kept as version ${number}.` : `Version ${number} holds this state already.`,
          };
        }}
        onDone={() => router.refresh()}
      />
    </>
  );
}
