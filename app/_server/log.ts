/** One log: JSON lines on standard output. Never a password, token, cookie, address of a person or document. */
import 'server-only';
import { randomBytes } from 'node:crypto';
import { headers } from 'next/headers';
import pino, { type Logger } from 'pino';

const shared = globalThis as { pinloomLog?: Logger };

/** The process's log. Made on first use, so that a build makes none. */
export function log(): Logger {
  shared.pinloomLog ??= pino({
    level: process.env.LOG_LEVEL ?? 'info',
    base: { program: 'web' },
    timestamp: pino.stdTimeFunctions.isoTime,
    redact: {
      paths: [
        'password',
        'token',
        'email',
        'cookie',
        'authorization',
        '*.password',
        '*.token',
        '*.email',
        '*.cookie',
        '*.authorization',
        'err.parameters',
        'err.params',
        'err.query',
        'err.args',
        'err.cause.parameters',
        'err.cause.args',
        'err.cause.query',
      ],
      censor: '[redacted]',
    },
  });
  return shared.pinloomLog;
}

/** The log with the id of the request that is being answered; the proxy gives each request one. */
export async function requestLog(): Promise<Logger> {
  const requestId = (await headers()).get('x-request-id');
  return requestId ? log().child({ requestId }) : log();
}

/** Writes an unexpected exception to the log and returns the id by which a person can name it. */
export async function logIncident(thrown: unknown, where: string): Promise<string> {
  const incidentId = randomBytes(6).toString('hex');
  // Drizzle's message repeats the query with its values; the cause says what went wrong.
  const cause = thrown instanceof Error && thrown.cause instanceof Error ? thrown.cause : thrown;
  const known = cause instanceof Error ? cause : new Error(String(cause));
  (await requestLog()).error(
    {
      incidentId,
      where,
      error: { name: known.name, message: known.message, code: codeOf(known), stack: known.stack },
    },
    'incident',
  );
  return incidentId;
}

function codeOf(error: Error): string | undefined {
  const { code } = error as Error & { code?: unknown };
  return typeof code === 'string' ? code : undefined;
}
