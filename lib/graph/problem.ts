/** What the validator finds: shown in the editor's list, in imports and in reasons why a kernel cannot be placed. */
import type { EdgeId, OpId } from './kernel';

/** The rules of MODEL.md, K1 to K15, and the codes that stand for them. */
export const problemCodes = [
  'duplicateId',
  'missingOp',
  'unknownPort',
  'noResult',
  'missingOperand',
  'drivenTwice',
  'edgeAndConstant',
  'typeMismatch',
  'widthMismatch',
  'constantRange',
  'unknownParam',
  'missingParam',
  'paramValue',
  'initialValueCount',
  'initialValueRange',
  'cycleWithoutDistance',
  'fallbackWithoutPredicate',
  'predicateWithoutFallback',
  'rateMismatch',
  'noSideEffect',
  'unused',
  'sharedTable',
] as const;
export type ProblemCode = (typeof problemCodes)[number];

export interface Problem {
  /** An error keeps the kernel from being placed; a warning does not. */
  severity: 'error' | 'warning';
  code: ProblemCode;
  /** Names the ops by their labels and says what to do. */
  message: string;
  opIds: OpId[];
  edgeIds: EdgeId[];
  port?: string;
}

type Places = { opIds?: OpId[]; edgeIds?: EdgeId[]; port?: string };

const problem =
  (severity: Problem['severity']) =>
  (code: ProblemCode, message: string, places: Places = {}): Problem => ({
    severity,
    code,
    message,
    opIds: places.opIds ?? [],
    edgeIds: places.edgeIds ?? [],
    ...(places.port === undefined ? {} : { port: places.port }),
  });

export const errorProblem = problem('error');
export const warningProblem = problem('warning');
