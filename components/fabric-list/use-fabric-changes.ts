'use client';

import { useToast } from '@/components/ui/toast';
import type { Id } from '@/lib/ids';
import { type FabricCommands, UNREACHABLE_SERVER } from './fabric-commands';

interface FabricChanges {
  workspace: string;
  commands: Pick<FabricCommands, 'archive' | 'duplicate'>;
  /** The page reads its data again. */
  onChanged: () => void;
}

interface NamedFabric {
  id: Id<'fabric'>;
  name: string;
}

/** Archiving, restoring and copying, each told in a toast; archiving can be undone there. */
export function useFabricChanges({ workspace, commands, onChanged }: FabricChanges) {
  const say = useToast();
  const setArchived = async (fabric: NamedFabric, archived: boolean, undoing = false): Promise<boolean> => {
    const answer = await commands.archive({ workspace, fabricId: fabric.id, archived }).catch(() => null);
    if (!answer?.ok) {
      say(answer?.error.message ?? UNREACHABLE_SERVER, { tone: 'broken' });
      return false;
    }
    const undo = { label: 'Undo', run: () => void setArchived(fabric, !archived, true) };
    say(`${fabric.name} is ${archived ? 'archived' : 'back in use'}.`, undoing ? {} : { action: undo });
    onChanged();
    return true;
  };
  /** The copy's id, or null when it was refused. */
  const duplicate = async (fabric: NamedFabric): Promise<Id<'fabric'> | null> => {
    const answer = await commands.duplicate({ workspace, fabricId: fabric.id }).catch(() => null);
    if (answer?.ok) {
      say(`${fabric.name} was copied.`);
      return answer.value.fabricId;
    }
    say(answer?.error.message ?? UNREACHABLE_SERVER, { tone: 'broken' });
    return null;
  };
  return { setArchived, duplicate };
}
