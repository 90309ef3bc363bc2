/** A mapping as a picture of its own: title, fabric with ops and threads, figures and the caution. */
import { compileFabric, type FabricGraph } from '../../fabric/compile';
import type { Fabric } from '../../fabric/fabric';
import { builtInLibrary, type UnitLibrary, unitSpec } from '../../fabric/unit-library';
import type { Kernel } from '../../graph/kernel';
import type { MappingDocument } from '../mapping';
import { type MappingMetrics, measureMapping } from '../metrics';
import { channelBars } from './channel-bars';
import { consumerHops, knotPlaces, opOnTile } from './consumer-hops';
import { pictureSize, positionOf, routerPoint, TILE_PX, tileBox } from './fabric-geometry';
import { labelLines, shortName } from './op-label';
import { picturePalette as palette, threadHex, tileTint } from './picture-palette';
import { element, textElement } from './svg-text';
import { threadPath } from './thread-path';
import { threadStyle } from './thread-style';
import { weaveThreads } from './threads';
import { tileMarks } from './tile-marks';

export const PICTURE_CAUTION = 'Estimates; sign-off figures come from the implementation flow.';
const SANS = 'Source Sans 3, sans-serif';
/** The half-bold face has a family of its own in the shipped files. */
const BOLD = 'Source Sans 3 SemiBold, Source Sans 3, sans-serif';
const MONO = 'JetBrains Mono, monospace';
const HEAD_PX = 74;
const FOOT_PX = 66;
const SIDE_PX = 24;
const NARROWEST_PX = 560;

/** The picture's SVG text. Its fonts are named, not held: who draws it elsewhere may see others. */
export function mappingSvg(
  mapping: MappingDocument,
  kernel: Kernel,
  fabric: Fabric,
  library: UnitLibrary = builtInLibrary,
): string {
  const graph = compileFabric(fabric);
  const metrics = measureMapping(kernel, graph, mapping);
  const grid = pictureSize(fabric);
  const width = Math.max(grid.width + 2 * SIDE_PX, NARROWEST_PX);
  const height = grid.height + HEAD_PX + FOOT_PX;
  const body = [
    element('rect', { width, height, fill: palette.surface }),
    head(mapping, width),
    element(
      'g',
      { transform: `translate(${(width - grid.width) / 2} ${HEAD_PX})` },
      [
        beds(fabric, graph),
        tiles(kernel, graph, mapping, library),
        pins(fabric, graph),
        threads(kernel, fabric, graph, mapping),
        plates(kernel, graph, mapping, metrics),
      ].join('\n'),
    ),
    foot(metrics, height, width),
  ];
  return element(
    'svg',
    { xmlns: 'http://www.w3.org/2000/svg', width, height, viewBox: `0 0 ${width} ${height}` },
    `\n${element('title', {}, textOnly(mapping.name))}\n${body.join('\n')}\n`,
  );
}

const textOnly = (text: string): string => textElement(text, {}).replace(/^<text>|<\/text>$/g, '');

function head(mapping: MappingDocument, width: number): string {
  const version = (of: { name: string; version: number | null }) =>
    of.version === null ? of.name : `${of.name}, version ${of.version}`;
  return [
    textElement(mapping.name, {
      x: SIDE_PX,
      y: 34,
      'font-family': BOLD,
      'font-size': 21,
      'font-weight': 600,
      fill: palette.ink,
    }),
    textElement(`${version(mapping.kernel)} on ${version(mapping.fabric)}`, {
      x: SIDE_PX,
      y: 56,
      'font-family': SANS,
      'font-size': 14,
      fill: palette.quiet,
    }),
    element('path', { d: `M${SIDE_PX} 66H${width - SIDE_PX}`, stroke: palette.rule }),
  ].join('\n');
}

function foot(metrics: MappingMetrics, height: number, width: number): string {
  const longest =
    metrics.maxHops === null
      ? `longest path ${metrics.longestPathHops}`
      : `longest path ${metrics.longestPathHops} of ${metrics.maxHops}`;
  const figures = [
    `wire hops ${metrics.totalWireHops}`,
    `path hops ${metrics.totalPathHops}`,
    longest,
    `${metrics.placedOps} PEs used`,
    `${metrics.linksUsed} of ${metrics.linkCount} links used`,
  ].join(' · ');
  return [
    element('path', { d: `M${SIDE_PX} ${height - FOOT_PX + 6}H${width - SIDE_PX}`, stroke: palette.rule }),
    textElement(figures, {
      x: SIDE_PX,
      y: height - 36,
      'font-family': BOLD,
      'font-size': 14,
      'font-weight': 600,
      fill: palette.ink,
    }),
    textElement(PICTURE_CAUTION, {
      x: SIDE_PX,
      y: height - 16,
      'font-family': SANS,
      'font-size': 12,
      fill: palette.quiet,
    }),
  ].join('\n');
}

