/**
 * The database. Opened on first use, never at import, so a build needs no database.
 * Drizzle changes the client that it is given (dates become text in raw queries), so it has one of its own.
 */
import { drizzle, type PostgresJsDatabase } from 'drizzle-orm/postgres-js';
import postgres from 'postgres';
import * as schema from './schema';

export type Database = PostgresJsDatabase<typeof schema>;
export type Transaction = Parameters<Parameters<Database['transaction']>[0]>[0];
/** What a query runs in: the pool itself or an open transaction. */
export type Tx = Database | Transaction;

export interface Connection {
  sql: postgres.Sql;
  db: Database;
}

/** A connection of the caller's own; the caller ends it with `await connection.sql.end()`. */
export function connect(url: string, maxConnections: number): Connection {
  const sql = postgres(url, {
    max: maxConnections,
    onnotice: () => {},
    connection: { application_name: 'pinloom' },
  });
  return { sql, db: drizzle(sql, { schema }) };
}

interface Opened {
  drizzle?: Connection;
  raw?: postgres.Sql;
}
// On globalThis, since a development server loads this module again after every change.
const shared = globalThis as { pinloomDatabase?: Opened };
shared.pinloomDatabase ??= {};
const opened = shared.pinloomDatabase;

export function databaseUrl(): string {
  const url = process.env.DATABASE_URL;
  if (!url)
    throw new Error(
      'DATABASE_URL is not set. "node scripts/db.mjs start" prints the address of the private server.',
    );
  return url;
}

/** The process's pool behind Drizzle. */
export function database(): Database {
  opened.drizzle ??= connect(databaseUrl(), Number(process.env.DATABASE_POOL ?? 10));
  return opened.drizzle.db;
}

/** A client for SQL that Drizzle cannot say (listen, one-statement upserts): dates come as Date. */
export function rawSql(): postgres.Sql {
  opened.raw ??= postgres(databaseUrl(), {
    max: 3,
    onnotice: () => {},
    connection: { application_name: 'pinloom raw' },
  });
  return opened.raw;
}

/** Ends both pools; for programs that stop by themselves. */
export async function closeDatabase(): Promise<void> {
  const { drizzle: connection, raw } = opened;
  delete opened.drizzle;
  delete opened.raw;
  await Promise.all([connection?.sql.end({ timeout: 5 }), raw?.end({ timeout: 5 })]);
}
