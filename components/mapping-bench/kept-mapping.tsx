'use client';

import { useRouter } from 'next/navigation';
import { type ReactNode, useState } from 'react';
import { TopBar } from '@/components/shell/top-bar';
import { Button } from '@/components/ui/button';
import { Menu } from '@/components/ui/menu';
import { useToast } from '@/components/ui/toast';
import type { Fabric } from '@/lib/fabric/fabric';
import { fabricFileName, kernelFileName, mappingFileName } from '@/lib/formats/file-names';
import type { Kernel } from '@/lib/graph/kernel';
import type { MappingDocument } from '@/lib/mapping/mapping';
import { shortName } from '@/lib/mapping/picture/op-label';
import type { Result } from '@/lib/result';
import { BenchPanes } from './bench-panes';
import { NameDialog } from './keep-dialog';
import { countedIn } from './panes/bench-view';
import { PanelTitle } from './panes/figures';
import { MadeWithWeights } from './solve/made-with-weights';
import { ProvedBlock } from './solve/making-status';
import { boundText, durationText, objectiveLabel, valueText } from './solve/solve-state';
import { BenchProvider, useBench, useBenchStore } from './store/bench-context';
import { createBenchStore } from './store/bench-store';

export interface KeptMappingProps {
  workspace: string;
  mappingId: `mapping_${string}`;
  name: string;
  madeBy: string;
  /** Milliseconds since 1970. */
  madeAtMs: number;
  archived: boolean;
  document: MappingDocument;
  kernel: Kernel;
  fabric: Fabric;
  kernelHref: string;
  fabricHref: string;
  mayEdit: boolean;
  continueFrom: (input: {
    workspace: string;
    mappingId: `mapping_${string}`;
  }) => Promise<Result<{ draftId: string }, { message: string }>>;
  rename: (input: {
    workspace: string;
    mappingId: `mapping_${string}`;
    name: string;
  }) => Promise<Result<{ name: string }, { message: string }>>;
}

/** A kept mapping as it was saved: its stored routes, its figures, who or what made it. Nothing here can be changed. */
export function KeptMapping(props: KeptMappingProps) {
  const { document } = props;
  const [store] = useState(() =>
    createBenchStore({
      kernel: props.kernel,
      fabric: props.fabric,
      content: {
        placement: document.placement,
        pins: document.pins,
        routes: document.routes,
        provenance: document.provenance,
      },
      readOnly: true,
    }),
  );
  return (
    <BenchProvider store={store}>
      <KeptScreen {...props} />
    </BenchProvider>
  );
}

function KeptScreen(props: KeptMappingProps) {
  const { workspace, mappingId, document, mayEdit } = props;
  const router = useRouter();
  const say = useToast();
  const [name, setName] = useState(props.name);
  const [renaming, setRenaming] = useState(false);
  const [busy, setBusy] = useState(false);
  const facts = useBench((state) => state.facts);
  const byTile = useBench((state) => state.byTile);
  const files = `/api/w/${workspace}/mappings/${mappingId}`;
  const onContinue = async () => {
    setBusy(true);
    const answer = await props.continueFrom({ workspace, mappingId });
    if (answer.ok) router.push(`/w/${workspace}/mappings/bench/${answer.value.draftId}`);
    else {
      say(answer.error.message, { tone: 'broken' });
      setBusy(false);
    }
  };
  return (
    <div className="flex flex-col lg:h-full">
      <TopBar
        path={[{ label: 'Mappings', href: `/w/${workspace}/mappings` }, { label: name }]}
        status={props.archived ? 'kept · archived' : 'kept, unchanging'}
        actions={
          <>
            <Menu
              label="Export"
              items={[
                { id: 'svg', label: 'Picture, SVG', href: `${files}/picture.svg` },
                { id: 'png', label: 'Picture, PNG', href: `${files}/picture.png` },
                { id: 'json', label: 'Mapping, JSON', href: `${files}/mapping.json` },
              ]}
            />
            {mayEdit ? (
              <>
                <Button look="quiet" onClick={() => setRenaming(true)}>
                  Rename
                </Button>
                <Button look="primary" busy={busy} onClick={onContinue}>
                  Continue from this
                </Button>
              </>
            ) : null}
          </>
        }
      />
      <BenchPanes
        shown={{ facts, byTile, preview: false, counted: countedIn(document.provenance) }}
        kernelTitle={`version ${document.kernel.version ?? '–'} · ${props.kernel.ops.length} ops · ${props.kernel.edges.length} connections`}
        fabricTitle={`${document.fabric.name} · version ${document.fabric.version ?? '–'} · ${props.fabric.topology}`}
        solvePanel={null}
        more={
          <>
            <Making {...props} shownName={name} files={files} />
            <MadeWithWeights provenance={document.provenance} />
            <ConnectionHops />
          </>
        }
      />
      <NameDialog
        open={renaming}
        title="Rename"
        text="Only the name changes; the mapping stays as it is."
        confirmLabel="Rename"
        initial={name}
        onClose={() => setRenaming(false)}
        onConfirm={async (wanted) => {
          const answer = await props.rename({ workspace, mappingId, name: wanted });
          if (!answer.ok) return answer.error.message;
          setName(answer.value.name);
          setRenaming(false);
          return null;
        }}
      />
    </div>
  );
}

