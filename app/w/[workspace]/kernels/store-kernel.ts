import 'server-only';
import type { Member } from '@/app/_server/access';
import { audit } from '@/app/_server/audit';
import { type AppResult, appError } from '@/app/_server/errors';
import { database } from '@/db/client';
import { createKernel } from '@/db/queries/kernels';
import { type Kernel, type Problem, validateKernel } from '@/lib/graph';
import type { Id } from '@/lib/ids';
import { err, ok } from '@/lib/result';

/** Faults that no draft may have: edits cannot make them, and the editor cannot show them. */
const broken: ReadonlySet<Problem['code']> = new Set(['duplicateId', 'missingOp']);

/** Checks a document that came from outside; the value is how many errors its draft has. */
export function countErrors(document: Kernel): AppResult<number> {
  const errors = validateKernel(document).filter((problem) => problem.severity === 'error');
  const fault = errors.find((problem) => broken.has(problem.code));
  return fault ? err(appError('invalid', fault.message)) : ok(errors.length);
}

/** Adds a kernel with this draft, and the entry in the record. */
export async function storeKernel(
  { user, workspace }: Pick<Member, 'user' | 'workspace'>,
  document: Kernel,
  action: string,
): Promise<AppResult<{ id: Id<'kernel'> }>> {
  const counted = countErrors(document);
  if (!counted.ok) return counted;
  return database().transaction(async (tx) => {
    const { id } = await createKernel(tx, {
      workspaceId: workspace.id,
      userId: user.id,
      document,
      errorCount: counted.value,
    });
    const detail = { name: document.name };
    await audit(tx, { user, workspace }, { action, subjectType: 'kernel', subjectId: id, detail });
    return ok({ id });
  });
}
