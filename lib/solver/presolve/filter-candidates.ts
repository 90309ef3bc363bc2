/**
 * Strikes tiles out of the ops' candidates that no legal mapping can use:
 *
 * - **inputs, output**: a tile with fewer incoming channels than the op has producers, or without an outgoing link for an
 *   op that feeds others. Every net that enters a tile takes a channel of its own there (R6).
 * - **reach**: a tile from which some neighbour's candidates are all out of reach (R7): arc consistency (Mackworth 1977).
 * - **taken**: tiles that as many ops as tiles need for themselves, one op on its only tile to begin with (Hall 1935).
 *
 * Repeated until nothing changes, or until the work limit; what is struck out by then is struck out rightly.
 * Precondition: the instance is the graph's. Postcondition: every legal mapping stands on the candidates that are left.
 * Cost: channels ops × tiles; reach at most two looks at every link for each different set of candidates.
 */
import type { LinkGraph } from '../../fabric/link-graph';
import type { PlacementInstance } from '../instance';
import { channelCounts } from './channel-counts';
import { fullSets } from './full-sets';
import { type TileSetId, type TileSets, tileSets } from './tile-sets';
import { type ReachSide, type TilesInReach, tilesInReach } from './tiles-in-reach';

export type LossRule = 'inputs' | 'output' | 'reach' | 'taken';

/** Tiles that one rule struck out of an op's candidates, and ops that it is because of. */
export interface Loss {
  rule: LossRule;
  tileCount: number;
  /** Neighbours out of reach; ops that need the tiles for themselves, where the op has lost all. */
  because: number[];
}

export interface FilteredCandidates {
  candidates: readonly (readonly number[])[];
  /** Knows the candidates already. */
  sets: TileSets;
  /** Tiles struck out, over all ops. */
  struckOut: number;
  /** By op, one entry a rule. */
  losses: ReadonlyMap<number, readonly Loss[]>;
  /** An op that has lost all its tiles; the filter ends at the first one. */
  emptied: number | null;
}

/** Looks at links and comparisons of sets: about a tenth of a second. */
const WORK_LIMIT = 1e7;
/** Ops that one step names as its cause: enough for a sentence. */
const NAMED_OPS = 8;

export function filterCandidates(
  instance: PlacementInstance,
  graph: Pick<LinkGraph, 'links' | 'outLinks' | 'inLinks'>,
  workLimit = WORK_LIMIT,
): FilteredCandidates {
  const filter = newFilter(instance, graph);
  const { domains, sets } = filter;
  strikeByChannels(filter, instance, graph);
  let work = 0;
  const hasWork = () => filter.emptied < 0 && work + filter.reach.steps() < workLimit;
  do {
    spreadReach(filter, hasWork);
    work += hasWork() ? strikeTaken(filter) : 0;
  } while (filter.changed.size > 0 && hasWork());
  if (filter.emptied >= 0) nameTakers(filter, instance);
  const counts = domains.map((set) => sets.count(set));
  return {
    candidates: domains.map((set) => sets.tiles(set)),
    sets,
    struckOut: instance.candidates.reduce((sum, tiles, op) => sum + tiles.length - (counts[op] as number), 0),
    losses: filter.losses,
    emptied: filter.emptied < 0 ? null : filter.emptied,
  };
}

/** Who has taken the tiles of the op without any: only looked for here. */
function nameTakers({ sets, domains, losses, owners, emptied }: Filter, instance: PlacementInstance): void {
  const taken = losses.get(emptied)?.find((loss) => loss.rule === 'taken');
  if (!taken) return;
  const once = sets.bits(sets.of(instance.candidates[emptied] ?? []));
  const takers = [...owners].filter((op) => sets.parted(domains[op] as TileSetId, once).within);
  taken.because = takers.slice(0, NAMED_OPS);
}

interface Filter {
  sets: TileSets;
  reach: TilesInReach;
  /** The candidates that each op has left. */
  domains: TileSetId[];
  neighbours: { other: number; side: ReachSide }[][];
  /** Ops whose neighbours have to be looked at. */
  changed: Set<number>;
  losses: Map<number, Loss[]>;
  /** Ops that have taken tiles from others. */
  owners: Set<number>;
  /** The first op without a tile, or −1. */
  emptied: number;
}

