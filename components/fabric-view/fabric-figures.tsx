'use client';

import { useMemo, useState } from 'react';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import type { FabricGraph } from '@/lib/fabric/compile';
import type { Fabric } from '@/lib/fabric/fabric';
import { fabricStatistics } from '@/lib/fabric/statistics';
import { type Figure, FigureList } from './figure-list';
import { hopFormula } from './hop-limit';
import { topologyWords } from './topology-labels';

/** Above this, all-pairs distances take seconds in a browser and are worked out only when asked for. */
const DISTANCES_AT_ONCE_TILES = 1024;

const count = (value: number) => value.toLocaleString('en-GB');
const mean = (value: number) => value.toFixed(2);
const hops = (value: number) => `${count(value)} ${value === 1 ? 'hop' : 'hops'}`;
const time = (value: number) => `${value.toLocaleString('en-GB', { maximumFractionDigits: 6 })} ps`;

interface FabricFiguresProps {
  fabric: Fabric;
  graph: FabricGraph;
}

/** Size, wires, distances, buffers and clock. */
export function FabricFigures({ fabric, graph }: FabricFiguresProps) {
  const peCount = graph.units.filter((unit) => unit !== null).length;
  return (
    <div className="space-y-5">
      <FigureList
        title="Grid"
        figures={[
          { label: 'Size', value: `${fabric.rows} × ${fabric.cols} ${topologyWords[fabric.topology]}` },
          { label: 'PEs', value: `${count(peCount)} of ${count(graph.tileCount)} tiles` },
          { label: 'Buffer depth', value: count(fabric.bufferDepth) },
          { label: 'Memory banks', value: count(fabric.memoryBanks) },
        ]}
      />
      <FigureList title="Links" figures={linkFigures(fabric, graph)} />
      <Distances graph={graph} />
      <FigureList title="Clock" figures={clockFigures(fabric, graph)} />
    </div>
  );
}

function linkFigures(fabric: Fabric, graph: FabricGraph): Figure[] {
  const counts = graph.links.map((link) => link.channels);
  const [least, most] = [Math.min(...counts), Math.max(...counts)];
  const figures: Figure[] = [
    { label: 'Directed links', value: count(graph.links.length) },
    { label: 'Channels per link', value: least < most ? `${least} to ${most}` : String(fabric.channels) },
  ];
  if (fabric.removedLinks.length > 0)
    figures.push({ label: 'Missing links', value: count(fabric.removedLinks.length) });
  if (fabric.addedLinks.length > 0)
    figures.push({ label: 'Express links', value: count(fabric.addedLinks.length) });
  return figures;
}

function Distances({ graph }: { graph: FabricGraph }) {
  const [askedFor, setAskedFor] = useState<FabricGraph | null>(null);
  const shown = graph.tileCount <= DISTANCES_AT_ONCE_TILES || askedFor === graph;
  const statistics = useMemo(() => (shown ? fabricStatistics(graph) : null), [shown, graph]);
  if (!statistics) {
    return (
      <div>
        <FigureList title="Distances" figures={[]} />
        <Button onClick={() => setAskedFor(graph)}>Work out the distances</Button>
        <p className="mt-1 text-xs text-quiet">Takes a few seconds on a grid of this size.</p>
      </div>
    );
  }
  return (
    <div className="space-y-2">
      <FigureList
        title="Distances"
        figures={[
          { label: 'Diameter', value: hops(statistics.diameterHops) },
          { label: 'Mean, without self', value: mean(statistics.meanHopsExcludingSelf) },
          { label: 'Mean, with self', value: mean(statistics.meanHopsIncludingSelf) },
          {
            label: 'Bisection',
            value: `${count(statistics.bisectionChannels)} channels`,
            note: 'across the straight middle cut with fewest, both directions',
          },
        ]}
      />
      {statistics.connectedParts > 1 ? (
        <Notice tone="warning">
          The routers fall into {statistics.connectedParts} parts that cannot all reach each other;{' '}
          {count(statistics.unreachablePairs)} ordered pairs have no path.
        </Notice>
      ) : null}
    </div>
  );
}

function clockFigures(fabric: Fabric, graph: FabricGraph): Figure[] {
  if (!fabric.clock) return [{ label: 'Longest path', value: 'no limit' }];
  return [
    { label: 'Period', value: time(fabric.clock.periodPs) },
    { label: 'Entry delay', value: time(fabric.clock.entryDelayPs) },
    { label: 'Hop delay', value: time(fabric.clock.hopDelayPs) },
    {
      label: 'Longest path',
      value: hops(graph.maxHops ?? 0),
      note: <span className="font-mono">{hopFormula(fabric.clock)}</span>,
    },
  ];
}
