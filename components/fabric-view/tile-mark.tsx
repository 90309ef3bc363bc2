import type { FabricGraph } from '@/lib/fabric/compile';
import type { Fabric } from '@/lib/fabric/fabric';
import { positionOf, routerPoint, tileBox } from '@/lib/mapping/picture/fabric-geometry';

interface TileMarkProps {
  fabric: Fabric;
  graph: FabricGraph;
  tile: number;
}

/** Frames the tile that is told about, and fills its router and those that its links lead to. */
export function TileMark({ fabric, graph, tile }: TileMarkProps) {
  const at = positionOf(fabric, tile);
  const own = routerPoint(at.row, at.col);
  const reached = (graph.outLinks[tile] ?? []).flatMap((index) => {
    const link = graph.links[index];
    return link ? [link.to] : [];
  });
  return (
    <g>
      <rect
        {...tileBox(at.row, at.col)}
        rx={1}
        fill="none"
        stroke="var(--indigo)"
        strokeWidth={2.4}
        pointerEvents="none"
      />
      {reached.map((other) => {
        const { row, col } = positionOf(fabric, other);
        const { x, y } = routerPoint(row, col);
        return <circle key={other} cx={x} cy={y} r={3.4} fill="var(--indigo)" />;
      })}
      <circle cx={own.x} cy={own.y} r={4.6} fill="var(--surface)" stroke="var(--indigo)" strokeWidth={2.4} />
    </g>
  );
}
