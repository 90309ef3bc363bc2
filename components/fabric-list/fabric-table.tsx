'use client';

import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { Badge } from '@/components/ui/badge';
import { ButtonLink } from '@/components/ui/button';
import { type Column, DataTable } from '@/components/ui/data-table';
import { Menu, type MenuItem } from '@/components/ui/menu';
import { EmptyState } from '@/components/ui/notice';
import type { Topology } from '@/lib/fabric/fabric';
import type { Id } from '@/lib/ids';
import { topologyWords } from '../fabric-view/topology-labels';
import type { FabricCommands } from './fabric-commands';
import { Instant } from './instant';
import { useFabricChanges } from './use-fabric-changes';

export interface FabricRow {
  id: Id<'fabric'>;
  name: string;
  rows: number;
  cols: number;
  topology: Topology;
  peCount: number;
  units: readonly { label: string; peCount: number }[];
  linkCount: number;
  /** Null: no clock, so no limit. */
  maxHops: number | null;
  latestVersion: number | null;
  errorCount: number;
  changedByName: string;
  /** ISO 8601. */
  changedAt: string;
}

export type ListCommands = Pick<FabricCommands, 'archive' | 'duplicate'>;

interface FabricTableProps {
  workspace: string;
  rows: readonly FabricRow[];
  archived: boolean;
  /** Left out for those who may only look. */
  commands?: ListCommands;
}

/** The workspace's fabrics with what tells them apart. */
export function FabricTable({ workspace, rows, archived, commands }: FabricTableProps) {
  const base = `/w/${workspace}/fabrics`;
  const columns = columnsFor(base);
  if (commands) {
    columns.push({
      key: 'actions',
      header: 'Actions',
      align: 'right',
      render: (row) => <RowMenu workspace={workspace} row={row} archived={archived} commands={commands} />,
    });
  }
  return (
    <DataTable
      caption="Fabrics"
      columns={columns}
      rows={rows}
      rowId={(row) => row.id}
      searchText={(row) =>
        `${row.name} ${row.rows}×${row.cols} ${row.topology} ${row.units.map((unit) => unit.label).join(' ')}`
      }
      initialSort={{ key: 'changed', descending: true }}
      filters={<StateFilter base={base} archived={archived} />}
      empty={<NoFabrics base={base} archived={archived} mayEdit={commands !== undefined} />}
    />
  );
}

const number = (value: number) => value.toLocaleString('en-GB');

function columnsFor(base: string): Column<FabricRow>[] {
  return [
    {
      key: 'name',
      header: 'Name',
      sortValue: (row) => row.name,
      render: (row) => (
        <span className="flex flex-wrap items-center gap-2">
          <Link href={`${base}/${row.id}`} className="font-semibold text-indigo hover:underline">
            {row.name}
          </Link>
          {row.errorCount > 0 ? <Badge tone="broken">{`${row.errorCount} to fix`}</Badge> : null}
        </span>
      ),
    },
    {
      key: 'size',
      header: 'Size',
      sortValue: (row) => row.rows * row.cols,
      render: (row) => <span className="font-mono whitespace-nowrap">{`${row.rows} × ${row.cols}`}</span>,
    },
    {
      key: 'topology',
      header: 'Topology',
      wideOnly: true,
      sortValue: (row) => row.topology,
      render: (row) => topologyWords[row.topology],
    },
    {
      key: 'units',
      header: 'PEs',
      wideOnly: true,
      sortValue: (row) => row.peCount,
      render: (row) => (
        <span className="flex flex-wrap gap-x-3">
          {row.units.map((unit) => (
            <span key={unit.label} className="whitespace-nowrap">
              <span className="font-mono">{number(unit.peCount)}</span>{' '}
              <span className="text-quiet">{unit.label.toLowerCase()}</span>
            </span>
          ))}
        </span>
      ),
    },
    {
      key: 'links',
      header: 'Links',
      align: 'right',
      wideOnly: true,
      sortValue: (row) => row.linkCount,
      render: (row) => <span className="font-mono">{number(row.linkCount)}</span>,
    },
    {
      key: 'maxHops',
      header: 'Max hops',
      align: 'right',
      wideOnly: true,
      sortValue: (row) => row.maxHops ?? Number.POSITIVE_INFINITY,
      render: (row) => <span className="font-mono">{row.maxHops ?? 'no limit'}</span>,
    },
    {
      key: 'version',
      header: 'Version',
      align: 'right',
      wideOnly: true,
      sortValue: (row) => row.latestVersion ?? 0,
      render: (row) => <span className="font-mono">{row.latestVersion ?? 'none'}</span>,
    },
    {
      key: 'changed',
      header: 'Changed',
      wideOnly: true,
      sortValue: (row) => row.changedAt,
      render: (row) => (
        <>
          <Instant at={row.changedAt} /> <span className="text-quiet">by {row.changedByName}</span>
        </>
      ),
    },
  ];
}

