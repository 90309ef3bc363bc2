/** Writes the Tarnbrook demonstration into a database that has no workspace yet. */
import { sql } from 'drizzle-orm';
import { compileFabric } from '../../lib/fabric/compile';
import { validateFabric } from '../../lib/fabric/validate-fabric';
import { validateKernel } from '../../lib/graph/validate';
import type { Id } from '../../lib/ids';
import type { MappingDocument } from '../../lib/mapping/mapping';
import { measureMapping } from '../../lib/mapping/metrics';
import { verifyMapping } from '../../lib/mapping/verify';
import type { Role } from '../../lib/roles';
import type { Database, Tx } from '../client';
import { hashPassword } from '../password-hash';
import { createAccount, createWorkspace } from '../queries/accounts';
import { createFabricVersion } from '../queries/fabric-versions';
import { createFabric } from '../queries/fabrics';
import { createKernelVersion } from '../queries/kernel-versions';
import { createKernel } from '../queries/kernels';
import { createMappingDraft } from '../queries/mapping-drafts';
import { keepMapping } from '../queries/mappings';
import { addMember } from '../queries/members';
import { workspaces } from '../schema';
import { type DemoFabric, demoFabrics } from './fabrics/index';
import { demoKernels } from './kernels/index';
import { type DemoMapping, demoMappings } from './mappings/index';

/** Printed at every start: these accounts are for looking around, not for keeping anything. */
export const DEMO_PASSWORD = 'woven on a small frame';

const demoPeople: readonly { handle: string; name: string; role: Role }[] = [
  { handle: 'lead', name: 'Team lead', role: 'owner' },
  { handle: 'architect', name: 'Architect', role: 'editor' },
  { handle: 'compiler', name: 'Compiler engineer', role: 'editor' },
  { handle: 'reviewer', name: 'Reviewer', role: 'reviewer' },
  { handle: 'student', name: 'Student', role: 'viewer' },
];

interface Scene {
  workspaceId: Id<'workspace'>;
  people: ReadonlyMap<string, Id<'user'>>;
  kernels: ReadonlyMap<string, { versionId: Id<'kernelversion'>; version: number }>;
  fabrics: ReadonlyMap<DemoFabric['key'], { versionId: Id<'fabricversion'>; version: number }>;
}

/** True when it wrote the demonstration; false when the database has a workspace already. */
export function seedDemo(db: Database): Promise<boolean> {
  return db.transaction(async (tx) => {
    const [found] = await tx.select({ some: sql<boolean>`true` }).from(workspaces).limit(1);
    if (found) return false;
    const { workspaceId, people } = await seedPeople(tx);
    const architect = people.get('architect')!;
    const scene: Scene = {
      workspaceId,
      people,
      kernels: await seedKernels(tx, workspaceId, people.get('compiler')!),
      fabrics: await seedFabrics(tx, workspaceId, architect),
    };
    for (const mapping of demoMappings) await seedMapping(tx, scene, mapping);
    return true;
  });
}

async function seedPeople(tx: Tx) {
  const people = new Map<string, Id<'user'>>();
  for (const { handle, name } of demoPeople) {
    const passwordHash = await hashPassword(DEMO_PASSWORD);
    const account = await createAccount(tx, { email: `${handle}@tarnbrook.example`, name, passwordHash });
    if (!account.ok) throw new Error(`${handle}@tarnbrook.example exists already`);
    people.set(handle, account.value.id);
  }
  const { id: workspaceId } = await createWorkspace(tx, {
    name: 'Tarnbrook',
    wantedSlug: 'tarnbrook',
    ownerId: people.get('lead')!,
  });
  for (const { handle, role } of demoPeople) {
    if (handle !== 'lead') await addMember(tx, { workspaceId, userId: people.get(handle)!, role });
  }
  return { workspaceId, people };
}

