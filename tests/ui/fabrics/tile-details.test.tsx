import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it } from 'vitest';
import { FabricView } from '@/components/fabric-view/fabric-view';
import { tileFacts } from '@/components/fabric-view/tile-facts';
import { compileFabric } from '@/lib/fabric/compile';
import type { Fabric } from '@/lib/fabric/fabric';
import { newFabric, unitMixPatterns } from '@/lib/fabric/presets';
import { linkId, tileId } from '@/lib/fabric/tiles';
import { builtInLibrary } from '@/lib/fabric/unit-library';

const [mix] = unitMixPatterns;
if (!mix) throw new Error('there is no unit mix');
const mesh: Fabric = newFabric({
  name: 'Hive',
  rows: 3,
  cols: 3,
  topology: 'mesh',
  mix,
  channels: 1,
  bufferDepth: 4,
  clock: { periodPs: 1000, entryDelayPs: 100, hopDelayPs: 200 },
  memoryBanks: 4,
});

describe('what is told about a tile', () => {
  it('lists a corner’s two neighbours, and a missing way back as one way', () => {
    const broken = { ...mesh, removedLinks: [linkId(tileId(0, 1), tileId(0, 0))] };
    expect(tileFacts(compileFabric(broken), builtInLibrary, 0).neighbours).toEqual([
      { tile: 1, place: 'row 0, column 1', channelsTo: 1, channelsFrom: null },
      { tile: 3, place: 'row 1, column 0', channelsTo: 1, channelsFrom: 1 },
    ]);
  });

  it('says that a tile without a unit only routes', () => {
    const facts = tileFacts(compileFabric({ ...mesh, units: mesh.units.map(() => null) }), builtInLibrary, 4);
    expect(facts).toMatchObject({ unit: null, unitLabel: null, operations: [] });
    expect(facts.neighbours).toHaveLength(4);
  });
});

describe('the fabric’s page', () => {
  const show = (fabric: Fabric) =>
    render(<FabricView workspace="tarnbrook" fabricId="fabric_1" fabric={fabric} versions={[]} />);
  const tile = () => screen.getByRole('region', { name: 'Tile' });

  it('follows the arrow keys through the grid', async () => {
    const user = userEvent.setup();
    show(mesh);
    expect(within(tile()).getByText('Row 0, column 0')).toBeInTheDocument();
    await user.click(screen.getByRole('gridcell', { name: /^Row 1, column 1/ }));
    expect(within(tile()).getByText('Row 1, column 1')).toBeInTheDocument();
    expect(within(tile()).getAllByText('both ways, 1 channel')).toHaveLength(4);
    screen.getByRole('gridcell', { name: /^Row 1, column 1/ }).focus();
    await user.keyboard('{ArrowDown}{ArrowRight}');
    expect(within(tile()).getByText('Row 2, column 2')).toBeInTheDocument();
  });

  it('shows the clock’s formula: floor((1,000 − 100) / 200) = 4', () => {
    show(mesh);
    expect(screen.getByText('floor((1,000 − 100) / 200) = 4')).toBeInTheDocument();
  });

  it('flags routers that cannot reach each other', () => {
    const corner = tileId(0, 0);
    const cut = [tileId(0, 1), tileId(1, 0)].flatMap((other) => [
      linkId(corner, other),
      linkId(other, corner),
    ]);
    show({ ...mesh, removedLinks: cut });
    // 9 routers, one alone: 2 · 8 ordered pairs are apart.
    expect(screen.getByText(/fall into 2 parts/)).toHaveTextContent('16 ordered pairs have no path');
  });

  it('zooms by buttons and by keys, and goes back to fitted', async () => {
    const user = userEvent.setup();
    show(mesh);
    const level = () => within(screen.getByRole('toolbar', { name: 'View' })).getByRole('status').textContent;
    expect(level()).toBe('fitted');
    await user.click(screen.getByRole('button', { name: 'Zoom in' }));
    expect(level()).toBe('125 %');
    screen.getByRole('gridcell', { name: /^Row 0, column 0/ }).focus();
    await user.keyboard('-');
    expect(level()).toBe('100 %');
    await user.keyboard('0');
    expect(level()).toBe('fitted');
  });
});
