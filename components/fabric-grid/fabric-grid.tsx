'use client';

import { type ReactNode, useState } from 'react';
import type { FabricGraph } from '@/lib/fabric/compile';
import type { Fabric } from '@/lib/fabric/fabric';
import { tileLabel } from '@/lib/fabric/tiles';
import { builtInLibrary, type UnitLibrary, unitSpec } from '@/lib/fabric/unit-library';
import { pictureSize, positionOf, tileBox } from '@/lib/mapping/picture/fabric-geometry';
import { FabricBeds, RouterPins } from './fabric-beds';
import { TileGrid, type TileGridProps } from './tile-grid';
import { type TileLook, TileShape } from './tile-shape';
import { unitLook } from './unit-tint';

interface FabricGridProps extends Partial<Omit<TileGridProps, 'size' | 'label'>> {
  fabric: Fabric;
  graph: FabricGraph;
  label: string;
  library?: UnitLibrary;
  /** How a tile stands out; free where not given. */
  tileLook?: (tile: number) => TileLook;
  /** Drawn between the channels' beds and the tiles (SVG, px of fabric-geometry). */
  underlay?: ReactNode;
  /** Drawn over tiles and routers. */
  overlay?: ReactNode;
  /** Width on screen in px; without it the drawing fills its place. */
  widthPx?: number;
}

const freeTile = (): TileLook => 'free';

/** The drawing of a fabric: beds, tiles by unit, router pins, and a grid of cells over it to point and act on. */
export function FabricGrid(props: FabricGridProps) {
  const { fabric, graph, label, library = builtInLibrary, tileLook = freeTile, underlay, overlay } = props;
  const [ownCursor, setOwnCursor] = useState(0);
  const size = pictureSize(fabric);
  const tileText = props.tileText ?? ((tile: number) => plainTileText(graph, library, tile));
  return (
    <div
      className="relative mx-auto max-w-full flex-none select-none"
      style={{
        width: props.widthPx ?? '100%',
        aspectRatio: `${size.width} / ${size.height}`,
        maxWidth: props.widthPx ? 'none' : size.width * 1.3,
      }}
    >
      <svg viewBox={`0 0 ${size.width} ${size.height}`} className="block size-full" aria-hidden="true">
        <FabricBeds fabric={fabric} graph={graph} />
        {underlay}
        {graph.units.map((unit, tile) => {
          const { row, col } = positionOf(fabric, tile);
          return (
            <TilePlace
              key={graph.tiles[tile]}
              row={row}
              col={col}
              unit={unit}
              library={library}
              look={tileLook(tile)}
            />
          );
        })}
        <RouterPins fabric={fabric} graph={graph} />
        {overlay}
      </svg>
      <TileGrid
        size={fabric}
        label={label}
        tileText={tileText}
        cursor={props.cursor ?? ownCursor}
        onCursor={props.onCursor ?? setOwnCursor}
        onTile={props.onTile}
        onTileKey={props.onTileKey}
        onPoint={props.onPoint}
        onTileDown={props.onTileDown}
        isDisabled={props.isDisabled}
        isSelected={props.isSelected}
      />
    </div>
  );
}

interface TilePlaceProps {
  row: number;
  col: number;
  unit: FabricGraph['units'][number];
  library: UnitLibrary;
  look: TileLook;
}

const boxes = new Map<string, ReturnType<typeof tileBox>>();
/** One and the same box object for each place, so that a tile that did not change is not drawn again. */
function boxAt(row: number, col: number) {
  const key = `${row},${col}`;
  const known = boxes.get(key) ?? tileBox(row, col);
  boxes.set(key, known);
  return known;
}

const looks = new WeakMap<UnitLibrary, Map<string, ReturnType<typeof unitLook>>>();
function lookOf(unit: FabricGraph['units'][number], library: UnitLibrary) {
  const known = looks.get(library) ?? new Map<string, ReturnType<typeof unitLook>>();
  looks.set(library, known);
  const key = unit ?? '';
  if (!known.has(key)) known.set(key, unitLook(unit, library));
  return known.get(key) ?? null;
}

function TilePlace({ row, col, unit, library, look }: TilePlaceProps) {
  return <TileShape box={boxAt(row, col)} unit={lookOf(unit, library)} look={look} place={`${row},${col}`} />;
}

/** "Row 3, column 4, Memory" for a fabric without a mapping. */
export function plainTileText(graph: FabricGraph, library: UnitLibrary, tile: number): string {
  const unit = graph.units[tile] ?? null;
  const name = unit === null ? 'router without a PE' : (unitSpec(unit, library)?.label ?? unit);
  const place = tileLabel(graph.tiles[tile] ?? '');
  return `${place.charAt(0).toUpperCase()}${place.slice(1)}, ${name}`;
}
