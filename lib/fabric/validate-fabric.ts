/** What is wrong with a fabric document beyond its schema: links and units that mean nothing, parts that fall apart. */
import { compileFabric } from './compile';
import type { Fabric, LinkId, TileId } from './fabric';
import { maxHops } from './max-hops';
import { strongParts } from './strong-parts';
import { parseLink, parseTile, tileId, tileLabel } from './tiles';
import { presetNeighbours } from './topology';
import { builtInLibrary, type UnitLibrary } from './unit-library';

export type FabricProblemCode =
  | 'linkOutside'
  | 'selfLink'
  | 'addedLinkExists'
  | 'removedLinkAbsent'
  | 'linkRepeated'
  | 'channelsOfAbsentLink'
  | 'unknownUnit'
  | 'noUnits'
  | 'disconnected'
  | 'noHopsInPeriod';

export interface FabricProblem {
  severity: 'error' | 'warning';
  code: FabricProblemCode;
  message: string;
  tileIds: TileId[];
  linkIds: LinkId[];
}

/** Every problem, errors first. A fabric without errors can be placed on; warnings say what may surprise. */
export function validateFabric(fabric: Fabric, library: UnitLibrary = builtInLibrary): FabricProblem[] {
  const links = checkLinks(fabric);
  const found = [...links, ...checkUnits(fabric, library), ...checkClock(fabric)];
  if (links.every((problem) => problem.code !== 'linkOutside')) found.push(...checkParts(fabric));
  return [
    ...found.filter((problem) => problem.severity === 'error'),
    ...found.filter((problem) => problem.severity === 'warning'),
  ];
}

const error = (code: FabricProblemCode, message: string, linkIds: LinkId[], tileIds: TileId[] = []) =>
  ({ severity: 'error', code, message, tileIds, linkIds }) satisfies FabricProblem;

function linkLabel(link: LinkId): string {
  const ends = parseLink(link);
  return ends ? `${tileLabel(ends.from)} to ${tileLabel(ends.to)}` : `"${link}"`;
}

/** The links of the document's preset as a question; a link outside the grid is never one. */
function presetTest(fabric: Fabric): (link: LinkId) => boolean {
  const { topology, rows, cols } = fabric;
  return (link) => {
    const ends = parseLink(link);
    const from = ends && parseTile(ends.from);
    const to = ends && parseTile(ends.to);
    if (!from || !to || isOutside(fabric, link)) return false;
    return presetNeighbours(topology, rows, cols, from.row, from.col).includes(to.row * cols + to.col);
  };
}

function isOutside(fabric: Fabric, link: LinkId): boolean {
  const ends = parseLink(link);
  return [ends?.from, ends?.to].some((tile) => {
    const at = tile === undefined ? null : parseTile(tile);
    return at === null || at.row >= fabric.rows || at.col >= fabric.cols;
  });
}

function checkLinks(fabric: Fabric): FabricProblem[] {
  const problems: FabricProblem[] = [];
  const inPreset = presetTest(fabric);
  const removed = new Set(fabric.removedLinks);
  const added = new Set(fabric.addedLinks);
  const named = [...fabric.removedLinks, ...fabric.addedLinks, ...channelLinks(fabric)];
  for (const link of new Set(named.filter((id) => isOutside(fabric, id)))) {
    const size = `${fabric.rows} rows and ${fabric.cols} columns`;
    problems.push(
      error('linkOutside', `The link ${linkLabel(link)} lies outside the grid of ${size}. Remove it.`, [
        link,
      ]),
    );
  }
  for (const link of added) {
    const ends = parseLink(link);
    if (isOutside(fabric, link) || !ends) continue;
    if (ends.from === ends.to) {
      const text = `The added link at ${tileLabel(ends.from)} leads back to its own router. Remove it.`;
      problems.push(error('selfLink', text, [link]));
    } else if (inPreset(link) && !removed.has(link)) {
      const text = `The added link ${linkLabel(link)} is part of the ${fabric.topology} already. Remove it, or give that link more channels.`;
      problems.push(error('addedLinkExists', text, [link]));
    }
  }
  for (const link of removed) {
    if (isOutside(fabric, link) || inPreset(link)) continue;
    const text = `The removed link ${linkLabel(link)} is not part of the ${fabric.topology}. Take it off the list.`;
    problems.push(error('removedLinkAbsent', text, [link]));
  }
  for (const link of new Set([...repeated(fabric.addedLinks), ...repeated(fabric.removedLinks)])) {
    const text = `The link ${linkLabel(link)} stands twice in one list. Keep it once.`;
    problems.push(error('linkRepeated', text, [link]));
  }
  for (const link of channelLinks(fabric)) {
    const present = added.has(link) || (inPreset(link) && !removed.has(link));
    if (isOutside(fabric, link) || present) continue;
    const text = `Channels are set for the link ${linkLabel(link)}, which the fabric does not have.`;
    problems.push(error('channelsOfAbsentLink', text, [link]));
  }
  return problems;
}

const channelLinks = (fabric: Fabric): LinkId[] => Object.keys(fabric.linkChannels) as LinkId[];

function repeated(links: readonly LinkId[]): LinkId[] {
  const seen = new Set<LinkId>();
  return links.filter((link) => seen.size === seen.add(link).size);
}

function checkUnits(fabric: Fabric, library: UnitLibrary): FabricProblem[] {
  const problems: FabricProblem[] = [];
  const unknown = new Map<string, TileId[]>();
  fabric.units.forEach((unit, i) => {
    if (unit === null || library.has(unit)) return;
    const tile = tileId(Math.floor(i / fabric.cols), i % fabric.cols);
    unknown.set(unit, [...(unknown.get(unit) ?? []), tile]);
  });
  for (const [unit, tiles] of unknown) {
    const where = tiles.length === 1 ? tileLabel(tiles[0] ?? '') : `${tiles.length} tiles`;
    const text = `The unit ${unit} at ${where} is not in the unit library. Add it there, or paint another unit.`;
    problems.push(error('unknownUnit', text, [], tiles));
  }
  if (fabric.units.every((unit) => unit === null)) {
    const text = 'No tile has a PE, so nothing can be placed here. Paint at least one unit.';
    problems.push(error('noUnits', text, []));
  }
  return problems;
}

function checkClock(fabric: Fabric): FabricProblem[] {
  if (maxHops(fabric) !== 0) return [];
  const text =
    'The clock period leaves no time for a single hop: only an op that feeds itself would work. Lengthen the period.';
  return [{ severity: 'warning', code: 'noHopsInPeriod', message: text, tileIds: [], linkIds: [] }];
}

/** A warning for every part but the largest that has PEs and cannot exchange values with the largest both ways. */
function checkParts(fabric: Fabric): FabricProblem[] {
  const parts = strongParts(compileFabric(fabric));
  const largest = parts.reduce((best, part) => (part.length > best.length ? part : best), parts[0] ?? []);
  const tileOf = (i: number): TileId => tileId(Math.floor(i / fabric.cols), i % fabric.cols);
  return parts
    .filter((part) => part !== largest && part.some((i) => fabric.units[i] != null))
    .map((part) => {
      const where = part.length === 1 ? tileLabel(tileOf(part[0] ?? 0)) : `${part.length} tiles`;
      return {
        severity: 'warning',
        code: 'disconnected',
        message: `No path leads from the rest of the fabric to ${where} and back. Add links, or leave these PEs unused.`,
        tileIds: part.map(tileOf),
        linkIds: [],
      };
    });
}
