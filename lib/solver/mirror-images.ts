/**
 * Whether one placement is another one over again: mirrored, turned or shifted by a symmetry of the fabric, with
 * interchangeable ops swapped. Fabric symmetries are listed (exact/symmetry.ts); the permutation of the ops that is
 * then left is unique, and is held against the definition, so that no list of theirs is needed, however many there are.
 */
import { fabricSymmetries } from './exact/symmetry';
import type { PlacementInstance, Tiling } from './instance';

/**
 * More than a torus of `LARGEST_FABRIC_TILES` tiles has, and than the exact search uses: what that search strikes out as
 * symmetric to a placement must be an image of it here, or "no other exists" would be said too soon.
 */
const FABRIC_SYMMETRY_LIMIT = 5000;

interface DirectedLink {
  from: number;
  to: number;
  channels: number;
}

/**
 * A test for "is an image of one of these": of a placement, under one symmetry of the fabric and one of the kernel.
 * Cost of a test: for each of `placements` and each fabric symmetry, at most the instance's pairs and nets.
 */
export function imageTest(
  instance: PlacementInstance,
  links: readonly DirectedLink[],
  placements: readonly Tiling[],
): (tiling: Tiling) => boolean {
  if (placements.length === 0) return () => false;
  const images = fabricSymmetries(instance, links, FABRIC_SYMMETRY_LIMIT);
  const keepsKernel = kernelTest(instance);
  const holders = placements.map((placement) => holderTable(instance.tileCount, placement));
  const opAt = new Int32Array(instance.opCount);
  return (tiling) =>
    holders.some((holderOf) =>
      // The symmetries are a group, so that going through them is going through their inverses.
      images.some((image) => {
        for (let op = 0; op < opAt.length; op++) {
          const other = holderOf[image[tiling[op] as number] as number] as number;
          if (other < 0) return false;
          opAt[op] = other;
        }
        return keepsKernel(opAt);
      }),
    );
}

/** The op on each tile, −1 where there is none. */
function holderTable(tileCount: number, placement: Tiling): Int32Array {
  const holderOf = new Int32Array(tileCount).fill(-1);
  placement.forEach((tile, op) => {
    if (tile >= 0) holderOf[tile] = op;
  });
  return holderOf;
}

/**
 * Whether a permutation of the ops, image[op], keeps candidates, pairs (their weights for `path`) and, for `wire`,
 * nets with their weights: what costs and rules depend on.
 */
function kernelTest(instance: PlacementInstance): (image: Int32Array) => boolean {
  const { opCount, candidates, pairs, nets, objective } = instance;
  const standing = candidates.map((tiles) => tiles.join());
  const pairWeight = new Map<number, number>();
  for (const { from, to, weight } of pairs) {
    const at = from * opCount + to;
    pairWeight.set(at, objective === 'path' ? (pairWeight.get(at) ?? 0) + weight : 1);
  }
  const joinedPairs = [...pairWeight].map(([at, weight]) => ({
    from: Math.floor(at / opCount),
    to: at % opCount,
    weight,
  }));
  const netKey = (source: number, consumers: readonly number[]) =>
    `${source}>${[...new Set(consumers)].sort((a, b) => a - b).join()}`;
  const netWeights = new Map<string, number[]>();
  const counted = objective === 'wire' ? nets : [];
  for (const { source, consumers, weight } of counted) {
    const key = netKey(source, consumers);
    netWeights.set(
      key,
      [...(netWeights.get(key) ?? []), weight].sort((a, b) => a - b),
    );
  }
  const weightsAt = (key: string) => netWeights.get(key)?.join();
  return (image) => {
    const imageOf = (op: number) => image[op] as number;
    return (
      standing.every((tiles, op) => tiles === standing[imageOf(op)]) &&
      joinedPairs.every(
        ({ from, to, weight }) => pairWeight.get(imageOf(from) * opCount + imageOf(to)) === weight,
      ) &&
      counted.every(
        ({ source, consumers }) =>
          weightsAt(netKey(source, consumers)) === weightsAt(netKey(imageOf(source), consumers.map(imageOf))),
      )
    );
  };
}
