import { beforeEach, describe, expect, it } from 'vitest';
import { changePassword } from '../../app/_server/accounts/change-password';
import { completeReset, isResetOpen, requestReset } from '../../app/_server/accounts/reset';
import { checkSignIn } from '../../app/_server/accounts/sign-in';
import { beginSession, findSession } from '../../app/_server/session-store';
import { hashPassword } from '../../db/password-hash';
import { setPasswordHash } from '../../db/queries/accounts';
import { listSessions } from '../../db/queries/sessions';
import { accountContext, GOOD_PASSWORD } from '../helpers/account-context';
import { testDatabase } from '../helpers/database';
import { value } from '../helpers/documents';
import { newPerson } from '../helpers/people';

const box = testDatabase();
const NEW_PASSWORD = 'threads across the loom';
const client = { userAgent: 'Test browser', addressPrefix: '192.0.2.0/24' };
let person: Awaited<ReturnType<typeof newPerson>>;
beforeEach(async () => {
  person = await newPerson(box.db, 'Zoe');
  await setPasswordHash(box.db, { userId: person.id, passwordHash: await hashPassword(GOOD_PASSWORD) });
});

const begin = () => beginSession(box.db, { userId: person.id, client, now: new Date() });
const find = (token: string) => findSession(box.db, { token, now: new Date() });

describe('a forgotten password', () => {
  it('is set by the link of the letter, which ends all sessions and is told by a second letter', async () => {
    const session = await begin();
    const { context, outbox, lastToken } = accountContext(box.db);
    value(await requestReset(context, { email: person.email }));
    value(await completeReset(context, { token: lastToken(), password: NEW_PASSWORD }));
    expect(await find(session)).toBeNull();
    expect((await checkSignIn(context, { email: person.email, password: NEW_PASSWORD })).ok).toBe(true);
    expect((await checkSignIn(context, { email: person.email, password: GOOD_PASSWORD })).ok).toBe(false);
    expect(outbox.at(-1)?.subject).toBe('Your Pinloom password was changed');
  });

  it('is set once with one link, even when it is used twice at the same moment', async () => {
    const { context, lastToken } = accountContext(box.db);
    value(await requestReset(context, { email: person.email }));
    const token = lastToken();
    const both = await Promise.all([
      completeReset(context, { token, password: NEW_PASSWORD }),
      completeReset(context, { token, password: 'another choice of words' }),
    ]);
    expect(both.filter((result) => result.ok)).toHaveLength(1);
  });

  it('has one link at a time: a newer one ends the older', async () => {
    const { context, lastToken } = accountContext(box.db);
    value(await requestReset(context, { email: person.email }));
    const older = lastToken();
    value(await requestReset(context, { email: person.email }));
    expect(await isResetOpen(context, older)).toBe(false);
    expect(await isResetOpen(context, lastToken())).toBe(true);
  });

  it('has a link that is good for 30 minutes', async () => {
    const { context, lastToken, at } = accountContext(box.db);
    value(await requestReset(context, { email: person.email }));
    const minutesLater = (minutes: number) => at(new Date(context.now.getTime() + minutes * 60_000));
    expect(await isResetOpen(minutesLater(29), lastToken())).toBe(true);
    expect(await isResetOpen(minutesLater(31), lastToken())).toBe(false);
  });

  it('is answered alike for an unknown address, which gets a letter without a token', async () => {
    const { context, outbox } = accountContext(box.db);
    const known = await requestReset(context, { email: person.email });
    const unknown = await requestReset(context, { email: 'unknown@tarnbrook.example' });
    expect(unknown).toEqual(known);
    expect(outbox[1]?.text).not.toContain('/reset/');
  });

  it('says when the letter could not be sent, for a known and an unknown address alike', async () => {
    const { context } = accountContext(box.db, { mailDown: true });
    const known = await requestReset(context, { email: person.email });
    const unknown = await requestReset(context, { email: 'unknown2@tarnbrook.example' });
    expect(known).toMatchObject({ error: { code: 'unavailable' } });
    expect(unknown).toEqual(known);
  });

  it('is changed even when the letter that tells of it could not be sent', async () => {
    const { context, lastToken } = accountContext(box.db);
    value(await requestReset(context, { email: person.email }));
    const down = accountContext(box.db, { mailDown: true }).context;
    expect((await completeReset(down, { token: lastToken(), password: NEW_PASSWORD })).ok).toBe(true);
  });

  it('sends three letters an hour at the most, and says nothing of it', async () => {
    const { context, outbox } = accountContext(box.db);
    for (let n = 0; n < 5; n++) expect((await requestReset(context, { email: person.email })).ok).toBe(true);
    expect(outbox).toHaveLength(3);
  });
});

describe('changing a password', () => {
  const who = (id: string) => ({ user: person, session: { id, createdAt: new Date() } });

  it('asks for the present one', async () => {
    const { context } = accountContext(box.db);
    const input = { current: 'not the present one', password: NEW_PASSWORD, endOthers: false };
    expect(await changePassword(context, who('x'), input)).toMatchObject({
      error: { code: 'invalid', fields: { current: 'This is not your present password.' } },
    });
  });

  it('ends the other sessions when asked to, and keeps its own', async () => {
    const [mine, other] = [await begin(), await begin()];
    const { context } = accountContext(box.db);
    const session = (await find(mine))?.session;
    const input = { current: GOOD_PASSWORD, password: NEW_PASSWORD, endOthers: true };
    expect(value(await changePassword(context, who(session?.id ?? ''), input)).endedSessions).toBe(1);
    expect(await find(mine)).not.toBeNull();
    expect(await find(other)).toBeNull();
    expect(await listSessions(box.db, { userId: person.id, now: new Date() })).toHaveLength(1);
  });

  it('leaves the other sessions when not', async () => {
    const other = await begin();
    const { context } = accountContext(box.db);
    const input = { current: GOOD_PASSWORD, password: NEW_PASSWORD, endOthers: false };
    value(await changePassword(context, who('x'), input));
    expect(await find(other)).not.toBeNull();
  });
});
