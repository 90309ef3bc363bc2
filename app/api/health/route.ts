import { sql } from 'drizzle-orm';
import { database } from '@/db/client';
import { workerAgeSeconds } from '@/db/queries/solve-work';

const WORKER_SILENT_AFTER_SECONDS = 60;

/**
 * For whoever watches the service: 200 when the database answers, 503 when not. The worker's age is reported and
 * does not fail the check, since pages work without it.
 */
export async function GET(): Promise<Response> {
  const headers = { 'cache-control': 'no-store' };
  try {
    await database().execute(sql`select 1`);
    const age = await workerAgeSeconds(database());
    const worker =
      age === null
        ? { state: 'never seen' }
        : { state: age < WORKER_SILENT_AFTER_SECONDS ? 'alive' : 'silent', beatAgeSeconds: Math.round(age) };
    return Response.json({ status: 'ok', database: 'ok', worker }, { headers });
  } catch {
    return Response.json({ status: 'unavailable', database: 'unreachable' }, { status: 503, headers });
  }
}
