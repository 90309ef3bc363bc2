/** Brings the database to the newest schema and, when it is empty, writes the demonstration. */
import { closeDatabase, database, databaseUrl } from '../db/client';
import { migrateDatabase } from '../db/migrate';
import { seedDemo } from '../db/seed/seed-demo';

await migrateDatabase(databaseUrl());
const seeded = await seedDemo(database());
await closeDatabase();
if (seeded) console.log('Wrote the Tarnbrook demonstration');
