/** The verifier's rules on routes, R5 to R7. See `verifyMapping`. */
import type { Fabric, LinkId, TileId } from '../fabric/fabric';
import { maxHops } from '../fabric/max-hops';
import { tileLabel } from '../fabric/tiles';
import type { Edge, EdgeId, Kernel, Op, OpId } from '../graph/kernel';
import type { Placement, Routes } from './mapping';
import { type LinkTest, linkTest, tileInFabric } from './verify-links';
import { opName, type Violation } from './violation';

/** One source with its connections, as the verifier counts them: by itself, from the edges. */
interface Connections {
  op: Op;
  edges: Edge[];
}

interface Walk {
  /** Hops from the source's router to every router that the route reaches. */
  hops: ReadonlyMap<string, number>;
  violations: Violation[];
}

/** R5, R6 and R7 of a mapping. Connections with an unplaced end are R1's matter and are passed over. */
export function verifyRoutes(
  kernel: Kernel,
  fabric: Fabric,
  placement: Placement,
  routes: Routes,
): Violation[] {
  const links = linkTest(fabric);
  const sources = connectionsBySource(kernel);
  const names = new Map<string, string>(kernel.ops.map((op) => [op.id, opName(op)]));
  const limit = maxHops(fabric);
  const trees: Violation[] = [];
  const lengths: Violation[] = [];
  for (const [id, route] of Object.entries(routes) as [OpId, LinkId[]][]) {
    if (!sources.has(id) && route.length > 0) trees.push(strayRoute(id, names.get(id), route));
  }
  for (const { op, edges } of sources.values()) {
    const source = placement[op.id];
    const route = routes[op.id] ?? [];
    if (source === undefined || tileInFabric(fabric, source) === null) {
      if (route.length > 0) trees.push(unplacedRoute(op, route));
      continue;
    }
    const ends = edges.filter((edge) => placement[edge.to] !== undefined);
    const walk = walkRoute(
      op,
      source,
      route,
      new Set(ends.map((edge) => placement[edge.to] ?? source)),
      links,
    );
    trees.push(...walk.violations);
    for (const edge of ends) {
      const consumer = names.get(edge.to) ?? edge.to;
      const hops = walk.hops.get(placement[edge.to] ?? source);
      if (hops === undefined) trees.push(notReached(op, edge, consumer, placement));
      else if (limit !== null && hops > limit) lengths.push(tooLong(op, edge, consumer, hops, limit, route));
    }
  }
  return [...trees, ...checkChannels(routes, links, names), ...lengths];
}

function connectionsBySource(kernel: Kernel): Map<OpId, Connections> {
  const sources = new Map<OpId, Connections>();
  const ops = new Map(kernel.ops.map((op) => [op.id, op]));
  for (const edge of kernel.edges) {
    const op = ops.get(edge.from);
    if (!op || edge.from === edge.to) continue;
    const found = sources.get(op.id);
    if (found) found.edges.push(edge);
    else sources.set(op.id, { op, edges: [edge] });
  }
  return sources;
}

/** Walks a route from the source's router and reports whatever keeps it from being a tree (R5). */
function walkRoute(
  op: Op,
  source: TileId,
  route: readonly LinkId[],
  consumerTiles: ReadonlySet<string>,
  links: LinkTest,
): Walk {
  const violations: Violation[] = [];
  const report = (message: string, linkIds: LinkId[]) =>
    violations.push(broken(`The route of ${opName(op)} ${message}`, op.id, linkIds));
  const leaving = new Map<string, { id: LinkId; to: string }[]>();
  const entering = new Map<string, LinkId[]>();
  const seen = new Set<LinkId>();
  for (const id of route) {
    const ends = links.ends(id);
    if (seen.has(id)) report(`names the link ${linkLabel(id)} twice`, [id]);
    else if (ends === null) report(`takes the link ${linkLabel(id)}, which the fabric does not have`, [id]);
    else {
      push(leaving, ends.from, { id, to: ends.to });
      push(entering, ends.to, id);
    }
    seen.add(id);
  }
  for (const [tile, ids] of entering) {
    if (tile === source) report(`comes back to its source at ${tileLabel(tile)}`, ids);
    else if (ids.length > 1) report(`enters the router at ${tileLabel(tile)} ${ids.length} times`, ids);
  }
  const hops = reach(source, leaving);
  const apart = [...entering].filter(([tile]) => !hops.has(tile)).flatMap(([, ids]) => ids);
  if (apart.length > 0) {
    report(`has links that its source does not lead to: ${apart.map(linkLabel).join('; ')}`, apart);
  }
  for (const [tile, ids] of entering) {
    if (!hops.has(tile) || leaving.has(tile) || consumerTiles.has(tile)) continue;
    report(`has a loose end at ${tileLabel(tile)}, where no consumer is`, ids);
  }
  return { hops, violations };
}

