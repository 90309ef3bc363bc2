import 'server-only';
import type { Member } from '@/app/_server/access';
import { audit } from '@/app/_server/audit';
import { database } from '@/db/client';
import { createFabricVersion } from '@/db/queries/fabric-versions';
import { createFabric } from '@/db/queries/fabrics';
import type { Fabric } from '@/lib/fabric/fabric';
import { validateFabric } from '@/lib/fabric/validate-fabric';
import type { Id } from '@/lib/ids';

type Origin = 'fabric created' | 'fabric imported' | 'fabric duplicated';

/** Stores a new fabric with its first version, so that a kernel can be placed on it at once. */
export function addFabric(
  { user, workspace }: Pick<Member, 'user' | 'workspace'>,
  document: Fabric,
  origin: Origin,
): Promise<{ fabricId: Id<'fabric'> }> {
  const by = { workspaceId: workspace.id, userId: user.id };
  const errorCount = validateFabric(document).filter((problem) => problem.severity === 'error').length;
  return database().transaction(async (tx) => {
    const { id, revision } = await createFabric(tx, { ...by, document, errorCount });
    const version = await createFabricVersion(tx, { ...by, fabricId: id, revision, label: '' });
    if (!version.ok) throw new Error(`A new fabric could not be given a version: ${version.error}`);
    await audit(
      tx,
      { user, workspace },
      { action: origin, subjectType: 'fabric', subjectId: id, detail: { name: document.name } },
    );
    return { fabricId: id };
  });
}