function StateFilter({ base, archived }: { base: string; archived: boolean }) {
  const tab = (href: string, label: string, here: boolean) => (
    <Link
      href={href}
      aria-current={here ? 'true' : undefined}
      className={`inline-flex min-h-8 items-center rounded px-3 text-sm ${
        here ? 'bg-indigo-wash font-semibold text-indigo' : 'hover:bg-indigo-wash'
      }`}
    >
      {label}
    </Link>
  );
  return (
    <nav aria-label="Which fabrics" className="flex gap-1">
      {tab(base, 'In use', !archived)}
      {tab(`${base}?show=archived`, 'Archived', archived)}
    </nav>
  );
}

function NoFabrics({ base, archived, mayEdit }: { base: string; archived: boolean; mayEdit: boolean }) {
  if (archived) {
    return (
      <EmptyState
        title="Nothing is archived"
        action={<ButtonLink href={base}>Show fabrics in use</ButtonLink>}
      >
        Archived fabrics are kept here; their mappings stay readable, and they can be taken back.
      </EmptyState>
    );
  }
  return (
    <EmptyState
      title="No fabric yet"
      action={
        <div className="flex flex-wrap justify-center gap-2">
          <ButtonLink href={`${base}?show=archived`}>Show archived fabrics</ButtonLink>
          {mayEdit ? (
            <ButtonLink href={`${base}/new`} look="primary">
              New fabric
            </ButtonLink>
          ) : null}
        </div>
      }
    >
      A fabric is the grid of processing elements that kernels are placed on: its units, its links and its
      clock.{mayEdit ? ' Start from a preset.' : ' An editor of this workspace can add the first one.'}
    </EmptyState>
  );
}

interface RowMenuProps {
  workspace: string;
  row: FabricRow;
  archived: boolean;
  commands: ListCommands;
}

function RowMenu({ workspace, row, archived, commands }: RowMenuProps) {
  const router = useRouter();
  const changes = useFabricChanges({ workspace, commands, onChanged: () => router.refresh() });
  const fabric = { id: row.id, name: row.name };
  const items: MenuItem[] = [
    {
      id: 'export',
      label: 'Export JSON',
      href: `/api/w/${workspace}/fabrics/${row.id}/export`,
    },
    {
      id: 'duplicate',
      label: 'Duplicate',
      onSelect: async () => {
        const copy = await changes.duplicate(fabric);
        if (copy) router.push(`/w/${workspace}/fabrics/${copy}`);
      },
    },
    archived
      ? { id: 'restore', label: 'Restore', onSelect: () => changes.setArchived(fabric, false) }
      : { id: 'archive', label: 'Archive', onSelect: () => changes.setArchived(fabric, true) },
  ];
  return <Menu label="…" ariaLabel={`Actions for ${row.name}`} items={items} className="inline-block" />;
}
