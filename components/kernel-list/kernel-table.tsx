'use client';

import Link from 'next/link';
import { useRouter } from 'next/navigation';
import type { ReactNode } from 'react';
import { type CallResult, kernelPath } from '@/components/kernel-editor/server-calls';
import { Badge } from '@/components/ui/badge';
import { type Column, DataTable } from '@/components/ui/data-table';
import { Menu } from '@/components/ui/menu';
import { EmptyState } from '@/components/ui/notice';
import { useToast } from '@/components/ui/toast';
import type { Id } from '@/lib/ids';

export interface KernelRow {
  id: Id<'kernel'>;
  name: string;
  opCount: number;
  edgeCount: number;
  errorCount: number;
  latestVersion: number | null;
  changedByName: string;
  /** ISO 8601. */
  changedAt: string;
}

export interface KernelListCommands {
  archive(input: {
    workspace: string;
    kernelId: Id<'kernel'>;
    archived: boolean;
  }): CallResult<{ name: string }>;
  duplicate(input: { workspace: string; kernelId: Id<'kernel'> }): CallResult<{ id: Id<'kernel'> }>;
}

interface KernelTableProps {
  workspace: string;
  rows: readonly KernelRow[];
  archived: boolean;
  /** Null for those who may only look. */
  commands: KernelListCommands | null;
}

/** The workspace's kernels: what each holds, whether it can be placed, who changed it last. */
export function KernelTable({ workspace, rows, archived, commands }: KernelTableProps) {
  const columns = columnsFor(workspace, archived);
  if (commands !== null) {
    columns.push({
      key: 'commands',
      header: 'Actions',
      align: 'right',
      render: (row) => <RowMenu {...{ workspace, row, archived, commands }} />,
    });
  }
  return (
    <DataTable
      caption="Kernels"
      columns={columns}
      rows={rows}
      rowId={(row) => row.id}
      searchText={(row) => `${row.name} ${row.changedByName}`}
      initialSort={{ key: 'changed', descending: true }}
      filters={<StateFilter workspace={workspace} archived={archived} />}
      empty={<NoKernels {...{ workspace, archived }} mayEdit={commands !== null} />}
    />
  );
}

const figure = (value: number | string): ReactNode => <span className="font-mono">{value}</span>;

function columnsFor(workspace: string, archived: boolean): Column<KernelRow>[] {
  return [
    {
      key: 'name',
      header: 'Name',
      sortValue: (row) => row.name,
      render: (row) => (
        <Link
          href={kernelPath({ workspace, kernelId: row.id })}
          className="font-semibold text-indigo hover:underline"
        >
          {row.name}
        </Link>
      ),
    },
    {
      key: 'ops',
      header: 'Ops',
      align: 'right',
      sortValue: (row) => row.opCount,
      render: (row) => figure(row.opCount),
    },
    {
      key: 'edges',
      header: 'Connections',
      align: 'right',
      wideOnly: true,
      sortValue: (row) => row.edgeCount,
      render: (row) => figure(row.edgeCount),
    },
    {
      key: 'status',
      header: 'Status',
      sortValue: (row) => row.errorCount,
      render: (row) => <StatusBadge row={row} archived={archived} />,
    },
    {
      key: 'version',
      header: 'Latest version',
      align: 'right',
      wideOnly: true,
      sortValue: (row) => row.latestVersion ?? 0,
      render: (row) => figure(row.latestVersion ?? 'none'),
    },
    {
      key: 'changed',
      header: 'Changed',
      wideOnly: true,
      sortValue: (row) => row.changedAt,
      render: (row) => (
        <>
          <ChangedAt at={row.changedAt} /> <span className="text-quiet">by {row.changedByName}</span>
        </>
      ),
    },
  ];
}

