/** Actions and routes with real sessions on a real database; only Next's access to the request is stood in for. */
import { beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { defineAction } from '../../app/_server/define-action';
import { defineRoute } from '../../app/_server/define-route';
import { appError, refuse } from '../../app/_server/errors';
import { currentSession, signInAs, signOut } from '../../app/_server/session';
import * as memberActions from '../../app/w/[workspace]/settings/members/actions';
import { renameWorkspaceAction } from '../../app/w/[workspace]/settings/workspace/actions';
import { closeDatabase, database } from '../../db/client';
import { newId } from '../../db/ids';
import { renameAccount } from '../../db/queries/accounts';
import { findMembership, listMembers } from '../../db/queries/members';
import type { Id } from '../../lib/ids';
import { ok } from '../../lib/result';
import type { Role } from '../../lib/roles';
import { testDatabase } from '../helpers/database';
import { newMember, newPerson, newWorkspace } from '../helpers/people';

interface StoredCookie {
  value: string;
  attributes: Record<string, unknown>;
}
const request = vi.hoisted(() => ({ jar: new Map<string, StoredCookie>() }));
vi.mock('next/headers', () => ({
  headers: async () => new Headers({ 'user-agent': 'Test browser', 'x-forwarded-for': '192.0.2.7' }),
  cookies: async () => ({
    get: (name: string) => request.jar.get(name),
    set: (name: string, value: string, attributes: Record<string, unknown>) =>
      request.jar.set(name, { value, attributes }),
  }),
}));

const box = testDatabase();
let of: Awaited<ReturnType<typeof newWorkspace>>;
beforeAll(() => {
  process.env.DATABASE_URL = box.url;
  process.env.LOG_LEVEL = 'silent';
  delete process.env.COOKIE_SECURE;
  return closeDatabase;
});
beforeEach(async () => {
  request.jar.clear();
  of = await newWorkspace(box.db);
});

const signInRole = async (role: Role) => signInAs((await newMember(box.db, of, role)).id);
const code = (result: { ok: boolean; error?: { code: string } }) => (result.ok ? 'ok' : result.error?.code);

describe('the session cookie', () => {
  it('is __Host-, HttpOnly, Secure and SameSite (ASVS 5.0, 3.3.1 to 3.3.4)', async () => {
    await signInAs(of.userId);
    const [name, cookie] = [...request.jar.entries()][0] ?? [];
    expect(name).toMatch(/^__Host-/);
    expect(cookie?.attributes).toMatchObject({ httpOnly: true, secure: true, sameSite: 'lax', path: '/' });
    expect(cookie?.attributes).not.toHaveProperty('domain');
    expect((await currentSession())?.user.id).toBe(of.userId);
  });

  it('is another one after signing in again, and the earlier one is worthless', async () => {
    await signInAs(of.userId);
    const earlier = new Map(request.jar);
    await signInAs(of.userId);
    expect([...request.jar.values()][0]?.value).not.toBe([...earlier.values()][0]?.value);
    request.jar = earlier;
    expect(await currentSession()).toBeNull();
  });

  it('is worthless after signing out', async () => {
    await signInAs(of.userId);
    const earlier = new Map(request.jar);
    await signOut();
    request.jar = earlier;
    expect(await currentSession()).toBeNull();
  });
});

describe('an action for editors', () => {
  const action = defineAction({
    name: 'test.edit',
    access: { role: 'editor' },
    input: z.object({ workspace: z.string(), size: z.number().int().min(1) }),
    maxBytes: 1000,
    run: async ({ input, user, workspace, role }) =>
      ok({ size: input.size, user: user.id, slug: workspace.slug, role }),
  });
  const call = () => action({ workspace: of.slug, size: 1 });

  it.each([
    ['viewer', 'forbidden'],
    ['reviewer', 'forbidden'],
    ['editor', 'ok'],
    ['owner', 'ok'],
  ] as const)('answers a %s with %s', async (role, expected) => {
    await signInRole(role);
    expect(code(await call())).toBe(expected);
  });

  it('is not found for somebody of another workspace, as for a workspace that is not there', async () => {
    await signInAs((await newWorkspace(box.db)).userId);
    const theirs = await call();
    const nowhere = await action({ workspace: 'nowhere', size: 1 });
    expect(theirs).toMatchObject({ error: { code: 'not_found' } });
    expect(theirs).toEqual(nowhere);
  });

  it('asks who is signed out to sign in', async () => {
    expect(code(await call())).toBe('not_signed_in');
  });

  it('says nothing about the input to somebody who may not call it', async () => {
    expect(code(await action({ workspace: of.slug, size: 0 }))).toBe('not_signed_in');
    await signInRole('viewer');
    expect(code(await action({ workspace: of.slug, size: 0 }))).toBe('forbidden');
  });

  it.each([
    ['a zero byte', '\0'],
    ['a long text', 'a'.repeat(900)],
    ['no text', null as unknown as string],
  ])('finds no workspace for %s', async (_, workspace) => {
    await signInRole('owner');
    expect(code(await action({ workspace, size: 1 }))).toBe('not_found');
  });

  it('names the field that was refused', async () => {
    await signInRole('editor');
    expect(await action({ workspace: of.slug, size: 0 })).toMatchObject({
      error: { code: 'invalid', fields: { size: expect.any(String) } },
    });
  });

  it('refuses what is too large before it reads it', async () => {
    const large = { workspace: 'x'.repeat(2000), size: 1 };
    expect(code(await action(large))).toBe('too_large');
  });
});

describe('an action that fails', () => {
  const failing = (fail: () => never) =>
    defineAction({
      name: 'test.fail',
      access: 'signed in',
      input: z.object({}),
      run: ({ user }) =>
        database().transaction(async (tx) => {
          await renameAccount(tx, { userId: user.id, name: 'Half done' });
          return fail();
        }),
    });
  const nameOf = async () => (await listMembers(box.db, of))[0]?.name;

  it('tells an incident id, nothing of the cause, and changes nothing', async () => {
    await signInAs(of.userId);
    const result = await failing(() => {
      throw new Error('secret detail of the database');
    })({});
    expect(result).toMatchObject({
      error: { code: 'internal', incidentId: expect.stringMatching(/^[0-9a-f]{12}$/) },
    });
    expect(JSON.stringify(result)).not.toContain('secret');
    expect(await nameOf()).toBe('Owner');
  });

  it('passes a refusal on, and changes nothing', async () => {
    await signInAs(of.userId);
    const result = await failing(() => refuse(appError('conflict', 'Somebody was quicker.')))({});
    expect(result).toEqual({ ok: false, error: { code: 'conflict', message: 'Somebody was quicker.' } });
    expect(await nameOf()).toBe('Owner');
  });
});

describe('a route for viewers', () => {
  const route = defineRoute({
    name: 'test.route',
    access: { role: 'viewer' },
    params: z.object({ workspace: z.string() }),
    body: z.object({ size: z.number() }),
    maxBytes: 100,
    run: async ({ workspace, body }) => ok({ slug: workspace.slug, body }),
  });
  const address = 'https://pinloom.example/api/x';
  const context = () => ({ params: Promise.resolve({ workspace: of.slug }) });
  const post = (headers: Record<string, string>, body = '{"size":2}') =>
    route(
      new Request(address, { method: 'POST', body, headers: { host: 'pinloom.example', ...headers } }),
      context(),
    );
  const own = { 'sec-fetch-site': 'same-origin' };

  it('answers a member with JSON that no cache may store', async () => {
    await signInRole('viewer');
    const response = await post(own);
    expect(response.headers.get('cache-control')).toBe('no-store');
    expect(await response.json()).toEqual({ slug: of.slug, body: { size: 2 } });
  });

  it('answers others with problem details (RFC 9457)', async () => {
    await signInAs((await newPerson(box.db)).id);
    const response = await post(own);
    expect(response.status).toBe(404);
    expect(response.headers.get('content-type')).toBe('application/problem+json');
    expect(await response.json()).toMatchObject({ status: 404, code: 'not_found', title: 'not found' });
  });

  it.each([
    ['another site', { 'sec-fetch-site': 'cross-site' }],
    ['a sibling host', { 'sec-fetch-site': 'same-site' }],
    ['another origin in an older browser', { origin: 'https://other.example' }],
    ['an opaque origin', { origin: 'null' }],
    ['nobody knows where', {}],
  ])('carries out no change that comes from %s', async (_, headers) => {
    await signInRole('viewer');
    expect((await post(headers as Record<string, string>)).status).toBe(403);
  });

  it('carries out a change from our own origin in an older browser', async () => {
    await signInRole('viewer');
    expect((await post({ origin: 'https://pinloom.example' })).status).toBe(200);
  });

  it.each([
    ['is not JSON', '{', 422],
    ['has the wrong form', '{"size":"2"}', 422],
    ['is too large', `{"size":2,"more":"${'x'.repeat(200)}"}`, 413],
  ])('refuses a body that %s', async (_, body, status) => {
    await signInRole('viewer');
    expect((await post(own, body)).status).toBe(status);
  });
});

describe("the owners' actions", () => {
  const id = <K extends 'user' | 'invitation'>(kind: K) => newId(kind);
  const calls: [
    string,
    (workspace: string, target: Id<'user'>) => Promise<{ ok: boolean; error?: { code: string } }>,
  ][] = [
    [
      'invite',
      (workspace) => memberActions.inviteAction({ workspace, email: 'x@tarnbrook.example', role: 'viewer' }),
    ],
    [
      'invite again',
      (workspace) => memberActions.inviteAgainAction({ workspace, invitationId: id('invitation') }),
    ],
    [
      'withdraw',
      (workspace) => memberActions.withdrawInvitationAction({ workspace, invitationId: id('invitation') }),
    ],
    ['set a role', (workspace, userId) => memberActions.setRoleAction({ workspace, userId, role: 'viewer' })],
    ['remove', (workspace, userId) => memberActions.removeMemberAction({ workspace, userId })],
    ['rename', (workspace) => renameWorkspaceAction({ workspace, name: 'Taken over' })],
  ];

  it.each(calls)(
    'to %s are forbidden to an editor, and not found for an owner of another workspace',
    async (_, call) => {
      const target = await newMember(box.db, of, 'owner');
      await signInRole('editor');
      expect(code(await call(of.slug, target.id))).toBe('forbidden');
      request.jar.clear();
      await signInAs((await newWorkspace(box.db)).userId);
      expect(code(await call(of.slug, target.id))).toBe('not_found');
      const membership = await findMembership(box.db, { slug: of.slug, userId: target.id });
      expect(membership).toMatchObject({ role: 'owner', workspace: { name: of.name } });
    },
  );

  it('let a member leave, and nobody else with it', async () => {
    const member = await newMember(box.db, of, 'viewer');
    await signInAs(member.id);
    expect(code(await memberActions.leaveAction({ workspace: of.slug }))).toBe('ok');
    expect((await listMembers(box.db, of)).map((one) => one.userId)).toEqual([of.userId]);
  });
});