function push<V>(map: Map<string, V[]>, key: string, value: V): void {
  const list = map.get(key);
  if (list) list.push(value);
  else map.set(key, [value]);
}

function reach(source: string, leaving: ReadonlyMap<string, readonly { to: string }[]>): Map<string, number> {
  const hops = new Map<string, number>([[source, 0]]);
  let front = [source];
  for (let count = 1; front.length > 0; count++) {
    const next: string[] = [];
    for (const tile of front) {
      for (const { to } of leaving.get(tile) ?? []) {
        if (hops.has(to)) continue;
        hops.set(to, count);
        next.push(to);
      }
    }
    front = next;
  }
  return hops;
}

/** R6. Every route counts, also one that R5 refuses; a link that a route names twice counts once. */
function checkChannels(routes: Routes, links: LinkTest, names: ReadonlyMap<string, string>): Violation[] {
  const users = new Map<LinkId, OpId[]>();
  for (const [id, route] of Object.entries(routes) as [OpId, LinkId[]][]) {
    for (const link of new Set(route)) push(users as Map<string, OpId[]>, link, id);
  }
  const found: Violation[] = [];
  for (const [link, opIds] of users) {
    const ends = links.ends(link);
    const channels = links.channels(link);
    if (ends === null || opIds.length <= channels) continue;
    const who = opIds.map((id) => names.get(id) ?? id).join(', ');
    const room = channels === 1 ? '1 channel' : `${channels} channels`;
    found.push({
      rule: 'R6',
      message: `The link ${linkLabel(link)} has ${room} but carries ${opIds.length} nets: ${who}`,
      opIds,
      tileIds: [ends.from as TileId, ends.to as TileId],
      linkIds: [link],
    });
  }
  return found;
}

function linkLabel(link: string): string {
  const [from, to] = link.split('>');
  return from !== undefined && to !== undefined ? `${tileLabel(from)} to ${tileLabel(to)}` : `"${link}"`;
}

const broken = (message: string, op: OpId, linkIds: LinkId[]): Violation => ({
  rule: 'R5',
  message,
  opIds: [op],
  tileIds: [],
  linkIds,
});

const strayRoute = (id: OpId, name: string | undefined, route: LinkId[]): Violation =>
  broken(
    name === undefined
      ? `A route is given for ${id}, which the kernel does not have`
      : `A route is given for ${name}, which feeds no other op`,
    id,
    [...route],
  );

const unplacedRoute = (op: Op, route: readonly LinkId[]): Violation =>
  broken(`A route is given for ${opName(op)}, which is not placed on the fabric`, op.id, [...route]);

function notReached(op: Op, edge: Edge, consumer: string, placement: Placement): Violation {
  const tile = placement[edge.to];
  const where = tile === undefined ? '' : ` at ${tileLabel(tile)}`;
  return {
    rule: 'R5',
    message: `The route of ${opName(op)} does not reach ${consumer}${where}`,
    opIds: [op.id, edge.to],
    tileIds: tile === undefined ? [] : [tile],
    linkIds: [],
    edgeIds: [edge.id],
  };
}

function tooLong(
  op: Op,
  edge: Edge,
  consumer: string,
  hops: number,
  limit: number,
  route: readonly LinkId[],
): Violation {
  const edgeIds: EdgeId[] = [edge.id];
  return {
    rule: 'R7',
    message: `${opName(op)} to ${consumer} takes ${hops} hops; the clock allows ${limit}`,
    opIds: [op.id, edge.to],
    tileIds: [],
    linkIds: [...route],
    edgeIds,
  };
}
