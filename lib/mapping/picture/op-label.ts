/** An op's name on a tile: at most two lines of about eleven letters. */
import type { Op } from '../../graph/kernel';
import { opSpec } from '../../graph/op-catalog';

const LINE_LETTERS = 11;
const LINES = 2;

/** The name in short: the label, or the kind's where there is none. */
export const shortName = (op: Pick<Op, 'label' | 'kind'>): string =>
  op.label.trim() === '' ? opSpec(op.kind).label : op.label.trim();

/** Broken at spaces where possible; what does not fit ends in an ellipsis. */
export function labelLines(name: string, letters = LINE_LETTERS): string[] {
  const lines: string[] = [];
  for (const word of name.split(/\s+/)) {
    const last = lines.at(-1);
    if (last !== undefined && last.length + 1 + word.length <= letters)
      lines[lines.length - 1] = `${last} ${word}`;
    else lines.push(word);
  }
  const kept = lines.slice(0, LINES);
  return kept.map((line, i) => {
    const more = i === LINES - 1 && lines.length > LINES;
    return line.length > letters || more ? `${line.slice(0, letters - 1)}…` : line;
  });
}
