/** The one JSON document on standard output, and faults on standard error. */
import type { Faults } from './read-document';

export const printDocument = (document: object): void => {
  process.stdout.write(`${JSON.stringify(document, null, 2)}\n`);
};

/** Answers the exit code of bad input. */
export function printFaults(faults: Faults): 2 {
  process.stderr.write(`${faults.join('\n')}\n`);
  return 2;
}
