'use client';

import { useRouter } from 'next/navigation';
import { useMemo, useState } from 'react';
import { FabricGrid } from '@/components/fabric-grid/fabric-grid';
import { Button } from '@/components/ui/button';
import { TextAreaField } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import { compileFabric } from '@/lib/fabric/compile';
import type { Fabric } from '@/lib/fabric/fabric';
import { validateFabric } from '@/lib/fabric/validate-fabric';
import { parseFabricJson } from '@/lib/formats/fabric-json';
import type { FormatError } from '@/lib/formats/parse-result';
import { FabricFigures } from '../fabric-view/fabric-figures';
import { UnitLegend } from '../fabric-view/unit-legend';
import { type FabricCommands, UNREACHABLE_SERVER } from './fabric-commands';

const FILE_MAX_BYTES = 900 * 1024;

type Reading =
  | { state: 'empty' }
  | { state: 'wrong'; errors: readonly FormatError[]; faults: readonly string[] }
  | { state: 'right'; fabric: Fabric; warnings: readonly string[] };

/** Reads the text as the server will: what is refused here is refused there. */
export function readFabricText(text: string): Reading {
  if (text.trim() === '') return { state: 'empty' };
  const parsed = parseFabricJson(text);
  if (!parsed.ok) return { state: 'wrong', errors: parsed.errors, faults: [] };
  const problems = validateFabric(parsed.value);
  const of = (severity: string) => problems.filter((p) => p.severity === severity).map((p) => p.message);
  const faults = of('error');
  if (faults.length > 0) return { state: 'wrong', errors: [], faults };
  return { state: 'right', fabric: parsed.value, warnings: of('warning') };
}

interface ImportFabricFormProps {
  workspace: string;
  importFabric: FabricCommands['import'];
}

export function ImportFabricForm({ workspace, importFabric }: ImportFabricFormProps) {
  const router = useRouter();
  const [text, setText] = useState('');
  const [failure, setFailure] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const reading = useMemo(() => readFabricText(text), [text]);

  const takeFile = async (file: File | undefined) => {
    if (!file) return;
    setFailure(null);
    if (file.size > FILE_MAX_BYTES) {
      setFailure(`${file.name} is larger than a fabric can be (900 KiB). Choose another file.`);
      return;
    }
    setText(await file.text());
  };
  const store = async () => {
    setBusy(true);
    const answer = await importFabric({ workspace, text }).catch(() => null);
    if (answer?.ok) {
      router.push(`/w/${workspace}/fabrics/${answer.value.fabricId}`);
      return;
    }
    setBusy(false);
    setFailure(answer?.error.message ?? UNREACHABLE_SERVER);
  };
  return (
    <div className="space-y-4">
      <label className="block text-sm">
        <span className="mb-1 block font-semibold">Fabric file</span>
        <input
          type="file"
          accept=".json,application/json"
          className="block w-full text-sm"
          onChange={(event) => void takeFile(event.target.files?.[0])}
        />
      </label>
      <TextAreaField
        label="or its text"
        rows={6}
        spellCheck={false}
        value={text}
        placeholder={'{ "format": "pinloom.fabric", … }'}
        onChange={(event) => {
          setFailure(null);
          setText(event.target.value);
        }}
      />
      <Findings reading={reading} />
      {failure ? (
        <Notice tone="broken" live>
          {failure}
        </Notice>
      ) : null}
      <div className="flex justify-end">
        <Button look="primary" busy={busy} disabled={reading.state !== 'right'} onClick={() => void store()}>
          Import this fabric
        </Button>
      </div>
    </div>
  );
}

function Findings({ reading }: { reading: Reading }) {
  if (reading.state === 'empty')
    return <p className="text-sm text-quiet">Choose a file or paste its text to see what is in it.</p>;
  if (reading.state === 'wrong') {
    return (
      <Notice tone="broken" live>
        <p className="font-semibold">Nothing was imported. Correct the text:</p>
        <ul className="mt-1 list-disc pl-5">
          {reading.errors.map((error) => (
            <li key={`${error.line}:${error.column}:${error.message}`}>
              Line {error.line}, column {error.column}
              {error.path ? ` (${error.path})` : ''}: {error.message}
              {error.expected ? ` Expected ${error.expected}.` : ''}
            </li>
          ))}
          {reading.faults.map((fault) => (
            <li key={fault}>{fault}</li>
          ))}
        </ul>
      </Notice>
    );
  }
  return <Preview fabric={reading.fabric} warnings={reading.warnings} />;
}

function Preview({ fabric, warnings }: { fabric: Fabric; warnings: readonly string[] }) {
  const graph = useMemo(() => compileFabric(fabric), [fabric]);
  return (
    <section aria-label="Preview" className="space-y-3">
      <h3 className="font-semibold">{fabric.name}</h3>
      {warnings.map((warning) => (
        <Notice key={warning} tone="warning">
          {warning}
        </Notice>
      ))}
      <div className="grid gap-4 sm:grid-cols-[1fr_14rem]">
        <FabricGrid fabric={fabric} graph={graph} label={`Preview of ${fabric.name}`} />
        <div className="space-y-4">
          <UnitLegend units={fabric.units} />
          <FabricFigures fabric={fabric} graph={graph} />
        </div>
      </div>
    </section>
  );
}
