'use client';

import { useRouter } from 'next/navigation';
import { useEffect, useState } from 'react';
import { useSWRConfig } from 'swr';
import { TopBar } from '@/components/shell/top-bar';
import { Button, buttonClass } from '@/components/ui/button';
import { Menu } from '@/components/ui/menu';
import type { Kernel } from '@/lib/graph';
import { EditorSurface } from './editor-surface';
import type { SaveAnswer } from './save/autosave';
import { SavingNotices } from './save/conflict-notice';
import { newestDraft, type SavedDraft } from './save/newest-draft';
import { SaveStatus } from './save/save-status';
import { type Autosave, useAutosave } from './save/use-autosave';
import { type EditorCalls, exportApi, type KernelPlaces, versionsApi } from './server-calls';
import { EditorProvider, useEditor, useKernelState } from './store/editor-context';
import { KeepVersionDialog } from './versions/keep-version-dialog';
import { VersionsDialog } from './versions/versions-dialog';

export interface KernelEditorProps {
  places: KernelPlaces;
  document: Kernel;
  revision: number;
  savedAt: string;
  /** Why the kernel may only be read; null where it may be changed. */
  readOnlyReason: string | null;
  calls: EditorCalls;
}

/** The screen on which a kernel is drawn. */
export function KernelEditor({ document, revision, savedAt, ...rest }: KernelEditorProps) {
  const [draft] = useState(() =>
    newestDraft(rest.places.kernelId, { kernel: document, revision, savedAtMs: Date.parse(savedAt) }),
  );
  return (
    <EditorProvider kernel={draft.kernel} readOnly={rest.readOnlyReason !== null}>
      <EditorScreen {...rest} draft={draft} />
    </EditorProvider>
  );
}

type EditorScreenProps = Pick<KernelEditorProps, 'places' | 'readOnlyReason' | 'calls'> & {
  draft: SavedDraft;
};

function EditorScreen({ places, draft, readOnlyReason, calls }: EditorScreenProps) {
  const name = useKernelState((state) => state.kernel.name);
  const { mutate } = useSWRConfig();
  const autosave = useAutosave({
    kernelId: places.kernelId,
    revision: draft.revision,
    savedAtMs: draft.savedAtMs,
    readOnly: readOnlyReason !== null,
    send: (document, baseRevision) =>
      calls.save({ ...places, revision: baseRevision, document }).then(answerOf),
  });
  return (
    <EditorSurface
      top={
        <TopBar
          path={[{ label: 'Kernels', href: `/w/${places.workspace}/kernels` }, { label: name }]}
          status={
            readOnlyReason ?? (
              <SaveStatus
                state={autosave.state}
                onRetry={() => autosave.runner?.dispatch({ type: 'retry' })}
              />
            )
          }
          actions={<EditorActions {...{ places, autosave }} readOnly={readOnlyReason !== null} />}
        />
      }
      notices={<SavingNotices {...{ places, autosave }} create={calls.create} />}
      dialogs={
        <>
          <KeepVersionDialog
            places={places}
            save={autosave.state}
            keepVersion={calls.keepVersion}
            onKept={() => void mutate(versionsApi(places))}
          />
          <VersionsDialog places={places} create={calls.create} />
        </>
      }
    />
  );
}

function answerOf(result: Awaited<ReturnType<EditorCalls['save']>>): SaveAnswer {
  if (!result.ok) {
    const { code, message } = result.error;
    const passing = code === 'unavailable' || code === 'internal' || code === 'rate_limited';
    return passing ? { type: 'unreachable', reason: message } : { type: 'refused', reason: message };
  }
  const answer = result.value;
  if (answer.outcome === 'saved') {
    return { type: 'saved', revision: answer.revision, atMs: Date.parse(answer.savedAt) };
  }
  const { revision, document, changedByName } = answer;
  return { type: 'conflict', theirs: { revision, kernel: document, changedBy: changedByName } };
}

interface EditorActionsProps {
  places: KernelPlaces;
  autosave: Autosave;
  readOnly: boolean;
}

function EditorActions({ places, autosave, readOnly }: EditorActionsProps) {
  const { store } = useEditor();
  return (
    <>
      <Menu
        label="File"
        items={[
          { id: 'json', label: 'Export as JSON', href: exportApi(places, 'json') },
          { id: 'dot', label: 'Export as DOT', href: exportApi(places, 'dot') },
          { id: 'versions', label: 'Versions…', onSelect: () => store.getState().openDialog('versions') },
        ]}
      />
      {readOnly ? null : (
        <>
          <button
            type="button"
            className={buttonClass('secondary', 'hover:bg-indigo-wash')}
            onClick={() => store.getState().openDialog('keepVersion')}
          >
            Keep version
          </button>
          <PlaceButton {...{ places, autosave }} />
        </>
      )}
    </>
  );
}

/** Goes to choosing a fabric once the draft is saved: what is placed is what is on the screen. */
function PlaceButton({ places, autosave: { state, runner } }: Omit<EditorActionsProps, 'readOnly'>) {
  const router = useRouter();
  const { store } = useEditor();
  const [leaving, setLeaving] = useState(false);
  const { phase } = state;
  useEffect(() => {
    if (!leaving) return;
    if (phase === 'waiting') runner?.dispatch({ type: 'due' });
    else if (phase === 'clean') router.push(`/w/${places.workspace}/mappings/new?kernel=${places.kernelId}`);
    else if (phase !== 'saving') {
      setLeaving(false);
      store.getState().say('The draft is not saved yet: it can be placed as soon as it is.');
    }
  }, [leaving, phase, runner, router, places, store]);
  return (
    <Button look="primary" busy={leaving} onClick={() => setLeaving(true)}>
      Place on a fabric
    </Button>
  );
}