function beds(fabric: Fabric, graph: FabricGraph): string {
  const bars = channelBars(fabric, graph).map(({ x, y, width, height }) =>
    element('rect', { x, y, width, height, fill: palette.channel }),
  );
  const stubs = graph.units.map((unit, tile) => {
    if (unit === null) return '';
    const { row, col } = positionOf(fabric, tile);
    const box = tileBox(row, col);
    const router = routerPoint(row, col);
    return `M${box.x + box.width} ${box.y + box.height}L${router.x} ${router.y}`;
  });
  return [...bars, element('path', { d: stubs.join(''), stroke: palette.rule, fill: 'none' })].join('');
}

function tiles(kernel: Kernel, graph: FabricGraph, mapping: MappingDocument, library: UnitLibrary): string {
  const taken = opOnTile(kernel, graph, mapping.placement);
  return graph.units
    .map((unit, tile) => {
      const { row, col } = positionOf(graph, tile);
      const box = tileBox(row, col);
      if (unit === null) {
        return element('rect', {
          ...box,
          fill: palette.tileNone,
          stroke: palette.rule,
          'stroke-dasharray': '1 5',
        });
      }
      const form = unitSpec(unit, library)?.form ?? 'stitched';
      const marks = tileMarks(form, box);
      const stroke = taken.has(tile) ? palette.ink : palette.edge;
      return [
        element('path', {
          d: marks.outline,
          fill: tileTint(form),
          stroke,
          'stroke-width': taken.has(tile) ? 1.4 : 0.8,
        }),
        marks.strokes === ''
          ? ''
          : element('path', {
              d: marks.strokes,
              fill: 'none',
              stroke,
              'stroke-width': 0.9,
              'stroke-dasharray': marks.stitched ? '3 2.5' : undefined,
            }),
        textElement(`${row},${col}`, {
          x: box.x + 5,
          y: box.y + 12,
          'font-family': MONO,
          'font-size': 9.5,
          fill: palette.quiet,
        }),
      ].join('');
    })
    .join('\n');
}

const pins = (fabric: Fabric, graph: FabricGraph): string =>
  graph.tiles
    .map((_, tile) => {
      const { row, col } = positionOf(fabric, tile);
      const { x, y } = routerPoint(row, col);
      return element('circle', {
        cx: x,
        cy: y,
        r: 3,
        fill: palette.surface,
        stroke: palette.edge,
        'stroke-width': 1.3,
      });
    })
    .join('');

function threads(kernel: Kernel, fabric: Fabric, graph: FabricGraph, mapping: MappingDocument): string {
  return weaveThreads(kernel, fabric, graph, mapping)
    .map((thread) => {
      const { colour, dashes } = threadStyle(thread.net);
      const stroke = threadHex(colour);
      const ends = thread.wrapEnds.map((end) =>
        element('circle', { cx: end.x, cy: end.y, r: 3, fill: palette.surface, stroke, 'stroke-width': 1.6 }),
      );
      const knots = thread.knots.map((knot) =>
        element('circle', { cx: knot.x, cy: knot.y, r: 2.7, fill: stroke }),
      );
      const line = element('path', {
        d: thread.chains.map(threadPath).join(''),
        fill: 'none',
        stroke,
        'stroke-width': 2.2,
        'stroke-linejoin': 'round',
        'stroke-dasharray': dashes.join(' '),
      });
      return [line, ...knots, ...ends].join('');
    })
    .join('\n');
}

function plates(
  kernel: Kernel,
  graph: FabricGraph,
  mapping: MappingDocument,
  metrics: MappingMetrics,
): string {
  const arriving = consumerHops(kernel, metrics);
  const ops = new Map(kernel.ops.map((op) => [op.id, op]));
  return [...opOnTile(kernel, graph, mapping.placement)]
    .map(([tile, id]) => {
      const op = ops.get(id);
      if (!op) return '';
      const { row, col } = positionOf(graph, tile);
      const { x, y } = tileBox(row, col);
      const lines = labelLines(shortName(op));
      const nets = arriving.get(id) ?? [];
      const places = knotPlaces(nets.length, TILE_PX);
      const label = lines.map((line, i) =>
        textElement(line, {
          x: x + TILE_PX / 2,
          y: y + (lines.length > 1 ? 27 : 33) + i * 13,
          'text-anchor': 'middle',
          'font-family': BOLD,
          'font-size': 12.5,
          'font-weight': 600,
          fill: palette.ink,
        }),
      );
      const knots = nets.map((net, i) => {
        const at = places[i] ?? { x: 0, y: 0 };
        const fill = threadHex(threadStyle(net.net).colour);
        return (
          element('circle', { cx: x + at.x, cy: y + at.y, r: 7.6, fill }) +
          textElement(String(net.hops), {
            x: x + at.x,
            y: y + at.y + 3.6,
            'text-anchor': 'middle',
            'font-family': MONO,
            'font-size': 10,
            'font-weight': 600,
            fill: palette.surface,
          })
        );
      });
      const pin =
        mapping.pins[id] === undefined
          ? ''
          : element('circle', { cx: x + TILE_PX - 10, cy: y + 8, r: 4, fill: palette.indigo }) +
            element('path', {
              d: `M${x + TILE_PX - 10} ${y + 11}v7`,
              stroke: palette.indigo,
              'stroke-width': 1.8,
            });
      return [...label, pin, ...knots].join('');
    })
    .join('\n');
}
