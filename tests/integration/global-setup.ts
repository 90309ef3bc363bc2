import { execFileSync } from 'node:child_process';
import postgres from 'postgres';
import type { TestProject } from 'vitest/node';
import { migrateDatabase } from '../../db/migrate';

declare module 'vitest' {
  interface ProvidedContext {
    adminUrl: string;
    template: string;
  }
}

/** Starts PostgreSQL when it is not there and migrates one template; each test file gets a copy of it. */
export default async function setup(project: TestProject) {
  const adminUrl = execFileSync(process.execPath, ['scripts/db.mjs', 'start'], { encoding: 'utf8' }).trim();
  // The process and the time, so that two runs can share a server.
  const template = `tpl_${process.pid}_${Date.now().toString(36)}`;
  const admin = postgres(adminUrl, { max: 1, onnotice: () => {} });
  await admin.unsafe(`create database ${template}`);
  const url = new URL(adminUrl);
  url.pathname = `/${template}`;
  await migrateDatabase(url.href);
  project.provide('adminUrl', adminUrl);
  project.provide('template', template);
  return async () => {
    const mine = await admin`select datname from pg_database where datname like ${`${template}%`}`;
    for (const row of mine) await admin.unsafe(`drop database if exists "${row.datname}" with (force)`);
    await admin.end();
  };
}
