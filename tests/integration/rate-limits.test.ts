import { eq, sql } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { forgetAttempts, takeAttempt } from '../../app/_server/rate-limit';
import { removeEndedWindows } from '../../db/queries/rate-limits';
import { rateLimits } from '../../db/schema';
import { testDatabase } from '../helpers/database';

const box = testDatabase();
const limit = { name: 'test', attempts: 5, windowSeconds: 60 };
const passes = async (subject: string) => (await takeAttempt(box.db, limit, subject)).ok;

describe('a limit of five', () => {
  it('lets five of ten pass that come at the same moment', async () => {
    const results = await Promise.all(Array.from({ length: 10 }, () => passes('together')));
    expect(results.filter(Boolean)).toHaveLength(5);
  });

  it('counts each subject by itself', async () => {
    for (let n = 0; n < 6; n++) await passes('one');
    expect(await passes('one')).toBe(false);
    expect(await passes('other')).toBe(true);
  });

  it('says how long to wait, and opens when the window has ended', async () => {
    for (let n = 0; n < 5; n++) await passes('waiting');
    const refused = await takeAttempt(box.db, limit, 'waiting');
    expect(refused).toMatchObject({
      error: { code: 'rate_limited', message: expect.stringMatching(/Wait \d+ seconds/) },
    });
    await box.db.update(rateLimits).set({ resetsAt: sql`now() - interval '1 second'` });
    expect(await passes('waiting')).toBe(true);
  });

  it('forgets when told to', async () => {
    for (let n = 0; n < 6; n++) await passes('forgiven');
    await forgetAttempts(box.db, limit, 'forgiven');
    expect(await passes('forgiven')).toBe(true);
  });

  it('stores digests, not who it was', async () => {
    await passes('architect@tarnbrook.example');
    const rows = await box.db.select().from(rateLimits);
    expect(JSON.stringify(rows)).not.toContain('tarnbrook');
    expect(rows[0]?.key).toMatch(/^[0-9a-f]{64}$/);
  });

  it('is tidied of windows that ended, and of no others', async () => {
    await box.db.delete(rateLimits);
    await passes('ended');
    await box.db.update(rateLimits).set({ resetsAt: sql`now() - interval '1 second'` });
    await passes('open');
    await removeEndedWindows(box.db, new Date());
    expect(await box.db.select().from(rateLimits).where(eq(rateLimits.hits, 1))).toHaveLength(1);
  });
});
