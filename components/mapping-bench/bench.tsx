'use client';

import { useRouter } from 'next/navigation';
import { type KeyboardEvent, useMemo, useState } from 'react';
import { TopBar } from '@/components/shell/top-bar';
import { Button, IconButton } from '@/components/ui/button';
import { Menu } from '@/components/ui/menu';
import { useToast } from '@/components/ui/toast';
import type { Fabric } from '@/lib/fabric/fabric';
import { fabricFileName, kernelFileName, mappingFileName } from '@/lib/formats/file-names';
import type { Kernel } from '@/lib/graph/kernel';
import { shortName } from '@/lib/mapping/picture/op-label';
import type { BenchCalls } from './bench-calls';
import { BenchPanes } from './bench-panes';
import { NameDialog } from './keep-dialog';
import { type BenchView, countedIn, previewView } from './panes/bench-view';
import { contentOf, documentOf } from './save/save-machine';
import { SaveBanner, SaveStatus } from './save/save-status';
import { useBenchSave } from './save/use-bench-save';
import { isLive } from './solve/solve-state';
import { type BenchAsk, useBenchAsk } from './solve/use-bench-ask';
import { type BenchSolve, useBenchSolve } from './solve/use-bench-solve';
import type { BenchContent } from './store/bench-content';
import { BenchProvider, useBench, useBenchStore } from './store/bench-context';
import { createBenchStore } from './store/bench-store';

export interface BenchProps {
  workspace: string;
  draftId: `draft_${string}`;
  name: string;
  revision: number;
  content: BenchContent;
  kernel: { name: string; version: number; document: Kernel };
  fabric: { name: string; version: number; document: Fabric };
  /** The last solve for the best mapping, and the last of other questions where none was asked for since. */
  solveId: string | null;
  askedSolveId: string | null;
  readOnly: boolean;
  calls: BenchCalls;
}

/** The mapping bench: kernel on the left, fabric on the right, tied together. */
export function Bench(props: BenchProps) {
  const [store] = useState(() =>
    createBenchStore({
      kernel: props.kernel.document,
      fabric: props.fabric.document,
      content: props.content,
      readOnly: props.readOnly,
    }),
  );
  return (
    <BenchProvider store={store}>
      <BenchScreen {...props} />
    </BenchProvider>
  );
}

function BenchScreen(props: BenchProps) {
  const { workspace, draftId, calls, readOnly } = props;
  const store = useBenchStore();
  const router = useRouter();
  const say = useToast();
  const fail = (message: string) => say(message, { tone: 'broken' });
  const [name, setName] = useState(props.name);
  const [dialog, setDialog] = useState<'keep' | 'rename' | null>(null);
  const content = useBench((state) => state.content);
  const facts = useBench((state) => state.facts);
  const save = useBenchSave(store, {
    draftId,
    readOnly,
    revision: props.revision,
    send: async (now, revision) => {
      const answer = await calls.saveBench({
        workspace,
        draftId,
        revision,
        document: documentOf(now),
        provenance: now.provenance,
      });
      if (!answer.ok) {
        return answer.error.code === 'internal' || answer.error.code === 'unavailable'
          ? { type: 'unreachable' }
          : { type: 'refused', reason: answer.error.message };
      }
      if (answer.value.type === 'saved') return answer.value;
      const { document, provenance, ...theirs } = answer.value.theirs;
      return { type: 'conflict', theirs: { ...theirs, content: contentOf(document, provenance) } };
    },
  });
  const job = { workspace, draftId, calls, onError: fail };
  const solving = useBenchSolve(store, {
    ...job,
    firstSolveId: props.solveId,
    onOther: (id) => asking.adopt(id),
  });
  const asking = useBenchAsk(store, {
    ...job,
    firstSolveId: props.askedSolveId,
    onOther: (id) => solving.adopt(id),
    settings: solving.settings,
  });
  const shown = usePreview(solving, asking);
  const keepBoth = async () => {
    const now = store.getState().content;
    const answer = await calls.saveBenchAsNew({
      workspace,
      draftId,
      name: `${name.slice(0, 70)}, mine`,
      document: documentOf(now),
      provenance: now.provenance,
    });
    if (!answer.ok) return fail(answer.error.message);
    save.takeTheirs();
    router.push(`/w/${workspace}/mappings/bench/${answer.value.draftId}`);
  };
  const keep = async (wanted: string): Promise<string | null> => {
    if (!(await save.flush())) return 'The bench is not saved yet. See the note at the top, then try again.';
    const answer = await calls.keepAsMapping({ workspace, draftId, name: wanted, revision: save.revision() });
    if (!answer.ok) return answer.error.message;
    router.push(`/w/${workspace}/mappings/${answer.value.mappingId}`);
    return null;
  };
  const rename = async (wanted: string): Promise<string | null> => {
    const answer = await calls.renameBench({ workspace, draftId, name: wanted });
    if (!answer.ok) return answer.error.message;
    setName(answer.value.name);
    setDialog(null);
    return null;
  };
  return (
    <section aria-label="Bench" className="flex flex-col lg:h-full" onKeyDown={undoKeys(store)}>
      <TopBar
        path={[{ label: 'Mappings', href: `/w/${workspace}/mappings` }, { label: name }]}
        status={
          <>
            draft · <SaveStatus save={save} readOnly={readOnly} />
          </>
        }
        actions={
          readOnly ? null : (
            <>
              <HistoryButtons />
              <Menu
                label="More"
                items={[
                  { id: 'rename', label: 'Rename …', onSelect: () => setDialog('rename') },
                  {
                    id: 'clear',
                    label: 'Take off all but pinned ops',
                    onSelect: () => store.getState().clear(),
                  },
                ]}
              />
              <Button
                look="primary"
                aria-disabled={!facts.legal}
                title={facts.legal ? undefined : whyNotLegal(facts, store)}
                onClick={() => {
                  if (facts.legal) setDialog('keep');
                  else store.getState().say(whyNotLegal(facts, store), true);
                }}
              >
                Keep as mapping
              </Button>
            </>
          )
        }
      />
      <SaveBanner save={save} onKeepBoth={keepBoth} />
      <BenchPanes
        shown={shown}
        kernelTitle={`version ${props.kernel.version} · ${props.kernel.document.ops.length} ops · ${props.kernel.document.edges.length} connections`}
        fabricTitle={`${props.fabric.name} · version ${props.fabric.version} · ${props.fabric.document.topology}`}
        solvePanel={{
          solve: solving.solve,
          starting: solving.starting,
          previewing: solving.previewing,
          readOnly,
          settings: solving.settings,
          onSettings: solving.choose,
          onStart: (settings, fromHere) => {
            asking.adopt(null);
            void solving.start(settings, fromHere);
          },
          onStop: solving.stop,
          onPreview: solving.setPreviewing,
          onTake: () => {
            if (solving.result) store.getState().takeResult(solving.result);
            solving.setPreviewing(false);
          },
          files: {
            kernel: kernelFileName(props.kernel.document.name, props.kernel.version, 'kernel.json'),
            fabric: fabricFileName(props.fabric.document.name, props.fabric.version),
            certificate: mappingFileName(name, 'certificate.json'),
            mapping: null,
          },
          taken: solving.isTaken(content) || asking.isTaken(content) || asking.hasFound(content),
          asking,
          busy: [solving.solve, asking.solve].some((solve) => solve !== null && isLive(solve)),
        }}
      />
      <NameDialog
        open={dialog === 'keep'}
        title="Keep as mapping"
        text="A kept mapping is checked once more and never changes afterwards. The bench stays as it is."
        confirmLabel="Keep"
        initial={name}
        onClose={() => setDialog(null)}
        onConfirm={keep}
      />
      <NameDialog
        open={dialog === 'rename'}
        title="Rename"
        text="The name of this draft in the list of mappings."
        confirmLabel="Rename"
        initial={name}
        onClose={() => setDialog(null)}
        onConfirm={rename}
      />
    </section>
  );
}