function newFilter(
  instance: PlacementInstance,
  graph: Pick<LinkGraph, 'links' | 'outLinks' | 'inLinks'>,
): Filter {
  const sets = tileSets(instance.tileCount);
  const neighbours: Filter['neighbours'] = instance.candidates.map(() => []);
  for (const { from, to } of instance.pairs) {
    neighbours[from]?.push({ other: to, side: 'after' });
    neighbours[to]?.push({ other: from, side: 'before' });
  }
  return {
    sets,
    reach: tilesInReach(sets, graph, instance.maxHops),
    domains: instance.candidates.map((tiles) => sets.of(tiles)),
    neighbours,
    changed: new Set(instance.candidates.keys()),
    losses: new Map(),
    owners: new Set(),
    emptied: -1,
  };
}

function narrow(filter: Filter, op: number, left: TileSetId, rule: LossRule, because: readonly number[]) {
  const { sets, domains, losses } = filter;
  const before = domains[op] as TileSetId;
  if (left === before) return;
  const tileCount = sets.count(before) - sets.count(left);
  domains[op] = left;
  filter.changed.add(op);
  if (sets.count(left) === 0 && filter.emptied < 0) filter.emptied = op;
  const own = losses.get(op) ?? [];
  losses.set(op, own);
  const known = own.find((loss) => loss.rule === rule);
  if (!known) own.push({ rule, tileCount, because: because.slice(0, NAMED_OPS) });
  else {
    known.tileCount += tileCount;
    known.because = [...new Set([...known.because, ...because.slice(0, NAMED_OPS)])];
  }
}

function strikeByChannels(
  filter: Filter,
  instance: PlacementInstance,
  graph: Pick<LinkGraph, 'links'>,
): void {
  const { sets, domains } = filter;
  const { into, outOf } = channelCounts(graph, instance.tileCount);
  const producers = new Int32Array(instance.opCount);
  const feeds = new Uint8Array(instance.opCount);
  for (const { source, consumers } of instance.nets) {
    feeds[source] = consumers.length > 0 ? 1 : 0;
    for (const consumer of consumers) producers[consumer] = (producers[consumer] as number) + 1;
  }
  /** Tiles with at least so many channels: few different numbers of producers occur. */
  const withAtLeast = new Map<string, TileSetId>();
  const tilesWith = (channels: Int32Array, least: number, key: string): TileSetId => {
    const made =
      withAtLeast.get(key) ?? sets.of([...channels.keys()].filter((t) => (channels[t] as number) >= least));
    withAtLeast.set(key, made);
    return made;
  };
  for (let op = 0; op < instance.opCount; op++) {
    const needed = producers[op] as number;
    const entered = tilesWith(into, needed, `in ${needed}`);
    narrow(filter, op, sets.and(domains[op] as TileSetId, entered), 'inputs', []);
    if (feeds[op] === 0) continue;
    const left = tilesWith(outOf, 1, 'out');
    narrow(filter, op, sets.and(domains[op] as TileSetId, left), 'output', []);
  }
}

/** Takes ops whose candidates changed one by one, and strikes out what their neighbours cannot use any more. */
function spreadReach(filter: Filter, hasWork: () => boolean): void {
  const { changed, domains, neighbours, reach, sets } = filter;
  for (const op of changed) {
    if (!hasWork()) return;
    changed.delete(op);
    for (const { other, side } of neighbours[op] ?? []) {
      const near = reach.of(domains[op] as TileSetId, side);
      narrow(filter, other, sets.and(domains[other] as TileSetId, near), 'reach', [op]);
    }
  }
}

/**
 * Where as many ops as tiles have candidates within a set, the set is theirs. Looked at: the candidates of each op, and
 * all only tiles together. Returns the comparisons made.
 */
function strikeTaken(filter: Filter): number {
  const { sets, domains } = filter;
  const opsBySet = new Map<TileSetId, number[]>();
  domains.forEach((set, op) => {
    const ops = opsBySet.get(set);
    if (ops) ops.push(op);
    else opsBySet.set(set, [op]);
  });
  const full = fullSets(sets, opsBySet, domains.length);
  for (const [set, ops] of opsBySet) {
    for (const { taken, owners } of full) {
      if (sets.isWithin(set, taken)) continue;
      for (const owner of owners) filter.owners.add(owner);
      for (const op of ops) narrow(filter, op, sets.without(domains[op] as TileSetId, taken), 'taken', []);
    }
  }
  return opsBySet.size * (opsBySet.size + full.length);
}
