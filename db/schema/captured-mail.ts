import { index, pgTable, text } from 'drizzle-orm/pg-core';
import type { Id } from '../../lib/ids';
import { instant } from './columns';

/** Messages that the local mail sink took in. Empty wherever real mail is sent. */
export const capturedMail = pgTable(
  'captured_mail',
  {
    id: text('id').$type<Id<'mail'>>().primaryKey(),
    to: text('to').notNull(),
    from: text('from').notNull(),
    subject: text('subject').notNull(),
    text: text('text').notNull(),
    html: text('html').notNull(),
    receivedAt: instant('received_at').notNull().defaultNow(),
  },
  (t) => [index('captured_mail_received').on(t.receivedAt)],
);