function StatusBadge({ row, archived }: { row: KernelRow; archived: boolean }) {
  if (archived) return <Badge>archived</Badge>;
  if (row.opCount === 0) return <Badge>empty</Badge>;
  if (row.errorCount === 0) return <Badge tone="proven">can be placed</Badge>;
  return <Badge tone="broken">{`${row.errorCount} ${row.errorCount === 1 ? 'problem' : 'problems'}`}</Badge>;
}

const dateFormat = new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'short' });

/** In the reader's own time zone, which the server does not know. */
function ChangedAt({ at }: { at: string }) {
  return (
    <time dateTime={at} className="whitespace-nowrap" suppressHydrationWarning>
      {dateFormat.format(new Date(at))}
    </time>
  );
}

function StateFilter({ workspace, archived }: { workspace: string; archived: boolean }) {
  const path = `/w/${workspace}/kernels`;
  const choices = [
    { label: 'In use', href: path, here: !archived },
    { label: 'Archived', href: `${path}?show=archived`, here: archived },
  ];
  return (
    <nav aria-label="Which kernels" className="flex self-center rounded border border-edge!">
      {choices.map(({ label, href, here }) => (
        <Link
          key={label}
          href={href}
          aria-current={here ? 'page' : undefined}
          className={`flex min-h-8 items-center px-3 text-sm ${here ? 'bg-indigo-wash font-semibold text-indigo' : ''}`}
        >
          {label}
        </Link>
      ))}
    </nav>
  );
}

function RowMenu(props: {
  workspace: string;
  row: KernelRow;
  archived: boolean;
  commands: KernelListCommands;
}) {
  const { workspace, row, archived, commands } = props;
  const router = useRouter();
  const say = useToast();
  const failed = (message: string) => say(message, { tone: 'broken' });
  const setArchived = async (to: boolean, undoable: boolean) => {
    try {
      const changed = await commands.archive({ workspace, kernelId: row.id, archived: to });
      if (!changed.ok) return failed(changed.error.message);
      const text = `“${row.name}” is ${to ? 'archived' : 'back in use'}.`;
      say(
        text,
        undoable ? { action: { label: 'Undo', run: () => void setArchived(!to, false) } } : undefined,
      );
      router.refresh();
    } catch {
      failed('The server did not answer. Try again.');
    }
  };
  const duplicate = async () => {
    try {
      const copied = await commands.duplicate({ workspace, kernelId: row.id });
      if (!copied.ok) return failed(copied.error.message);
      const href = kernelPath({ workspace, kernelId: copied.value.id });
      say(`Duplicated “${row.name}”.`, { action: { label: 'Open the copy', run: () => router.push(href) } });
      router.refresh();
    } catch {
      failed('The server did not answer. Try again.');
    }
  };
  return (
    <Menu
      label="⋯"
      ariaLabel={`Actions for ${row.name}`}
      items={[
        { id: 'duplicate', label: 'Duplicate', onSelect: () => void duplicate() },
        archived
          ? { id: 'restore', label: 'Restore', onSelect: () => void setArchived(false, true) }
          : { id: 'archive', label: 'Archive', onSelect: () => void setArchived(true, true) },
      ]}
    />
  );
}

function NoKernels({
  workspace,
  archived,
  mayEdit,
}: {
  workspace: string;
  archived: boolean;
  mayEdit: boolean;
}) {
  if (archived) {
    return (
      <EmptyState
        title="Nothing is archived"
        action={
          <Link href={`/w/${workspace}/kernels`} className="text-indigo underline">
            Kernels in use
          </Link>
        }
      >
        Kernels that are put away stand here, and can be restored.
      </EmptyState>
    );
  }
  return (
    <EmptyState
      title="No kernels yet"
      action={
        <Link href={`/w/${workspace}/kernels?show=archived`} className="text-indigo underline">
          Archived kernels
        </Link>
      }
    >
      A kernel is the operation graph of one loop.{' '}
      {mayEdit
        ? 'Draw the first one with New kernel, or import a JSON or DOT file.'
        : 'When an editor of this workspace draws one, it stands here.'}
    </EmptyState>
  );
}
