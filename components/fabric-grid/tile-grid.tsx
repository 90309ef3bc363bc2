'use client';

import { type KeyboardEvent, type MouseEvent, memo, type PointerEvent, useCallback, useRef } from 'react';
import type { GridSize } from '@/lib/mapping/picture/fabric-geometry';
import { pictureSize, tileBox } from '@/lib/mapping/picture/fabric-geometry';
import { gridStep } from './grid-step';

export interface TileGridProps {
  size: GridSize;
  /** What the grid is, such as "Fabric Gauge 6×6". */
  label: string;
  /** What is read out at a tile. */
  tileText: (tile: number) => string;
  /** The tile that the Tab key comes to. */
  cursor: number;
  onCursor: (tile: number) => void;
  onTile?: (tile: number) => void;
  /** Keys besides those that move the cursor; true when the key was used. */
  onTileKey?: (event: KeyboardEvent, tile: number) => boolean;
  onPoint?: (tile: number | null) => void;
  onTileDown?: (event: PointerEvent, tile: number) => void;
  isDisabled?: (tile: number) => boolean;
  isSelected?: (tile: number) => boolean;
}

/**
 * An ARIA grid of positioned boxes: a table element would lose its layout here, and the cells have no text of
 * their own but their label. Keys are handled once, at the grid.
 */
const roles = { grid: { role: 'grid' }, row: { role: 'row' }, cell: { role: 'gridcell' } } as const;

/**
 * The grid for fingers, keys and screen readers: an ARIA grid of see-through cells over the drawing, one tab stop.
 * Arrows move without wrapping; Home and End go along the row, with Ctrl to the first and last tile.
 */
export function TileGrid(props: TileGridProps) {
  const { size, label, tileText, cursor, onCursor, onTile, onTileKey, onPoint, onTileDown } = props;
  const root = useRef<HTMLDivElement>(null);
  const onKeyDown = (event: KeyboardEvent) => {
    const next = gridStep(size, cursor, event.key, event.ctrlKey || event.metaKey);
    if (next !== null) {
      event.preventDefault();
      onCursor(next);
      root.current?.querySelector<HTMLElement>(`[data-tile="${next}"]`)?.focus();
      return;
    }
    if (onTileKey?.(event, cursor)) {
      event.preventDefault();
      return;
    }
    if (onTile && (event.key === 'Enter' || event.key === ' ')) {
      event.preventDefault();
      onTile(cursor);
    }
  };
  const onClick = (event: MouseEvent) => {
    const tile = tileUnder(event.target);
    if (tile !== null) onTile?.(tile);
  };
  const onLeave = useCallback(() => onPoint?.(null), [onPoint]);
  const picture = pictureSize(size);
  const grid = {
    ...roles.grid,
    'aria-label': label,
    'aria-rowcount': size.rows,
    'aria-colcount': size.cols,
    onKeyDown,
    onClick,
    onPointerLeave: onLeave,
  };
  return (
    <div ref={root} className="absolute inset-0" {...grid}>
      {Array.from({ length: size.rows }, (_, row) => (
        <div key={row} {...roles.row} className="contents">
          {Array.from({ length: size.cols }, (_, col) => {
            const tile = row * size.cols + col;
            const box = tileBox(row, col);
            return (
              <TileCell
                key={tile}
                tile={tile}
                text={tileText(tile)}
                left={(100 * box.x) / picture.width}
                top={(100 * box.y) / picture.height}
                width={(100 * box.width) / picture.width}
                height={(100 * box.height) / picture.height}
                tabIndex={tile === cursor ? 0 : -1}
                disabled={props.isDisabled?.(tile) ?? false}
                selected={props.isSelected?.(tile) ?? false}
                onCursor={onCursor}
                onPoint={onPoint}
                onDown={onTileDown}
              />
            );
          })}
        </div>
      ))}
    </div>
  );
}

/** The tile whose cell holds an element, or null. */
export function tileUnder(target: EventTarget | null): number | null {
  const cell = target instanceof Element ? target.closest<HTMLElement>('[data-tile]') : null;
  return cell ? Number(cell.dataset.tile) : null;
}

interface TileCellProps {
  tile: number;
  text: string;
  left: number;
  top: number;
  width: number;
  height: number;
  tabIndex: number;
  disabled: boolean;
  selected: boolean;
  onCursor: (tile: number) => void;
  onPoint?: (tile: number | null) => void;
  onDown?: (event: PointerEvent, tile: number) => void;
}

const TileCell = memo(function TileCell(props: TileCellProps) {
  const { tile, text, left, top, width, height, tabIndex, disabled, selected } = props;
  const cell = {
    ...roles.cell,
    'aria-label': text,
    'aria-disabled': disabled || undefined,
    'aria-selected': selected,
    tabIndex,
    onFocus: () => {
      props.onCursor(tile);
      props.onPoint?.(tile);
    },
    onPointerEnter: () => props.onPoint?.(tile),
    onPointerDown: (event: PointerEvent) => props.onDown?.(event, tile),
  };
  return (
    <div
      data-tile={tile}
      className="absolute touch-manipulation rounded-sm outline-offset-3"
      style={{ left: `${left}%`, top: `${top}%`, width: `${width}%`, height: `${height}%` }}
      {...cell}
    />
  );
});
