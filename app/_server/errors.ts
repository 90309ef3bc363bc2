/** What a boundary may answer with instead of a value. Plain data: it travels to the browser. */
import type { Result } from '@/lib/result';

export const errorCodes = [
  'not_signed_in',
  'not_found',
  'forbidden',
  'conflict',
  'invalid',
  'rate_limited',
  'too_large',
  'unavailable',
  'internal',
] as const;
export type ErrorCode = (typeof errorCodes)[number];

export interface AppError {
  code: ErrorCode;
  /** A sentence for the person that says what to do. */
  message: string;
  /** Inputs that were refused, by dotted path. */
  fields?: Record<string, string>;
  /** For `internal`: what the person can quote and the log holds. */
  incidentId?: string;
  /** For `rate_limited`. */
  waitSeconds?: number;
}

export type AppResult<T> = Result<T, AppError>;

export const appError = (
  code: ErrorCode,
  message: string,
  more: Omit<AppError, 'code' | 'message'> = {},
): AppError => ({
  code,
  message,
  ...more,
});

export const notFound = (what: string): AppError =>
  appError('not_found', `This ${what} does not exist, or you have no access to it.`);

/** HTTP status of each code, for route handlers. */
export const statusOf: Record<ErrorCode, number> = {
  not_signed_in: 401,
  not_found: 404,
  forbidden: 403,
  conflict: 409,
  invalid: 422,
  rate_limited: 429,
  too_large: 413,
  unavailable: 503,
  internal: 500,
};

const REFUSAL = Symbol.for('pinloom.refusal');

/** Throws the error out of an open transaction, so that it is rolled back; actions and routes turn it into a result. */
export function refuse(error: AppError): never {
  throw Object.assign(new Error(error.message), { [REFUSAL]: error });
}

/** The error that `refuse` threw, or null for any other exception. */
export function refusalOf(thrown: unknown): AppError | null {
  if (typeof thrown !== 'object' || thrown === null || !(REFUSAL in thrown)) return null;
  return (thrown as { [REFUSAL]: AppError })[REFUSAL];
}
