import type { Tx } from '../../db/client';
import { createAccount, createWorkspace } from '../../db/queries/accounts';
import { addMember } from '../../db/queries/members';
import type { Id } from '../../lib/ids';
import type { Role } from '../../lib/roles';

let count = 0;

/** An account whose password nobody knows; the address is new each time. */
export async function newPerson(
  tx: Tx,
  name = 'Architect',
): Promise<{ id: Id<'user'>; email: string; name: string }> {
  count += 1;
  const made = await createAccount(tx, {
    email: `person${count}@tarnbrook.example`,
    name,
    passwordHash: 'none',
  });
  if (!made.ok) throw new Error('The address was taken');
  return made.value;
}

/** A workspace with its owner. */
export async function newWorkspace(tx: Tx) {
  count += 1;
  const owner = await newPerson(tx, 'Owner');
  const name = `Workspace ${count}`;
  const made = await createWorkspace(tx, { name, wantedSlug: `workspace-${count}`, ownerId: owner.id });
  return { workspaceId: made.id, slug: made.slug, name, userId: owner.id, owner };
}

/** A new person as a member of the workspace. */
export async function newMember(tx: Tx, of: { workspaceId: Id<'workspace'> }, role: Role) {
  const person = await newPerson(tx);
  await addMember(tx, { workspaceId: of.workspaceId, userId: person.id, role });
  return person;
}
