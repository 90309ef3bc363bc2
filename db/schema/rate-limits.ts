import { index, integer, pgTable, text } from 'drizzle-orm/pg-core';
import { instant } from './columns';

/** Counted attempts in a fixed window. Keys are digests, so no address or e-mail stands here. */
export const rateLimits = pgTable(
  'rate_limits',
  {
    key: text('key').primaryKey(),
    hits: integer('hits').notNull(),
    resetsAt: instant('resets_at').notNull(),
  },
  (t) => [index('rate_limits_resets').on(t.resetsAt)],
);
