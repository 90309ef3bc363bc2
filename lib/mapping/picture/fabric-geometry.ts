/**
 * Where things stand in the drawing of a fabric: tiles, routers and the channels between them, in px at zoom 1.
 *
 * A tile's router is the pin at its lower right corner, where a row channel (below the row) and a column channel
 * (right of the column) meet. The screen and the exported picture draw from these numbers alike.
 */
import type { Fabric } from '../../fabric/fabric';

export const TILE_PX = 70;
export const CHANNEL_PX = 34;
export const PITCH_PX = TILE_PX + CHANNEL_PX;
/** Room around the grid; wrap links of a torus run out into it. */
export const MARGIN_PX = 16;
/** Threads keep this far from the middle of their channel at most. */
export const LANE_REACH_PX = CHANNEL_PX / 2 - 3;

export interface Point {
  x: number;
  y: number;
}

export interface Box extends Point {
  width: number;
  height: number;
}

export type GridSize = Pick<Fabric, 'rows' | 'cols'>;

export const tileBox = (row: number, col: number): Box => ({
  x: MARGIN_PX + col * PITCH_PX,
  y: MARGIN_PX + row * PITCH_PX,
  width: TILE_PX,
  height: TILE_PX,
});

/** The middle of the row channel below a row. */
export const rowChannelY = (row: number): number => MARGIN_PX + row * PITCH_PX + TILE_PX + CHANNEL_PX / 2;
/** The middle of the column channel right of a column. */
export const columnChannelX = (col: number): number => MARGIN_PX + col * PITCH_PX + TILE_PX + CHANNEL_PX / 2;

export const routerPoint = (row: number, col: number): Point => ({
  x: columnChannelX(col),
  y: rowChannelY(row),
});

export const pictureSize = ({ rows, cols }: GridSize): { width: number; height: number } => ({
  width: 2 * MARGIN_PX + cols * PITCH_PX,
  height: 2 * MARGIN_PX + rows * PITCH_PX,
});

/** Row and column of a tile index, which counts row by row. */
export const positionOf = ({ cols }: GridSize, tileIndex: number): { row: number; col: number } => ({
  row: Math.floor(tileIndex / cols),
  col: tileIndex % cols,
});
