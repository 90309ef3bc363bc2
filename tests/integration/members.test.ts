import { beforeEach, describe, expect, it } from 'vitest';
import {
  acceptAs,
  acceptAsNew,
  invite,
  inviteAgain,
  openInvitation,
  withdrawInvitation,
} from '../../app/_server/accounts/invite';
import { endMembership, setMemberRole, setWorkspaceName } from '../../app/_server/accounts/manage-members';
import { findAccount } from '../../db/queries/accounts';
import { listAudit } from '../../db/queries/audit';
import {
  addMember,
  findMembership,
  listMembers,
  listMemberships,
  noteOpened,
  removeMember,
} from '../../db/queries/members';
import type { Id } from '../../lib/ids';
import { accountContext, GOOD_PASSWORD } from '../helpers/account-context';
import { testDatabase } from '../helpers/database';
import { value } from '../helpers/documents';
import { newMember, newPerson, newWorkspace } from '../helpers/people';

const box = testDatabase();
const DAY_MS = 86_400_000;
let of: Awaited<ReturnType<typeof newWorkspace>>;
beforeEach(async () => {
  of = await newWorkspace(box.db);
});

const by = () => ({ user: of.owner, workspace: { id: of.workspaceId, slug: of.slug, name: of.name } });
const roleOf = async (userId: Id<'user'>) => (await findMembership(box.db, { slug: of.slug, userId }))?.role;

async function invited(email: string) {
  const letters = accountContext(box.db);
  const { id } = value(await invite(letters.context, by(), { email, role: 'editor' }));
  return { ...letters, id, token: letters.lastToken() };
}

describe('an invitation', () => {
  it('makes a new person an editor with an account', async () => {
    const { context, token } = await invited('new-editor@tarnbrook.example');
    const joined = value(await acceptAsNew(context, { token, name: 'Compiler', password: GOOD_PASSWORD }));
    expect(joined.workspaceSlug).toBe(of.slug);
    expect(await roleOf(joined.userId)).toBe('editor');
  });

  it('makes a person with an account an editor', async () => {
    const person = await newPerson(box.db);
    const { context, token } = await invited(person.email);
    value(await acceptAs(context, { user: person }, { token }));
    expect(await roleOf(person.id)).toBe('editor');
  });

  it('is accepted once, also by two at the same moment, and leaves no account of the second', async () => {
    const { context, token } = await invited('race@tarnbrook.example');
    const person = await newPerson(box.db);
    const input = { token, name: 'Compiler', password: GOOD_PASSWORD };
    const results = await Promise.allSettled([acceptAsNew(context, input), acceptAsNew(context, input)]);
    expect(results.filter((one) => one.status === 'fulfilled' && one.value.ok)).toHaveLength(1);
    expect(await acceptAs(context, { user: person }, { token })).toMatchObject({
      error: { code: 'not_found' },
    });
    expect(await listMembers(box.db, of)).toHaveLength(2);
  });

  it('is for its own address only', async () => {
    const { context, token } = await invited('invited@tarnbrook.example');
    const stranger = await newPerson(box.db);
    expect(await acceptAs(context, { user: stranger }, { token })).toMatchObject({
      error: { code: 'forbidden' },
    });
    expect(await roleOf(stranger.id)).toBeUndefined();
  });

  it('refuses a weak password without making an account', async () => {
    const { context, token } = await invited('weak@tarnbrook.example');
    const input = { token, name: 'Compiler', password: 'weak@tarnbrook.example' };
    expect(await acceptAsNew(context, input)).toMatchObject({ error: { code: 'invalid' } });
    expect(await findAccount(box.db, { email: 'weak@tarnbrook.example' })).toBeNull();
  });

  it('ends after 7 days', async () => {
    const { context, token, at } = await invited('slow@tarnbrook.example');
    const daysLater = (days: number) => at(new Date(context.now.getTime() + days * DAY_MS));
    expect(await openInvitation(daysLater(6.9), token)).not.toBeNull();
    expect(await openInvitation(daysLater(7.1), token)).toBeNull();
  });

  it('ends when it is withdrawn', async () => {
    const { context, token, id } = await invited('unwanted@tarnbrook.example');
    value(await withdrawInvitation(context, by(), { invitationId: id }));
    expect(await openInvitation(context, token)).toBeNull();
    expect(await withdrawInvitation(context, by(), { invitationId: id })).toMatchObject({ ok: false });
  });

  it('sent again has a new link, and the older one ends', async () => {
    const { context, token, id, lastToken } = await invited('again@tarnbrook.example');
    value(await inviteAgain(context, by(), { invitationId: id }));
    expect(await openInvitation(context, token)).toBeNull();
    expect((await openInvitation(context, lastToken()))?.email).toBe('again@tarnbrook.example');
  });

  it('is not sent twice to one address, nor to a member', async () => {
    const { context } = await invited('pending@tarnbrook.example');
    const member = await newMember(box.db, of, 'viewer');
    const to = (email: string) => invite(context, by(), { email, role: 'viewer' });
    expect(await to('pending@tarnbrook.example')).toMatchObject({ error: { code: 'conflict' } });
    expect(await to(member.email)).toMatchObject({ error: { code: 'conflict' } });
  });
});

