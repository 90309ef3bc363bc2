'use client';

import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { type ReactNode, useState } from 'react';
import { Badge, type BadgeTone } from '@/components/ui/badge';
import { type Column, DataTable } from '@/components/ui/data-table';
import { SelectField } from '@/components/ui/field';
import { Menu } from '@/components/ui/menu';
import { useToast } from '@/components/ui/toast';
import type { Result } from '@/lib/result';
import { type MappingRow, type RowStatus, statusNames, statusText } from './mapping-rows';

interface MappingsTableProps {
  workspace: string;
  rows: readonly MappingRow[];
  mayEdit: boolean;
  archived: boolean;
  empty: ReactNode;
  setArchived: (input: {
    workspace: string;
    id: `draft_${string}` | `mapping_${string}`;
    archived: boolean;
  }) => Promise<Result<{ name: string }, { message: string }>>;
}

const tones: Record<RowStatus['kind'], BadgeTone> = {
  draft: 'active',
  legal: 'plain',
  optimal: 'proven',
  feasible: 'plain',
};
const day = new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'short', timeZone: 'UTC' });

const columns: readonly Column<MappingRow>[] = [
  {
    key: 'name',
    header: 'Name',
    sortValue: (row) => row.name,
    render: (row) => (
      <Link href={row.href} className="font-semibold text-indigo hover:underline">
        {row.name}
      </Link>
    ),
  },
  {
    key: 'kernel',
    header: 'Kernel',
    sortValue: (row) => row.kernel,
    render: (row) => <Versioned name={row.kernel} version={row.kernelVersion} />,
  },
  {
    key: 'fabric',
    header: 'Fabric',
    wideOnly: true,
    sortValue: (row) => row.fabric,
    render: (row) => <Versioned name={row.fabric} version={row.fabricVersion} />,
  },
  {
    key: 'status',
    header: 'Status',
    sortValue: (row) => statusText(row.status),
    render: (row) => <Badge tone={tones[row.status.kind]}>{statusText(row.status)}</Badge>,
  },
  number('wire', 'Wire hops', (row) => row.wireHops),
  number('path', 'Path hops', (row) => row.pathHops),
  number('longest', 'Longest path', (row) => row.longestPathHops),
  number('units', 'Units used', (row) => row.placedOps),
  {
    key: 'made',
    header: 'Made by',
    wideOnly: true,
    sortValue: (row) => row.madeBy,
    render: (row) => row.madeBy,
  },
  { key: 'who', header: 'Who', wideOnly: true, sortValue: (row) => row.who, render: (row) => row.who },
  {
    key: 'when',
    header: 'When',
    wideOnly: true,
    sortValue: (row) => row.atMs,
    render: (row) => (
      <time dateTime={new Date(row.atMs).toISOString()} className="whitespace-nowrap">
        {day.format(row.atMs)}
      </time>
    ),
  },
];

function number(key: string, header: string, value: (row: MappingRow) => number): Column<MappingRow> {
  return { key, header, align: 'right', wideOnly: true, sortValue: value, render: value };
}

function Versioned({ name, version }: { name: string; version: number }) {
  return (
    <>
      {name} <span className="whitespace-nowrap text-quiet">v{version}</span>
    </>
  );
}

const choicesOf = (all: string, pairs: readonly (readonly [string, string])[]) => [
  { value: '', label: all },
  ...[...new Map(pairs)].map(([value, label]) => ({ value, label })),
];

/** Drafts and kept mappings in one table, with filters by kernel, fabric and status. */
export function MappingsTable({
  workspace,
  rows,
  mayEdit,
  archived,
  empty,
  setArchived,
}: MappingsTableProps) {
  const [kernel, setKernel] = useState('');
  const [fabric, setFabric] = useState('');
  const [status, setStatus] = useState('');
  const router = useRouter();
  const say = useToast();
  const shown = rows.filter(
    (row) =>
      (kernel === '' || row.kernelId === kernel) &&
      (fabric === '' || row.fabricId === fabric) &&
      (status === '' || row.status.kind === status),
  );
  const put = async (row: MappingRow, away: boolean) => {
    const id = row.id as `draft_${string}`;
    const answer = await setArchived({ workspace, id, archived: away });
    if (!answer.ok) return say(answer.error.message, { tone: 'broken' });
    say(away ? `${row.name} is archived.` : `${row.name} is back in the list.`);
    router.refresh();
  };
  const actions: Column<MappingRow> = {
    key: 'actions',
    header: 'Actions',
    align: 'right',
    render: (row) => (
      <Menu
        label="⋯"
        ariaLabel={`More for ${row.name}`}
        items={[
          {
            id: 'archive',
            label: archived ? 'Restore' : 'Archive',
            onSelect: () => void put(row, !archived),
          },
        ]}
      />
    ),
  };
  if (rows.length === 0) return <>{empty}</>;
  return (
    <DataTable
      caption="Mappings"
      columns={mayEdit ? [...columns, actions] : columns}
      rows={shown}
      rowId={(row) => row.id}
      searchText={(row) =>
        `${row.name} ${row.kernel} ${row.fabric} ${row.who} ${statusText(row.status)} ${row.madeBy}`
      }
      initialSort={{ key: 'when', descending: true }}
      filters={
        <>
          <SelectField
            label="Kernel"
            labelHidden
            choices={choicesOf(
              'All kernels',
              rows.map((row) => [row.kernelId, row.kernel] as const),
            )}
            value={kernel}
            onChange={(event) => setKernel(event.target.value)}
          />
          <SelectField
            label="Fabric"
            labelHidden
            choices={choicesOf(
              'All fabrics',
              rows.map((row) => [row.fabricId, row.fabric] as const),
            )}
            value={fabric}
            onChange={(event) => setFabric(event.target.value)}
          />
          <SelectField
            label="Status"
            labelHidden
            choices={choicesOf('Every status', Object.entries(statusNames))}
            value={status}
            onChange={(event) => setStatus(event.target.value)}
          />
        </>
      }
    />
  );
}
