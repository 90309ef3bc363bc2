/** A mapping of the demonstration, as plain data. Verified when it is written to the database. */
import type { Pins, Placement, Provenance, Routes } from '../../../lib/mapping/mapping';
import type { DemoFabric } from '../fabrics/index';

export interface DemoMapping {
  name: string;
  kernelSlug: string;
  fabricKey: DemoFabric['key'];
  placement: Placement;
  pins: Pins;
  routes: Routes;
  provenance: Provenance;
  /** Whose work it is: the name part of a demo account. */
  madeBy: 'architect' | 'compiler';
  /** False: still on the bench, as a draft. */
  kept: boolean;
}
