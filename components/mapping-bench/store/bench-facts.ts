/** What follows from a bench's content: figures, broken rules, threads. Computed once for each content. */
import type { Fabric } from '@/lib/fabric/fabric';
import { type MappingMetrics, measureMapping } from '@/lib/mapping/metrics';
import { type Thread, weaveThreads } from '@/lib/mapping/picture/threads';
import { type Violation, verifyMapping } from '@/lib/mapping/verify';
import type { BenchContent, BenchSetting } from './bench-content';

export interface BenchFacts {
  metrics: MappingMetrics;
  /** Broken rules so far; ops that are not placed yet are none. */
  violations: readonly Violation[];
  threads: readonly Thread[];
  complete: boolean;
  /** Complete and without a broken rule. */
  legal: boolean;
}

export function benchFacts(
  setting: BenchSetting,
  fabric: Fabric,
  content: Pick<BenchContent, 'placement' | 'routes' | 'pins'>,
): BenchFacts {
  const { kernel, graph, library } = setting;
  const metrics = measureMapping(kernel, graph, content);
  const violations = verifyMapping(kernel, fabric, content, { partial: true, library });
  const complete = metrics.placedOps === metrics.totalOps;
  return {
    metrics,
    violations,
    threads: weaveThreads(kernel, fabric, graph, content),
    complete,
    legal: complete && violations.length === 0,
  };
}