describe('the last owner', () => {
  it('is neither demoted nor removed', async () => {
    const expected = { error: { code: 'conflict', message: expect.stringContaining('at least one owner') } };
    expect(await setMemberRole(box.db, by(), { userId: of.userId, role: 'editor' })).toMatchObject(expected);
    expect(await endMembership(box.db, by(), { userId: of.userId })).toMatchObject(expected);
    expect(await roleOf(of.userId)).toBe('owner');
  });

  it('stays when two owners leave at the same moment', async () => {
    for (let round = 0; round < 5; round++) {
      const second = await newMember(box.db, of, 'owner');
      const leave = (userId: Id<'user'>) => removeMember(box.db, { workspaceId: of.workspaceId, userId });
      const results = await Promise.all([leave(of.userId), leave(second.id)]);
      expect(results.filter((result) => result.ok)).toHaveLength(1);
      of = await newWorkspace(box.db);
    }
  });

  it('may go when another is owner', async () => {
    const second = await newMember(box.db, of, 'editor');
    value(await setMemberRole(box.db, by(), { userId: second.id, role: 'owner' }));
    value(await endMembership(box.db, by(), { userId: of.userId }));
    expect(await roleOf(of.userId)).toBeUndefined();
  });
});

describe('changes by an owner', () => {
  it('stand in the record with who and what', async () => {
    const member = await newMember(box.db, of, 'viewer');
    value(await setMemberRole(box.db, by(), { userId: member.id, role: 'reviewer' }));
    value(await endMembership(box.db, by(), { userId: member.id }));
    value(await setWorkspaceName(box.db, by(), { name: 'Renamed' }));
    const entries = await listAudit(box.db, of);
    expect(entries.map(({ action, actorName }) => `${actorName}: ${action}`)).toEqual([
      'Owner: workspace renamed',
      'Owner: member removed',
      'Owner: role changed',
    ]);
    expect(entries[2]?.detail).toEqual({ name: member.name, before: 'viewer', after: 'reviewer' });
  });

  it('are read page by page, each entry once', async () => {
    const member = await newMember(box.db, of, 'viewer');
    for (const role of ['editor', 'viewer', 'editor', 'viewer', 'editor'] as const) {
      value(await setMemberRole(box.db, by(), { userId: member.id, role }));
    }
    const first = await listAudit(box.db, { ...of, limit: 3 });
    const rest = await listAudit(box.db, { ...of, limit: 3, beforeId: first[2]?.id });
    expect([first.length, rest.length]).toEqual([3, 2]);
    expect(new Set([...first, ...rest].map((entry) => entry.id)).size).toBe(5);
  });
});

describe("a person's workspaces", () => {
  it('have the one opened last first', async () => {
    const person = await newMember(box.db, of, 'viewer');
    const other = await newWorkspace(box.db);
    await addMember(box.db, { workspaceId: other.workspaceId, userId: person.id, role: 'viewer' });
    const slugs = async () =>
      (await listMemberships(box.db, { userId: person.id })).map((m) => m.workspace.slug);
    await noteOpened(box.db, { workspaceId: of.workspaceId, userId: person.id, now: new Date('2030-01-01') });
    expect(await slugs()).toEqual([of.slug, other.slug]);
    await noteOpened(box.db, {
      workspaceId: other.workspaceId,
      userId: person.id,
      now: new Date('2030-01-02'),
    });
    expect(await slugs()).toEqual([other.slug, of.slug]);
  });
});
