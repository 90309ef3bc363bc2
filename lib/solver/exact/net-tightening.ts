/**
 * Exact net costs for nets that the pairs under-estimate (wire objective; more than three terminals, or three off the
 * plain mesh). When one terminal of such a net is still free, its least tree for each tile of that op is known: what it
 * costs above the pairs' share is added to the op's residuals. With two free of three, the meeting tile gives the cost.
 */
import { meetingHops } from '../bounds/meeting-hops';
import { undirectedDistance } from '../bounds/pair-costs';
import type { PlacementInstance } from '../instance';
import type { JointRouter, StandingNet } from './joint-routing';
import type { Relaxation } from './relaxation';

interface LooseNet {
  /** The source first. */
  ops: readonly number[];
  weight: number;
  /** Of each undirected pair's hops, in the relaxation. */
  share: number;
}

export interface NetTightening {
  /** Adds what is now known; `tileOf` gives the tile of each placed instance op, −1 for free ones. */
  tighten(relaxation: Relaxation, placedOp: number, tileOf: Int32Array): void;
}

export function netTightening(instance: PlacementInstance, router: JointRouter | null): NetTightening {
  if (instance.objective !== 'wire' || !router) return { tighten: () => undefined };
  const loose: LooseNet[] = instance.nets
    .filter(({ consumers }) => consumers.length > 2 || (consumers.length === 2 && !instance.isPlainMesh))
    .map(({ source, consumers, weight }) => {
      const size = consumers.length + 1;
      return {
        ops: [source, ...consumers],
        weight,
        share: weight / (Math.floor(size / 2) * Math.ceil(size / 2)),
      };
    });
  const netsOf = Array.from({ length: instance.opCount }, (_, op) =>
    loose.filter((net) => net.ops.includes(op)),
  );
  const undirected = loose.length > 0 ? undirectedDistance(instance) : new Float64Array(0);
  const shareOf = ({ ops, share }: LooseNet, tileOf: (op: number) => number): number => {
    let hops = 0;
    for (let i = 0; i < ops.length; i++) {
      for (let j = i + 1; j < ops.length; j++) {
        hops += undirected[
          tileOf(ops[i] as number) * instance.tileCount + tileOf(ops[j] as number)
        ] as number;
      }
    }
    return share * hops;
  };

  const tightenLast = (relaxation: Relaxation, net: LooseNet, free: number, tileOf: Int32Array) => {
    const base = free * instance.tileCount;
    const size = relaxation.domainSize[free] as number;
    for (const tile of relaxation.domain.subarray(base, base + size)) {
      const known = relaxation.residual[base + tile] as number;
      if (known === Number.POSITIVE_INFINITY) continue;
      const place = (op: number) => (op === free ? tile : (tileOf[op] as number));
      const standing: StandingNet = { tiles: net.ops.map(place), weight: net.weight, pathWeights: [] };
      const tree = router.tree(standing);
      const more =
        tree === null ? Number.POSITIVE_INFINITY : tree.exact ? tree.cost - shareOf(net, place) : 0;
      relaxation.residual[base + tile] = known + Math.max(0, more);
    }
  };

  const meeting = meetingCosts(instance);
  const tightenTwo = (relaxation: Relaxation, net: LooseNet, free: readonly number[], tileOf: Int32Array) => {
    const [opA, opB] = [...free].sort((a, b) => a - b) as [number, number];
    const { graph, domain, domainSize, tableAt, tables } = relaxation;
    const pair = (graph.pairsOf[opA] as Int32Array).find((each) => graph.second[each] === opB);
    if (pair === undefined) return;
    const tilesOf = (op: number) => {
      const base = op * instance.tileCount;
      return domain.subarray(base, base + (domainSize[op] as number));
    };
    let entry = tableAt[pair] as number;
    for (const p of tilesOf(opA)) {
      for (const q of tilesOf(opB)) {
        const place = (op: number) => (op === opA ? p : op === opB ? q : (tileOf[op] as number));
        const [source, left, right] = net.ops.map(place) as [number, number, number];
        const more = net.weight * meeting(source, left, right) - shareOf(net, place);
        if (more > 0) tables[entry] = (tables[entry] as number) + more;
        entry++;
      }
    }
  };

  return {
    tighten(relaxation, placedOp, tileOf) {
      for (const net of netsOf[placedOp] as LooseNet[]) {
        const free = net.ops.filter((op) => (tileOf[op] as number) < 0);
        if (net.ops.length === 3) {
          if (free.length === 2) tightenTwo(relaxation, net, free, tileOf);
        } else if (free.length === 1) tightenLast(relaxation, net, free[0] as number, tileOf);
      }
    },
  };
}

/** Hops of the least tree from a source to two consumers: its paths part at some tile. Kept once computed. */
function meetingCosts({ tileCount, distance }: PlacementInstance) {
  const known = new Map<number, number>();
  return (source: number, left: number, right: number): number => {
    const key = (source * tileCount + Math.min(left, right)) * tileCount + Math.max(left, right);
    const found = known.get(key);
    if (found !== undefined) return found;
    const least = meetingHops(distance, tileCount, source, left, right);
    known.set(key, least);
    return least;
  };
}
