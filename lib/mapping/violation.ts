/** What the verifier reports: one broken rule of MODEL.md, in words and with everything it concerns. */
import type { LinkId, TileId } from '../fabric/fabric';
import type { EdgeId, Op, OpId } from '../graph/kernel';
import { opSpec } from '../graph/op-catalog';

export const rules = ['R1', 'R2', 'R3', 'R4', 'R5', 'R6', 'R7'] as const;
export type Rule = (typeof rules)[number];

export interface Violation {
  rule: Rule;
  message: string;
  opIds: OpId[];
  tileIds: TileId[];
  linkIds: LinkId[];
  edgeIds?: EdgeId[];
}

/** Each rule as one sentence. */
export const ruleText: Readonly<Record<Rule, string>> = {
  R1: 'Every op is placed on a PE of the fabric',
  R2: 'No two ops share a PE',
  R3: "The PE's unit implements the op",
  R4: 'A pinned op is on its pinned PE',
  R5: "A net's route is a tree from its source's router to every consumer's, without loops or loose ends",
  R6: 'No link carries more nets than it has channels',
  R7: 'No path is longer than the clock allows',
};

/** An op as people know it: its label, or its kind and id where it has none. */
export const opName = (op: Op): string =>
  op.label.trim() === '' ? `${opSpec(op.kind).label} (${op.id})` : op.label.trim();
