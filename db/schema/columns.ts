/** Columns that many tables share. */
import { timestamp } from 'drizzle-orm/pg-core';

export const instant = (name: string) => timestamp(name, { withTimezone: true, mode: 'date' });
export const createdAt = () => instant('created_at').notNull().defaultNow();
export const updatedAt = () => instant('updated_at').notNull().defaultNow();
