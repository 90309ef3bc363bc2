'use client';

import { useMemo, useState } from 'react';
import { FabricGrid } from '@/components/fabric-grid/fabric-grid';
import { Notice } from '@/components/ui/notice';
import { compileFabric } from '@/lib/fabric/compile';
import type { Fabric } from '@/lib/fabric/fabric';
import { validateFabric } from '@/lib/fabric/validate-fabric';
import { pictureSize } from '@/lib/mapping/picture/fabric-geometry';
import { FabricFigures } from './fabric-figures';
import { TileDetails } from './tile-details';
import { TileMark } from './tile-mark';
import { UnitLegend } from './unit-legend';
import { type FabricVersionRow, VersionList } from './version-list';
import { ZoomFrame } from './zoom-frame';

interface FabricViewProps {
  workspace: string;
  fabricId: string;
  fabric: Fabric;
  versions: readonly FabricVersionRow[];
}

/** A fabric to look at: the grid, what stands at each tile, and the figures. */
export function FabricView({ workspace, fabricId, fabric, versions }: FabricViewProps) {
  const graph = useMemo(() => compileFabric(fabric), [fabric]);
  const problems = useMemo(() => validateFabric(fabric), [fabric]);
  const [tile, setTile] = useState(0);
  const picture = pictureSize(fabric);
  return (
    <div className="grid gap-6 p-4 lg:grid-cols-[minmax(0,1fr)_18rem]">
      <div className="min-w-0 space-y-3">
        {problems.map((problem) => (
          <Notice key={problem.message} tone={problem.severity === 'error' ? 'broken' : 'warning'}>
            {problem.message}
          </Notice>
        ))}
        {fabric.description ? <p className="max-w-prose text-sm">{fabric.description}</p> : null}
        <ZoomFrame naturalWidthPx={picture.width} naturalHeightPx={picture.height}>
          {(widthPx) => (
            <FabricGrid
              fabric={fabric}
              graph={graph}
              label={`${fabric.name}, ${fabric.rows} rows of ${fabric.cols} tiles`}
              widthPx={widthPx}
              overlay={<TileMark fabric={fabric} graph={graph} tile={tile} />}
              cursor={tile}
              onCursor={setTile}
              onTile={setTile}
              isSelected={(other) => other === tile}
            />
          )}
        </ZoomFrame>
        <p className="text-xs text-quiet">
          Arrow keys move from tile to tile; + and − zoom, 0 fits the grid to the screen.
        </p>
      </div>
      <div className="space-y-6">
        <TileDetails graph={graph} tile={tile} />
        <UnitLegend units={fabric.units} />
        <FabricFigures fabric={fabric} graph={graph} />
        <VersionList workspace={workspace} fabricId={fabricId} versions={versions} />
      </div>
    </div>
  );
}
