/** Names of tiles and links, and back. The only place where their brands are given. */
import type { LinkId, TileId } from './fabric';

export interface TilePosition {
  row: number;
  col: number;
}

const TILE = /^r(0|[1-9]\d?)c(0|[1-9]\d?)$/;

/** The name of the tile in a row and column, both counted from 0 at the top left, at most 99. */
export function tileId(row: number, col: number): TileId {
  if (!isSide(row) || !isSide(col)) throw new RangeError(`No tile has row ${row}, column ${col}`);
  return `r${row}c${col}` as TileId;
}

const isSide = (value: number): boolean => Number.isInteger(value) && value >= 0 && value <= 99;

/** Row and column of a tile's name, or null where the text is no such name. */
export function parseTile(text: string): TilePosition | null {
  const match = TILE.exec(text);
  return match ? { row: Number(match[1]), col: Number(match[2]) } : null;
}

/** Row and column of a tile. Throws on a text that is no tile's name; see `parseTile` for doubtful text. */
export function tileAt(tile: TileId): TilePosition {
  const position = parseTile(tile);
  if (!position) throw new RangeError(`"${tile}" is not a tile's name`);
  return position;
}

/** The name of the directed link from one tile's router to another's. */
export const linkId = (from: TileId, to: TileId): LinkId => `${from}>${to}` as LinkId;

/** The two tiles in a link's name, or null where the text is no such name. */
export function parseLink(text: string): { from: TileId; to: TileId } | null {
  const [from, to, ...rest] = text.split('>');
  if (from === undefined || to === undefined || rest.length > 0) return null;
  return TILE.test(from) && TILE.test(to) ? { from: from as TileId, to: to as TileId } : null;
}

/** The tiles a link leaves and enters. Throws on a text that is no link's name. */
export function linkEnds(link: LinkId): { from: TileId; to: TileId } {
  const ends = parseLink(link);
  if (!ends) throw new RangeError(`"${link}" is not a link's name`);
  return ends;
}

/** How a tile is called in texts for people, counted from 0 as in its name: `r2c3` is "row 2, column 3". */
export function tileLabel(tile: string): string {
  const position = parseTile(tile);
  return position ? `row ${position.row}, column ${position.col}` : `"${tile}"`;
}
