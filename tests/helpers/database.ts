import { randomBytes } from 'node:crypto';
import postgres from 'postgres';
import { afterAll, beforeAll, inject } from 'vitest';
import { type Connection, connect } from '../../db/client';

/** A database of the test file's own, copied from the migrated template; filled in before the first test. */
export function testDatabase(): Connection & { url: string } {
  const box = {} as Connection & { url: string };
  let name = '';
  beforeAll(async () => {
    const admin = postgres(inject('adminUrl'), { max: 1 });
    name = `${inject('template')}_${process.pid}_${randomBytes(4).toString('hex')}`;
    await admin.unsafe(`create database ${name} template ${inject('template')}`);
    await admin.end();
    const url = new URL(inject('adminUrl'));
    url.pathname = `/${name}`;
    Object.assign(box, connect(url.href, 8), { url: url.href });
  });
  afterAll(async () => {
    await box.sql.end();
    const admin = postgres(inject('adminUrl'), { max: 1 });
    await admin.unsafe(`drop database if exists ${name} with (force)`);
    await admin.end();
  });
  return box;
}
