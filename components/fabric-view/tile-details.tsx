import type { FabricGraph } from '@/lib/fabric/compile';
import { builtInLibrary, type UnitLibrary } from '@/lib/fabric/unit-library';
import { type Neighbour, tileFacts } from './tile-facts';

interface TileDetailsProps {
  graph: FabricGraph;
  library?: UnitLibrary;
  tile: number;
}

const cycles = (count: number) => `${count} ${count === 1 ? 'cycle' : 'cycles'}`;
const channels = (count: number) => `${count} ${count === 1 ? 'channel' : 'channels'}`;

/** One tile: where it is, what its unit can do, and which routers its links lead to. */
export function TileDetails({ graph, library = builtInLibrary, tile }: TileDetailsProps) {
  const facts = tileFacts(graph, library, tile);
  return (
    <section aria-label="Tile" aria-live="polite" className="text-sm">
      <h2 className="mb-1 text-xs font-semibold tracking-widest text-quiet uppercase">Tile</h2>
      <p className="font-semibold">
        {facts.place.charAt(0).toUpperCase()}
        {facts.place.slice(1)}
      </p>
      <p>
        {facts.unitLabel ?? 'Router only: no op can be placed here, but values pass through.'}
        {facts.unit ? <span className="text-quiet"> · {facts.unit.description}</span> : null}
      </p>
      {facts.operations.length > 0 ? (
        <details className="mt-2">
          <summary className="min-h-6 font-semibold">{facts.operations.length} operations</summary>
          <ul className="mt-1">
            {facts.operations.map((operation) => (
              <li key={operation.label} className="flex justify-between gap-3">
                <span>{operation.label}</span>
                <span className="font-mono text-quiet">{cycles(operation.latencyCycles)}</span>
              </li>
            ))}
          </ul>
        </details>
      ) : null}
      <h3 className="mt-2 font-semibold">Neighbours</h3>
      {facts.neighbours.length === 0 ? (
        <p className="text-quiet">No link leads to or from this router.</p>
      ) : (
        <ul>
          {facts.neighbours.map((neighbour) => (
            <li key={neighbour.tile} className="flex justify-between gap-3">
              <span>{neighbour.place}</span>
              <span className="text-right text-quiet">{linkText(neighbour)}</span>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}

function linkText({ channelsTo, channelsFrom }: Neighbour): string {
  if (channelsFrom === null) return `there only, ${channels(channelsTo ?? 0)}`;
  if (channelsTo === null) return `from there only, ${channels(channelsFrom)}`;
  return channelsTo === channelsFrom
    ? `both ways, ${channels(channelsTo)}`
    : `${channels(channelsTo)} there, ${channelsFrom} back`;
}
