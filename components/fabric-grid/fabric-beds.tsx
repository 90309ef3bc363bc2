import { memo, useMemo } from 'react';
import type { FabricGraph } from '@/lib/fabric/compile';
import type { Fabric } from '@/lib/fabric/fabric';
import { channelBars } from '@/lib/mapping/picture/channel-bars';
import { positionOf, routerPoint, tileBox } from '@/lib/mapping/picture/fabric-geometry';

interface FabricBedsProps {
  fabric: Fabric;
  graph: FabricGraph;
}

const SLANT_PX = 12;
const EDGE_REACH_PX = 17;

/** The channels' beds and the short ways from tiles to their routers. */
export const FabricBeds = memo(function FabricBeds({ fabric, graph }: FabricBedsProps) {
  const bars = useMemo(() => channelBars(fabric, graph), [fabric, graph]);
  const tileCount = graph.tileCount;
  const stubs = useMemo(
    () =>
      Array.from({ length: tileCount }, (_, tile) => {
        const { row, col } = positionOf(fabric, tile);
        const box = tileBox(row, col);
        const router = routerPoint(row, col);
        return graph.units[tile] ? `M${box.x + box.width} ${box.y + box.height}L${router.x} ${router.y}` : '';
      }).join(''),
    [fabric, graph, tileCount],
  );
  const slants = useMemo(() => slantMarks(fabric, graph), [fabric, graph]);
  return (
    <g>
      {bars.map((bar, i) => (
        <rect
          key={`${bar.links[0]} ${i}`}
          x={bar.x}
          y={bar.y}
          width={bar.width}
          height={bar.height}
          fill="var(--channel)"
        />
      ))}
      <path d={slants} stroke="var(--edge)" strokeWidth={1} fill="none" opacity={0.7} />
      <path d={stubs} stroke="var(--edge)" strokeWidth={1} fill="none" opacity={0.55} />
    </g>
  );
});

/** A short tick at both routers of each link that is neither along a row nor along a column. */
function slantMarks(fabric: Fabric, graph: FabricGraph): string {
  return graph.links
    .flatMap((link) => {
      const from = positionOf(fabric, link.from);
      const to = positionOf(fabric, link.to);
      if (from.row === to.row || from.col === to.col) return [];
      const start = routerPoint(from.row, from.col);
      const [dx, dy] = [Math.sign(to.col - from.col), Math.sign(to.row - from.row)];
      const reach = Math.min(SLANT_PX, EDGE_REACH_PX);
      return [`M${start.x} ${start.y}l${dx * reach} ${dy * reach}`];
    })
    .join('');
}

/** The routers, drawn as the pins of the loom. */
export const RouterPins = memo(function RouterPins({ fabric, graph }: FabricBedsProps) {
  return (
    <g>
      {graph.tiles.map((tile, i) => {
        const { row, col } = positionOf(fabric, i);
        const { x, y } = routerPoint(row, col);
        return (
          <circle
            key={tile}
            cx={x}
            cy={y}
            r={3}
            fill="var(--surface)"
            stroke="var(--edge)"
            strokeWidth={1.3}
          />
        );
      })}
    </g>
  );
});
