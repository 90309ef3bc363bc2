import { describe, expect, it } from 'vitest';
import { checkSignIn } from '../../app/_server/accounts/sign-in';
import { completeSignUp, requestSignUp, signUpAddressOf } from '../../app/_server/accounts/sign-up';
import { findCredentials } from '../../db/queries/accounts';
import { listAudit } from '../../db/queries/audit';
import { findMembership } from '../../db/queries/members';
import { accountContext, GOOD_PASSWORD } from '../helpers/account-context';
import { testDatabase } from '../helpers/database';
import { value } from '../helpers/documents';

const box = testDatabase();
const HOUR_MS = 3_600_000;

async function signedUp(email: string, workspaceName = 'Stream gauges') {
  const { context, lastToken } = accountContext(box.db);
  value(await requestSignUp(context, { email }));
  const input = { token: lastToken(), name: 'Field lead', workspaceName, password: GOOD_PASSWORD };
  return { context, input, made: value(await completeSignUp(context, input)) };
}

describe('signing up', () => {
  it('makes the account, the workspace and its owner, with an entry in the record', async () => {
    const { made } = await signedUp('lead@tarnbrook.example');
    const membership = await findMembership(box.db, { slug: made.workspaceSlug, userId: made.userId });
    expect(membership).toMatchObject({
      role: 'owner',
      workspace: { name: 'Stream gauges', slug: 'stream-gauges' },
    });
    const entries = await listAudit(box.db, { workspaceId: membership?.workspace.id ?? 'workspace_' });
    expect(entries.map((entry) => entry.action)).toEqual(['workspace created']);
  });

  it('stores the password as Argon2id with m = 47104 KiB, t = 1, p = 1 (ASVS 5.0, appendix C)', async () => {
    await signedUp('hash@tarnbrook.example');
    const stored = await findCredentials(box.db, { email: 'hash@tarnbrook.example' });
    expect(stored?.passwordHash).toMatch(/^\$argon2id\$v=19\$m=47104,t=1,p=1\$/);
  });

  it('gives a second workspace of one name another address', async () => {
    const one = await signedUp('first@tarnbrook.example', 'Hive');
    const two = await signedUp('second@tarnbrook.example', 'Hive');
    expect([one.made.workspaceSlug, two.made.workspaceSlug]).toEqual(['hive', 'hive-2']);
  });

  it('uses its link up', async () => {
    const { context, input } = await signedUp('once@tarnbrook.example');
    expect(await completeSignUp(context, input)).toMatchObject({ error: { code: 'not_found' } });
  });

  it('lets its link end after 24 hours', async () => {
    const { context, lastToken, at } = accountContext(box.db);
    value(await requestSignUp(context, { email: 'late@tarnbrook.example' }));
    const day = (ms: number) => at(new Date(context.now.getTime() + 24 * HOUR_MS + ms));
    expect(await signUpAddressOf(day(-1000), lastToken())).toBe('late@tarnbrook.example');
    expect(await signUpAddressOf(day(1000), lastToken())).toBeNull();
  });

  it('answers the same for an address that has an account, which learns of it by letter', async () => {
    await signedUp('twice@tarnbrook.example');
    const { context, outbox } = accountContext(box.db);
    const again = await requestSignUp(context, { email: 'twice@tarnbrook.example' });
    const fresh = await requestSignUp(context, { email: 'never@tarnbrook.example' });
    expect(again).toEqual(fresh);
    expect(outbox.map((letter) => letter.subject)).toEqual([
      'You already have a Pinloom account',
      'Confirm your address for Pinloom',
    ]);
  });

  it('refuses a weak password and keeps the link usable', async () => {
    const { context, lastToken } = accountContext(box.db);
    value(await requestSignUp(context, { email: 'weak@tarnbrook.example' }));
    const input = { token: lastToken(), name: 'Field lead', workspaceName: 'Slope', password: 'too short' };
    expect(await completeSignUp(context, input)).toMatchObject({ error: { code: 'invalid' } });
    expect((await completeSignUp(context, { ...input, password: GOOD_PASSWORD })).ok).toBe(true);
  });
});

describe('signing in', () => {
  it('lets in with the right password only', async () => {
    const { made } = await signedUp('in@tarnbrook.example');
    const { context } = accountContext(box.db);
    const email = 'in@tarnbrook.example';
    expect(await checkSignIn(context, { email, password: GOOD_PASSWORD })).toEqual({
      ok: true,
      value: { userId: made.userId },
    });
    expect(await checkSignIn(context, { email, password: `${GOOD_PASSWORD} ` })).toMatchObject({ ok: false });
  });

  it('answers an unknown address as it answers a wrong password', async () => {
    await signedUp('known@tarnbrook.example');
    const { context } = accountContext(box.db);
    const wrong = await checkSignIn(context, {
      email: 'known@tarnbrook.example',
      password: 'not this one at all',
    });
    const unknown = await checkSignIn(context, {
      email: 'ghost@tarnbrook.example',
      password: 'not this one at all',
    });
    expect(wrong).toEqual(unknown);
  });

  it('accepts the same characters composed in another way', async () => {
    const { context, lastToken } = accountContext(box.db);
    value(await requestSignUp(context, { email: 'umlaut@tarnbrook.example' }));
    const rest = { token: lastToken(), name: 'Lead', workspaceName: 'Umlaut' };
    value(await completeSignUp(context, { ...rest, password: 'Bäche über Wiesen' }));
    const decomposed = 'Bäche über Wiesen'.normalize('NFD');
    expect((await checkSignIn(context, { email: 'umlaut@tarnbrook.example', password: decomposed })).ok).toBe(
      true,
    );
  });

  it('stops after ten wrong tries from one address, not for other addresses', async () => {
    await signedUp('target@tarnbrook.example');
    const attacker = accountContext(box.db).context;
    const wrong = { email: 'target@tarnbrook.example', password: 'guess after guess after guess' };
    for (let n = 0; n < 10; n++) expect((await checkSignIn(attacker, wrong)).ok).toBe(false);
    const right = { ...wrong, password: GOOD_PASSWORD };
    expect(await checkSignIn(attacker, right)).toMatchObject({ error: { code: 'rate_limited' } });
    expect((await checkSignIn(accountContext(box.db).context, right)).ok).toBe(true);
  });

  it('counts no failures from before the right password', async () => {
    await signedUp('mistyper@tarnbrook.example');
    const { context } = accountContext(box.db);
    const email = 'mistyper@tarnbrook.example';
    const results: boolean[] = [];
    for (let n = 0; n < 3; n++) {
      for (let m = 0; m < 8; m++) await checkSignIn(context, { email, password: 'mistyped once more' });
      results.push((await checkSignIn(context, { email, password: GOOD_PASSWORD })).ok);
    }
    expect(results).toEqual([true, true, true]);
  });
});
