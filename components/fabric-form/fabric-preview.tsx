'use client';

import { useDeferredValue, useMemo, useState } from 'react';
import { FabricGrid } from '@/components/fabric-grid/fabric-grid';
import { compileFabric } from '@/lib/fabric/compile';
import type { Fabric } from '@/lib/fabric/fabric';
import { FabricFigures } from '../fabric-view/fabric-figures';
import { UnitLegend } from '../fabric-view/unit-legend';
import { fabricOfForm } from './fabric-of-form';
import { type FabricFormValues, parseFabricForm } from './form-values';

/** The fabric that the values make. While they are not valid, the last one that was is kept, and said so. */
export function FabricPreview({ values }: { values: FabricFormValues }) {
  const settled = useDeferredValue(values);
  const drawn = useMemo(() => {
    // A missing name is no reason to hide the grid.
    const parsed = parseFabricForm({ ...settled, name: settled.name.trim() || 'Preview' });
    return parsed.ok ? fabricOfForm(parsed.form) : null;
  }, [settled]);
  const [kept, setKept] = useState<Fabric | null>(drawn);
  if (drawn && drawn !== kept) setKept(drawn);
  const document = drawn ?? kept;
  const graph = useMemo(() => document && compileFabric(document), [document]);
  if (!document || !graph)
    return <p className="text-sm text-quiet">The preview appears here once the numbers are valid.</p>;
  return (
    <section aria-label="Preview" className="grid content-start gap-6 xl:grid-cols-[1fr_15rem]">
      <div>
        <p className="mb-2 text-xs text-quiet" role="status">
          {drawn ? 'Preview' : 'Preview of the last valid values; correct the marked fields to go on.'}
        </p>
        <FabricGrid fabric={document} graph={graph} label="Preview of the fabric" />
      </div>
      <div className="space-y-5">
        <UnitLegend units={document.units} />
        <FabricFigures fabric={document} graph={graph} />
      </div>
    </section>
  );
}
