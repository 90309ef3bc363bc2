import { TileShape } from '@/components/fabric-grid/tile-shape';
import { unitLook } from '@/components/fabric-grid/unit-tint';
import type { UnitId } from '@/lib/fabric/fabric';
import { countUnits } from '@/lib/fabric/presets';
import { builtInLibrary, type UnitLibrary, unitSpec } from '@/lib/fabric/unit-library';

const BOX = { x: 1, y: 1, width: 26, height: 26 };

interface UnitLegendProps {
  units: readonly (UnitId | null)[];
  library?: UnitLibrary;
}

/** Which form and tint stands for which unit, and how many PEs have it. */
export function UnitLegend({ units, library = builtInLibrary }: UnitLegendProps) {
  const empty = units.filter((unit) => unit === null).length;
  return (
    <section aria-label="Units">
      <h2 className="mb-1 text-xs font-semibold tracking-widest text-quiet uppercase">Units</h2>
      <ul className="figures space-y-1 text-sm">
        {[...countUnits(units)].map(([unit, peCount]) => (
          <Entry
            key={unit}
            unit={unit}
            library={library}
            label={unitSpec(unit, library)?.label ?? unit}
            count={peCount}
          />
        ))}
        {empty > 0 ? <Entry unit={null} library={library} label="Router only" count={empty} /> : null}
      </ul>
    </section>
  );
}

interface EntryProps {
  unit: UnitId | null;
  library: UnitLibrary;
  label: string;
  count: number;
}

function Entry({ unit, library, label, count }: EntryProps) {
  return (
    <li className="flex items-center gap-2">
      <svg viewBox="0 0 28 28" className="size-7 flex-none" aria-hidden="true">
        <TileShape box={BOX} unit={unitLook(unit, library)} look="free" place="" />
      </svg>
      <span>{label}</span>
      <span className="ml-auto font-mono">{count.toLocaleString('en-GB')}</span>
    </li>
  );
}
