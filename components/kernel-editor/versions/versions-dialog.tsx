'use client';

import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import useSWR from 'swr';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import { KERNEL_LIMITS, type Kernel, kernelSchema } from '@/lib/graph';
import {
  type EditorCalls,
  type KernelPlaces,
  kernelPath,
  type VersionSummary,
  versionApi,
  versionPath,
  versionsApi,
} from '../server-calls';
import { useEditor, useKernelState } from '../store/editor-context';
import { replaceKernelEdit } from '../store/replace-kernel';
import { fetchJson } from './fetch-json';

interface VersionsDialogProps {
  places: KernelPlaces;
  create: EditorCalls['create'];
}

const dateFormat = new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'short' });

/** The kept versions: look at one, take it into the draft, or start a new kernel from it. */
export function VersionsDialog(props: VersionsDialogProps) {
  const { store } = useEditor();
  const open = useKernelState((state) => state.dialog === 'versions');
  return (
    <Dialog open={open} title="Versions" size="wide" onClose={() => store.getState().openDialog(null)}>
      <VersionTable {...props} />
    </Dialog>
  );
}

function VersionTable({ places, create }: VersionsDialogProps) {
  const { data, error } = useSWR<VersionSummary[], Error>(versionsApi(places), fetchJson);
  const readOnly = useKernelState((state) => state.readOnly);
  const [problem, setProblem] = useState<string | null>(null);
  if (error) return <Notice tone="broken">The versions could not be read: {error.message}</Notice>;
  if (data === undefined) return <p className="text-sm text-quiet">Reading the versions…</p>;
  if (data.length === 0) {
    return (
      <p className="text-sm text-quiet">
        None yet. Keep version fixes the draft as it is now; mappings stand on such versions.
      </p>
    );
  }
  return (
    <div className="overflow-x-auto">
      {problem === null ? null : <Notice tone="broken">{problem}</Notice>}
      <table className="w-full text-sm">
        <caption className="sr-only">Versions, newest first</caption>
        <thead>
          <tr className="text-left text-xs text-quiet">
            <th scope="col" className="py-1 pr-3">
              Version
            </th>
            <th scope="col" className="pr-3 text-right">
              Ops
            </th>
            <th scope="col" className="pr-3">
              Kept
            </th>
            <th scope="col">
              <span className="sr-only">What to do</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {data.map((version) => (
            <tr key={version.number} className="border-t border-rule">
              <td className="py-1.5 pr-3">
                <Link
                  href={versionPath(places, version.number)}
                  className="text-indigo underline underline-offset-2"
                >
                  {version.number}
                  {version.label ? ` · ${version.label}` : ''}
                </Link>
              </td>
              <td className="pr-3 text-right font-mono">{version.opCount}</td>
              <td className="pr-3">
                {dateFormat.format(new Date(version.createdAt))}, {version.createdByName}
              </td>
              <td className="text-right whitespace-nowrap">
                {readOnly ? null : (
                  <VersionCommands {...{ places, create }} number={version.number} onProblem={setProblem} />
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

function VersionCommands({
  places,
  create,
  number,
  onProblem,
}: VersionsDialogProps & { number: number; onProblem: (text: string | null) => void }) {
  const { store, canvas } = useEditor();
  const router = useRouter();
  const [busy, setBusy] = useState(false);
  const withDocument = async (use: (kernel: Kernel) => Promise<void> | void) => {
    setBusy(true);
    onProblem(null);
    try {
      await use(kernelSchema.parse(await fetchJson(versionApi(places, number))));
    } catch {
      onProblem('The server did not answer. Try again.');
    }
    setBusy(false);
  };
  const restore = (kernel: Kernel) => {
    const { edit, openDialog, say } = store.getState();
    edit(replaceKernelEdit(store.getState().kernel, kernel), `restore version ${number}`);
    openDialog(null);
    say(`The draft is version ${number} now. Undo brings back what was there.`);
    canvas.current?.fit();
  };
  const duplicate = async (kernel: Kernel) => {
    const suffix = ` (from version ${number})`;
    const name = `${kernel.name.slice(0, KERNEL_LIMITS.nameLength - suffix.length)}${suffix}`;
    const made = await create({ workspace: places.workspace, document: { ...kernel, name } });
    if (made.ok) router.push(kernelPath({ ...places, kernelId: made.value.id }));
    else onProblem(made.error.message);
  };
  return (
    <span className="inline-flex gap-1">
      <Button look="quiet" busy={busy} onClick={() => void withDocument(restore)}>
        Restore into draft
      </Button>
      <Button look="quiet" busy={busy} onClick={() => void withDocument(duplicate)}>
        New kernel from it
      </Button>
    </span>
  );
}
