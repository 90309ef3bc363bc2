import { fireEvent, render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { beforeAll, describe, expect, it, vi } from 'vitest';
import type { FabricCommands } from '@/components/fabric-list/fabric-commands';
import { ImportFabric } from '@/components/fabric-list/import-fabric';
import { readFabricText } from '@/components/fabric-list/import-fabric-form';
import { newFabric, unitMixPatterns } from '@/lib/fabric/presets';
import { linkId, tileId } from '@/lib/fabric/tiles';
import { writeFabricJson } from '@/lib/formats/fabric-json';
import { idSchema } from '@/lib/ids';
import { ok } from '@/lib/result';

const push = vi.fn();
vi.mock('next/navigation', () => ({ useRouter: () => ({ push }) }));

// jsdom knows the dialog element, but not how to open it.
beforeAll(() => {
  HTMLDialogElement.prototype.showModal ??= function (this: HTMLDialogElement) {
    this.open = true;
  };
  HTMLDialogElement.prototype.close ??= function (this: HTMLDialogElement) {
    this.open = false;
  };
});

const [mix] = unitMixPatterns;
if (!mix) throw new Error('there is no unit mix');
const fabric = newFabric({
  name: 'Hive',
  rows: 2,
  cols: 3,
  topology: 'mesh',
  mix,
  channels: 1,
  bufferDepth: 4,
  clock: null,
  memoryBanks: 4,
});
const text = writeFabricJson(fabric);
const id = idSchema('fabric').parse(`fabric_${'0'.repeat(26)}`);

async function openDialog() {
  const importFabric = vi.fn<FabricCommands['import']>(async () => ok({ fabricId: id }));
  render(<ImportFabric workspace="tarnbrook" importFabric={importFabric} />);
  const user = userEvent.setup();
  await user.click(screen.getByRole('button', { name: 'Import JSON' }));
  // The form is loaded when it is first asked for.
  await screen.findByRole('textbox', { name: 'or its text' });
  const paste = (value: string) =>
    fireEvent.change(screen.getByRole('textbox', { name: 'or its text' }), { target: { value } });
  return { user, importFabric, paste };
}
const importButton = () => screen.getByRole('button', { name: 'Import this fabric' });

describe('importing a fabric', () => {
  it('shows what is in the file, and stores it only on demand', async () => {
    const { user, importFabric, paste } = await openDialog();
    expect(importButton()).toBeDisabled();
    paste(text);
    expect(screen.getByRole('heading', { name: 'Hive' })).toBeInTheDocument();
    expect(importFabric).not.toHaveBeenCalled();
    await user.click(importButton());
    expect(importFabric).toHaveBeenCalledWith({ workspace: 'tarnbrook', text });
    expect(push).toHaveBeenCalledWith(`/w/tarnbrook/fabrics/${id}`);
  });

  it('names line and column of what is wrong and offers no import', async () => {
    const { paste } = await openDialog();
    const line = text.split('\n').findIndex((row) => row.includes('"rows"')) + 1;
    paste(text.replace('"rows": 2', '"rows": "two"'));
    expect(screen.getByText(new RegExp(`^Line ${line}, column \\d+ \\(rows\\)`))).toBeInTheDocument();
    expect(importButton()).toBeDisabled();
  });

  it('refuses a link that lies outside the grid', () => {
    const outside = { ...fabric, addedLinks: [linkId(tileId(0, 0), tileId(5, 5))] };
    expect(readFabricText(writeFabricJson(outside))).toMatchObject({
      state: 'wrong',
      faults: [expect.stringContaining('outside the grid')],
    });
  });
});
