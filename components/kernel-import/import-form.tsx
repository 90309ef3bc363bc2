'use client';

import { useRouter } from 'next/navigation';
import { type DragEvent, useId, useMemo, useRef, useState } from 'react';
import { problemSummary } from '@/components/kernel-editor/panels/problem-list';
import { type EditorCalls, kernelPath } from '@/components/kernel-editor/server-calls';
import { Button } from '@/components/ui/button';
import { TextAreaField } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import { type KernelReading, readKernel } from './read-kernel';

const MAX_FILE_BYTES = 4 * 1024 * 1024;

interface ImportFormProps {
  workspace: string;
  create: EditorCalls['create'];
  onClose: () => void;
}

export function ImportForm({ workspace, create, onClose }: ImportFormProps) {
  const router = useRouter();
  const [text, setText] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const reading = useMemo(() => (text.trim() === '' ? null : readKernel(text)), [text]);
  const takeFile = async (file: File | undefined) => {
    setFault(null);
    if (file === undefined) return;
    if (file.size > MAX_FILE_BYTES) {
      setFault(`“${file.name}” is larger than 4 MB: no kernel within the limits is that large.`);
    } else setText(await file.text());
  };
  const save = async () => {
    if (!reading?.ok) return;
    setBusy(true);
    setFault(null);
    try {
      const made = await create({ workspace, document: reading.kernel });
      if (made.ok) return router.push(kernelPath({ workspace, kernelId: made.value.id }));
      setFault(made.error.message);
    } catch {
      setFault('The server did not answer. Nothing was imported; try again.');
    }
    setBusy(false);
  };
  return (
    <div className="flex flex-col gap-3">
      <FileDrop onFile={(file) => void takeFile(file)} />
      <TextAreaField
        label="Or paste the text"
        hint="A kernel document in JSON, or a digraph in DOT."
        rows={7}
        spellCheck={false}
        className="font-mono"
        value={text}
        onChange={(event) => setText(event.target.value)}
      />
      {fault === null ? null : (
        <Notice tone="broken" live>
          {fault}
        </Notice>
      )}
      {reading === null ? null : <ReadingPreview reading={reading} text={text} />}
      <div className="flex justify-end gap-2">
        <Button look="quiet" onClick={onClose}>
          Cancel
        </Button>
        <Button look="primary" busy={busy} disabled={!reading?.ok} onClick={() => void save()}>
          Import and open
        </Button>
      </div>
    </div>
  );
}

function FileDrop({ onFile }: { onFile: (file: File | undefined) => void }) {
  const [over, setOver] = useState(false);
  const input = useRef<HTMLInputElement>(null);
  const id = useId();
  const onDrag = (event: DragEvent, inside: boolean) => {
    event.preventDefault();
    setOver(inside);
  };
  return (
    <fieldset
      aria-label="File"
      className={`flex flex-wrap items-center gap-3 rounded border border-dashed border-edge! px-4 py-4 text-sm ${
        over ? 'bg-indigo-wash' : ''
      }`}
      onDragOver={(event) => onDrag(event, true)}
      onDragLeave={(event) => onDrag(event, false)}
      onDrop={(event) => {
        onDrag(event, false);
        onFile(event.dataTransfer.files[0]);
      }}
    >
      <label htmlFor={id} className="font-semibold">
        A file
      </label>
      <input
        ref={input}
        id={id}
        type="file"
        accept=".json,.dot,.gv,application/json,text/vnd.graphviz"
        onChange={(event) => onFile(event.target.files?.[0])}
      />
      <span className="text-quiet">or drop one here</span>
    </fieldset>
  );
}

function ReadingPreview({ reading, text }: { reading: KernelReading; text: string }) {
  if (!reading.ok) {
    const lines = text.split(/\r\n|\n|\r/);
    return (
      <Notice tone="broken" live>
        <p className="mb-1 font-semibold">
          {reading.format}: {reading.errors.length === 1 ? 'one error' : `${reading.errors.length} errors`}.
          Nothing is imported until the text is right.
        </p>
        <ol className="flex max-h-56 flex-col gap-2 overflow-y-auto">
          {reading.errors.map((error, i) => (
            <li key={`${i}-${error.line}`}>
              Line {error.line}, column {error.column}
              {error.path ? ` (${error.path})` : ''}: {error.message}
              {error.expected ? ` Expected: ${error.expected}.` : ''}
              <SourceLine line={lines[error.line - 1]} column={error.column} />
            </li>
          ))}
        </ol>
      </Notice>
    );
  }
  const { kernel, problems, format } = reading;
  return (
    <Notice tone="plain" live>
      <p className="font-semibold">{kernel.name}</p>
      <p>
        Read as {format}: {kernel.ops.length} {kernel.ops.length === 1 ? 'op' : 'ops'}, {kernel.edges.length}{' '}
        {kernel.edges.length === 1 ? 'connection' : 'connections'}, {problemSummary(problems)}.
      </p>
      {problems.length === 0 ? null : (
        <ul className="mt-1 max-h-40 list-disc overflow-y-auto pl-5">
          {problems.map((problem, i) => (
            <li key={`${i}-${problem.code}`}>{problem.message}</li>
          ))}
        </ul>
      )}
    </Notice>
  );
}

const SHOWN = 80;

/** The faulty line with a mark under its column. */
function SourceLine({ line, column }: { line: string | undefined; column: number }) {
  if (line === undefined) return null;
  const from = Math.max(0, column - SHOWN / 2);
  const shown = line.slice(from, from + SHOWN);
  return (
    <pre className="mt-0.5 overflow-x-auto font-mono text-xs text-ink" aria-hidden="true">
      {shown}
      {'\n'}
      {' '.repeat(Math.max(0, column - 1 - from))}^
    </pre>
  );
}
