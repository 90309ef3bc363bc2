import { pgTable, text } from 'drizzle-orm/pg-core';
import { instant } from './columns';

/** One row per worker program that runs or ran; the health page reports the youngest beat. */
export const workerHeartbeats = pgTable('worker_heartbeats', {
  worker: text('worker').primaryKey(),
  startedAt: instant('started_at').notNull().defaultNow(),
  beatAt: instant('beat_at').notNull().defaultNow(),
});