const when = new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'short', timeZone: 'UTC' });

/** Who or what made it, from which versions, with which settings. */
function Making(props: KeptMappingProps & { shownName: string; files: string }) {
  const { document, madeBy, madeAtMs, kernelHref, fabricHref } = props;
  const { provenance, kernel, fabric } = document;
  const version = (number: number | null) => (number === null ? '' : `, version ${number}`);
  const rows: [string, ReactNode][] = [
    ['Kept by', madeBy],
    ['When', `${when.format(madeAtMs)} UTC`],
    [
      'Kernel',
      <a key="kernel" href={kernelHref} className="text-indigo hover:underline">
        {kernel.name}
        {version(kernel.version)}
      </a>,
    ],
    [
      'Fabric',
      <a key="fabric" href={fabricHref} className="text-indigo hover:underline">
        {fabric.name}
        {version(fabric.version)}
      </a>,
    ],
  ];
  if (provenance.by === 'hand') rows.push(['Made by', 'hand']);
  else {
    rows.push(
      ['Engine', provenance.engine],
      ['Aim', objectiveLabel(provenance.objective, provenance.weights)],
      ['Found', valueText(provenance.objectiveValue)],
      ['Lower bound', boundText(provenance.bound, provenance.objective, provenance.weights)],
      ['Time', `${durationText(provenance.elapsedMs)} of ${durationText(provenance.timeLimitMs)}`],
      ['Seed', provenance.seed],
      ['Changed by hand', provenance.changedByHand ? 'yes' : 'no'],
    );
  }
  return (
    <section aria-label="How it was made">
      <PanelTitle>How it was made</PanelTitle>
      <ProvedBlock
        provenance={provenance}
        files={{
          kernel: kernelFileName(props.kernel.name, kernel.version, 'kernel.json'),
          fabric: fabricFileName(props.fabric.name, fabric.version),
          certificate: mappingFileName(props.shownName, 'certificate.json'),
          mapping: mappingFileName(props.shownName, 'json'),
        }}
        href={`${props.files}/certificate.json`}
      />
      <dl className="mt-2 text-sm">
        {rows.map(([label, value]) => (
          <div key={label} className="flex justify-between gap-3 py-0.5">
            <dt className="flex-none text-quiet">{label}</dt>
            <dd className="min-w-0 text-right tabular-nums">{value}</dd>
          </div>
        ))}
      </dl>
    </section>
  );
}

/** Each connection with its hops, the longest first. */
function ConnectionHops() {
  const { setting } = useBenchStore();
  const connectionHops = useBench((state) => state.facts.metrics.connectionHops);
  const rows = setting.kernel.edges
    .map((edge) => ({ edge, hops: connectionHops.get(edge.id) ?? 0 }))
    .sort((a, b) => b.hops - a.hops);
  const nameOf = (id: (typeof rows)[number]['edge']['from']) => {
    const op = setting.ops.get(id);
    return op ? shortName(op) : id;
  };
  return (
    <details className="text-sm" open>
      <summary className="min-h-6 text-xs font-semibold tracking-[0.12em] text-quiet uppercase">
        Hops per connection
      </summary>
      <table className="mt-1 w-full">
        <thead className="sr-only">
          <tr>
            <th scope="col">From</th>
            <th scope="col">To</th>
            <th scope="col">Hops</th>
          </tr>
        </thead>
        <tbody>
          {rows.map(({ edge, hops }) => (
            <tr key={edge.id} className="border-t border-rule">
              <td className="py-0.5 pr-2">{nameOf(edge.from)}</td>
              <td className="pr-2">
                {nameOf(edge.to)} <span className="text-quiet">{edge.port}</span>
              </td>
              <td className="text-right font-mono">{hops}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </details>
  );
}
