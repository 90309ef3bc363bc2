import { eq } from 'drizzle-orm';
import { beforeAll, describe, expect, it } from 'vitest';
import {
  ABSOLUTE_DAYS,
  beginSession,
  endSession,
  findSession,
  IDLE_DAYS,
} from '../../app/_server/session-store';
import { endSessionOf, listSessions } from '../../db/queries/sessions';
import { sessions } from '../../db/schema';
import { tokenDigest } from '../../db/tokens';
import { testDatabase } from '../helpers/database';
import { newPerson } from '../helpers/people';

const box = testDatabase();
const DAY_MS = 86_400_000;
const client = { userAgent: 'Test browser', addressPrefix: '192.0.2.0/24' };
let person: Awaited<ReturnType<typeof newPerson>>;
beforeAll(async () => {
  person = await newPerson(box.db);
});

const begin = (now = new Date()) => beginSession(box.db, { userId: person.id, client, now });
const find = (token: string, now = new Date()) => findSession(box.db, { token, now });
const ago = (days: number) => new Date(Date.now() - days * DAY_MS);

describe('a session', () => {
  it('belongs to its person and shows no password', async () => {
    const found = await find(await begin());
    expect(found?.user).toEqual({ id: person.id, name: person.name, email: person.email });
  });

  it('has a token of 256 bits, of which only the digest is stored', async () => {
    const token = await begin();
    expect(Buffer.from(token, 'base64url')).toHaveLength(32);
    const stored = await box.db.select().from(sessions);
    expect(stored.map((row) => row.id)).toContain(tokenDigest(token));
    expect(JSON.stringify(stored)).not.toContain(token);
  });

  it('cannot be opened with what the database holds', async () => {
    expect(await find(tokenDigest(await begin()))).toBeNull();
  });

  it('is new with each sign-in', async () => {
    expect(await begin()).not.toBe(await begin());
  });

  it(`ends ${IDLE_DAYS} days after it was last renewed`, async () => {
    const token = await begin();
    const expire = (expiresAt: Date) =>
      box.db
        .update(sessions)
        .set({ expiresAt })
        .where(eq(sessions.id, tokenDigest(token)));
    const [row] = await box.db
      .select()
      .from(sessions)
      .where(eq(sessions.id, tokenDigest(token)));
    const idleMs = (row?.expiresAt.getTime() ?? 0) - Date.now();
    expect(Math.abs(idleMs - IDLE_DAYS * DAY_MS)).toBeLessThan(60_000);
    await expire(new Date(Date.now() - 1000));
    expect(await find(token)).toBeNull();
  });

  it('is renewed by use in the second half of its time', async () => {
    const token = await begin();
    const soon = new Date(Date.now() + DAY_MS);
    await box.db
      .update(sessions)
      .set({ expiresAt: soon })
      .where(eq(sessions.id, tokenDigest(token)));
    expect(await find(token)).not.toBeNull();
    const [row] = await box.db
      .select()
      .from(sessions)
      .where(eq(sessions.id, tokenDigest(token)));
    expect(row?.expiresAt.getTime()).toBeGreaterThan(Date.now() + (IDLE_DAYS - 1) * DAY_MS);
  });

  it(`ends ${ABSOLUTE_DAYS} days after it began, however much it is used`, async () => {
    const young = await begin(ago(ABSOLUTE_DAYS - 1));
    const old = await begin(ago(ABSOLUTE_DAYS));
    expect(await find(young)).not.toBeNull();
    expect(await find(old)).toBeNull();
    expect(
      await box.db
        .select()
        .from(sessions)
        .where(eq(sessions.id, tokenDigest(old))),
    ).toEqual([]);
  });

  it('remembers when it was last used, by the minute', async () => {
    const token = await begin(ago(1));
    const now = new Date();
    await find(token, now);
    await find(token, new Date(now.getTime() + 30_000));
    const listed = await listSessions(box.db, { userId: person.id, now });
    expect(listed.find((one) => one.id === tokenDigest(token))?.lastSeenAt).toEqual(now);
  });

  it('ends on the server when signed out', async () => {
    const token = await begin();
    await endSession(box.db, token);
    expect(await find(token)).toBeNull();
  });

  it('is ended by its own person only', async () => {
    const token = await begin();
    const other = await newPerson(box.db);
    expect(await endSessionOf(box.db, { userId: other.id, id: tokenDigest(token) })).toBe(false);
    expect(await find(token)).not.toBeNull();
    expect(await endSessionOf(box.db, { userId: person.id, id: tokenDigest(token) })).toBe(true);
    expect(await find(token)).toBeNull();
  });
});
