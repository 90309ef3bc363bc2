/** The words for how an answer was proved. */
import type { Certificate } from '@/lib/mapping/certificate';
import { objectiveName } from '@/lib/mapping/weights';

/** What proves it, in one sentence. */
export function methodSentence(certificate: Certificate): string {
  const { method, status, objective, weights, levels } = certificate;
  const name = objectiveName(objective, weights);
  if (status === 'infeasible') {
    switch (method) {
      case 'counting':
        return 'Counting is enough: what is named above cannot go together.';
      case 'bound of the stars':
        return 'Counting is enough: the neighbours of one op find no room within reach of it.';
      case 'exact search':
        return 'The exact search has tried everything that could be legal.';
      case 'integer program':
        return 'An integer program of the problem has no solution, says the engine that solved it.';
    }
  }
  switch (method) {
    case 'counting':
      return `Counting is enough: every mapping needs as many ${name}.`;
    case 'bound of the stars':
      return `What each op must at least pay to its neighbours adds up to as many ${name}.`;
    case 'exact search':
      return levels.length > 0
        ? 'The exact search has looked for a cheaper mapping level by level and has nothing left to try.'
        : 'The first bound of the exact search is as high already; no level had to be searched.';
    case 'integer program':
      return 'An integer program of the problem was solved to its optimum by an engine of its own.';
  }
}

/** What the files are called when they are exported. */
export interface ProofFiles {
  kernel: string;
  fabric: string;
  certificate: string;
  /** Null where no mapping is kept yet. */
  mapping: string | null;
}

/** The command that derives the answer again from the exported files. */
export const proveCommand = ({ kernel, fabric, certificate, mapping }: ProofFiles): string =>
  [
    'npm run -s pinloom -- prove',
    `--kernel ${kernel}`,
    `--fabric ${fabric}`,
    `--certificate ${certificate}`,
    ...(mapping === null ? [] : [`--mapping ${mapping}`]),
  ].join(' ');

/** What can be expected of a second run. */
export const repeatSentence = ({ isRepeatable }: Certificate): string =>
  isRepeatable
    ? 'The same engine version comes to the same nodes and levels.'
    : 'The answer comes out again; its nodes need not, as time, a second thread or an engine with a clock of its own had a part in it.';
