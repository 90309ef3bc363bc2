/** The mappings of the demonstration: by hand and by the solver. */
import type { DemoMapping } from './demo-mapping';

export type { DemoMapping };

export const demoMappings: readonly DemoMapping[] = [];