async function seedKernels(
  tx: Tx,
  workspaceId: Id<'workspace'>,
  userId: Id<'user'>,
): Promise<Scene['kernels']> {
  const made = new Map<string, { versionId: Id<'kernelversion'>; version: number }>();
  for (const { slug, kernel } of demoKernels) {
    const errorCount = validateKernel(kernel).filter((problem) => problem.severity === 'error').length;
    const { id: kernelId, revision } = await createKernel(tx, {
      workspaceId,
      userId,
      document: kernel,
      errorCount,
    });
    const version = await createKernelVersion(tx, {
      workspaceId,
      userId,
      kernelId,
      revision,
      label: 'First',
    });
    if (!version.ok) throw new Error(`The kernel ${slug} could not be kept: ${version.error}`);
    made.set(slug, { versionId: version.value.id, version: version.value.number });
  }
  return made;
}

async function seedFabrics(
  tx: Tx,
  workspaceId: Id<'workspace'>,
  userId: Id<'user'>,
): Promise<Scene['fabrics']> {
  const made = new Map<DemoFabric['key'], { versionId: Id<'fabricversion'>; version: number }>();
  for (const { key, fabric } of demoFabrics) {
    const errorCount = validateFabric(fabric).filter((problem) => problem.severity === 'error').length;
    const { id: fabricId, revision } = await createFabric(tx, {
      workspaceId,
      userId,
      document: fabric,
      errorCount,
    });
    const version = await createFabricVersion(tx, {
      workspaceId,
      userId,
      fabricId,
      revision,
      label: 'First',
    });
    if (!version.ok) throw new Error(`The fabric ${key} could not be kept: ${version.error}`);
    made.set(key, { versionId: version.value.id, version: version.value.number });
  }
  return made;
}

async function seedMapping(tx: Tx, scene: Scene, mapping: DemoMapping): Promise<void> {
  const { workspaceId } = scene;
  const userId = scene.people.get(mapping.madeBy)!;
  const kernel = demoKernels.find((each) => each.slug === mapping.kernelSlug)!.kernel;
  const fabric = demoFabrics.find((each) => each.key === mapping.fabricKey)!.fabric;
  const kernelVersion = scene.kernels.get(mapping.kernelSlug)!;
  const fabricVersion = scene.fabrics.get(mapping.fabricKey)!;
  const { placement, pins, routes, provenance, name } = mapping;
  const metrics = measureMapping(kernel, compileFabric(fabric), { placement, routes });
  const figures = {
    wireHops: metrics.totalWireHops,
    pathHops: metrics.totalPathHops,
    longestPathHops: metrics.longestPathHops,
    linksUsed: metrics.linksUsed,
    fullestLinkNets: metrics.fullestLink?.nets ?? 0,
  };
  const draft = await createMappingDraft(tx, {
    workspaceId,
    userId,
    name,
    kernelVersionId: kernelVersion.versionId,
    fabricVersionId: fabricVersion.versionId,
    start: {
      document: { placement, pins, routes },
      provenance,
      figures: { placedOps: metrics.placedOps, ...figures },
    },
  });
  if (!draft.ok) throw new Error(`The bench of ${name} could not be made: ${draft.error}`);
  if (!mapping.kept) return;
  const broken = verifyMapping(kernel, fabric, { placement, routes, pins });
  if (broken.length > 0) throw new Error(`${name} is not legal: ${broken[0]!.message}`);
  const document: MappingDocument = {
    format: 'pinloom.mapping',
    formatVersion: 1,
    name,
    kernel: { name: kernel.name, version: kernelVersion.version },
    fabric: { name: fabric.name, version: fabricVersion.version },
    placement,
    pins,
    routes,
    provenance,
  };
  const kept = await keepMapping(tx, {
    workspaceId,
    userId,
    draftId: draft.value.id,
    revision: 1,
    document,
    figures,
  });
  if (!kept.ok) throw new Error(`${name} could not be kept: ${kept.error.code}`);
}
