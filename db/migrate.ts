/** Brings a database to the newest schema; harmless when it is there already. */
import { join } from 'node:path';
import { sql } from 'drizzle-orm';
import { migrate } from 'drizzle-orm/postgres-js/migrator';
import { connect } from './client';

/** Any fixed number: two programs that migrate at once wait for one another on it. */
const MIGRATION_LOCK = 7_213_001;

/** `folder` defaults to db/migrations below the working directory. */
export async function migrateDatabase(url: string, folder?: string): Promise<void> {
  // One connection, so that the lock and the migrations share a session.
  const { sql: client, db } = connect(url, 1);
  try {
    await db.execute(sql`select pg_advisory_lock(${MIGRATION_LOCK})`);
    await migrate(db, { migrationsFolder: folder ?? join(process.cwd(), 'db', 'migrations') });
  } finally {
    await client.end();
  }
}