/** The mapping that is being looked at, of a running solve or an offered one; else the bench's own. */
function usePreview(solving: BenchSolve, asking: BenchAsk): BenchView {
  const store = useBenchStore();
  const facts = useBench((state) => state.facts);
  const byTile = useBench((state) => state.byTile);
  const ownPins = useBench((state) => state.content.pins);
  const provenance = useBench((state) => state.content.provenance);
  const offered = asking.previewing ? asking.offered : null;
  const best = offered?.result ?? (solving.previewing ? solving.solve?.best : null) ?? null;
  const pins = offered?.pins ?? ownPins;
  const made = offered?.result.provenance ?? solving.solve?.settings ?? null;
  return useMemo(
    () =>
      best
        ? previewView(store, best, pins, countedIn(made))
        : { facts, byTile, preview: false, counted: countedIn(provenance) },
    [best, store, pins, made, facts, byTile, provenance],
  );
}

function whyNotLegal(
  facts: ReturnType<ReturnType<typeof useBenchStore>['getState']>['facts'],
  store: ReturnType<typeof useBenchStore>,
): string {
  const { totalOps, placedOps } = facts.metrics;
  if (placedOps < totalOps) {
    const { placement } = store.getState().content;
    const first = store.setting.kernel.ops.find((op) => placement[op.id] === undefined);
    const left = totalOps - placedOps;
    return `${left} ${left === 1 ? 'op is' : 'ops are'} not placed yet, first ${first ? shortName(first) : 'one'}.`;
  }
  const broken = facts.violations[0];
  return broken ? `${broken.rule} is broken: ${broken.message}.` : '';
}

function HistoryButtons() {
  const store = useBenchStore();
  const past = useBench((state) => state.past.at(-1)?.said ?? null);
  const future = useBench((state) => state.future[0]?.said ?? null);
  return (
    <div className="flex">
      <IconButton
        label={past === null ? 'Undo' : `Undo: ${past}`}
        disabled={past === null}
        onClick={() => store.getState().undo()}
      >
        ↶
      </IconButton>
      <IconButton
        label={future === null ? 'Redo' : `Redo: ${future}`}
        disabled={future === null}
        onClick={() => store.getState().redo()}
      >
        ↷
      </IconButton>
    </div>
  );
}

const undoKeys = (store: ReturnType<typeof useBenchStore>) => (event: KeyboardEvent) => {
  const typing = event.target instanceof HTMLInputElement || event.target instanceof HTMLTextAreaElement;
  if (typing || !(event.ctrlKey || event.metaKey)) return;
  const key = event.key.toLowerCase();
  if (key === 'z' && !event.shiftKey) store.getState().undo();
  else if (key === 'y' || (key === 'z' && event.shiftKey)) store.getState().redo();
  else return;
  event.preventDefault();
};
