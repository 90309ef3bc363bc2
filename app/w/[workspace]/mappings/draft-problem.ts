import { type AppError, appError, notFound } from '@/app/_server/errors';
import type { SaveProblem } from '@/db/queries/save-problem';

/** Why a bench was not saved or kept, as a sentence that says what to do. */
export function draftProblem(problem: SaveProblem): AppError {
  if (problem.code === 'not_found') return notFound('bench');
  if (problem.code === 'archived') {
    return appError(
      'conflict',
      'This bench is archived. Restore it in the list of mappings, then try again.',
    );
  }
  return appError(
    'conflict',
    `${problem.updatedByName} saved this bench in the meantime. Look at what is stored now, then try again.`,
  );
}
