/** The web process's end of the queue. */
import 'server-only';
import type PgBoss from 'pg-boss';
import { databaseUrl } from '@/db/client';
import { sendSolve, startQueue } from '@/db/queue';
import type { Id } from '@/lib/ids';
import { log } from './log';

const shared = globalThis as { pinloomQueue?: Promise<PgBoss> };

function queue(): Promise<PgBoss> {
  shared.pinloomQueue ??= startQueue(databaseUrl(), 'sender', (error) =>
    log().error({ error: { name: error.name, message: error.message } }, 'queue'),
  ).catch((error: unknown) => {
    // The next call tries again.
    delete shared.pinloomQueue;
    throw error;
  });
  return shared.pinloomQueue;
}

/** Hands a solve to the workers, after the transaction that made its row. Returns the queue's id. */
export async function enqueueSolve(job: { id: Id<'solve'>; timeLimitMs: number }): Promise<string | null> {
  return sendSolve(await queue(), job);
}
