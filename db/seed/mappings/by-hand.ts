/** Placements that a person made: op by op, without the solver. Routes are the router's, made when they are written. */
import { compileFabric } from '../../../lib/fabric/compile';
import { tileIdSchema } from '../../../lib/fabric/fabric';
import { opId } from '../../../lib/graph/ids';
import type { Pins, Placement } from '../../../lib/mapping/mapping';
import { routePlacement } from '../../../lib/solver/routing/route-nets';
import { demoFabrics } from '../fabrics/index';
import { demoKernels } from '../kernels/index';
import type { DemoMapping } from './demo-mapping';

type Tiles = Readonly<Record<string, string>>;

const tilesOf = (tiles: Tiles): Placement =>
  Object.fromEntries(Object.entries(tiles).map(([op, tile]) => [opId(`op_${op}`), tileIdSchema.parse(tile)]));

function byHand(
  head: Pick<DemoMapping, 'name' | 'kernelSlug' | 'fabricKey' | 'madeBy' | 'kept'>,
  tiles: Tiles,
  pinned: Tiles = {},
): DemoMapping {
  const kernel = demoKernels.find((each) => each.slug === head.kernelSlug)!.kernel;
  const fabric = demoFabrics.find((each) => each.key === head.fabricKey)!.fabric;
  const placement = tilesOf(tiles);
  const pins: Pins = tilesOf(pinned);
  const { routes } = routePlacement(kernel, compileFabric(fabric), placement);
  return { ...head, placement, pins, routes, provenance: { by: 'hand' } };
}

export const mappingsByHand: readonly DemoMapping[] = [
  byHand(
    {
      name: 'Scale and clamp, straight down',
      kernelSlug: 'scale-and-clamp',
      fabricKey: 'gauge',
      madeBy: 'compiler',
      kept: true,
    },
    { raw: 'r1c3', gain: 'r1c2', offset: 'r2c2', range: 'r2c1', level: 'r2c0' },
  ),
  byHand(
    {
      name: 'Running volume, flow at the right',
      kernelSlug: 'running-volume',
      fabricKey: 'gauge',
      madeBy: 'architect',
      kept: true,
    },
    { flow: 'r2c3', no_backflow: 'r2c2', volume: 'r2c1', scale: 'r1c1', log: 'r1c0' },
    { flow: 'r2c3' },
  ),
  byHand(
    {
      name: 'Wavelet step, first try',
      kernelSlug: 'wavelet-step',
      fabricKey: 'hive',
      madeBy: 'compiler',
      kept: true,
    },
    {
      even: 'r2c0',
      odd: 'r3c0',
      next_even: 'r1c0',
      even_pair: 'r2c1',
      predict: 'r2c2',
      detail: 'r3c2',
      previous_detail: 'r3c3',
      detail_pair: 'r3c4',
      round: 'r2c3',
      update: 'r1c3',
      smooth: 'r1c1',
      d_n: 'r4c0',
      s_n: 'r0c0',
    },
  ),
  byHand(
    {
      name: 'Tilt direction, loads placed',
      kernelSlug: 'tilt-direction',
      fabricKey: 'slope',
      madeBy: 'architect',
      kept: false,
    },
    { tilt_x: 'r4c0', x: 'r4c1', tilt_y: 'r6c0', x_y: 'r5c0', x_y2: 'r6c1', size_log: 'r2c0' },
    { tilt_x: 'r4c0', tilt_y: 'r6c0' },
  ),
];
