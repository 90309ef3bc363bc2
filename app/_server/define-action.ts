/**
 * The maker of every server action. Next compares Origin and Host before an action runs; this bounds the input's
 * size, checks access, parses the input and turns exceptions into results.
 */
import 'server-only';
import type { z } from 'zod';
import { err } from '@/lib/result';
import { type Access, admit, asAppError, type Caller, invalidInput } from './boundary';
import { type AppResult, appError } from './errors';

const DEFAULT_MAX_BYTES = 256 * 1024;

/** With `{ role }` the input must name the workspace: `workspace` is its slug. */
type InputFor<A extends Access> = A extends { role: unknown } ? z.ZodType<{ workspace: string }> : z.ZodType;

interface ActionSpec<A extends Access, S extends InputFor<A>, T> {
  /** For the log: `<noun>.<verb>`. */
  name: string;
  access: A;
  input: S;
  /** Of the input as JSON; default 256 KiB. Next's own limit (next.config) comes first. */
  maxBytes?: number;
  run(context: Caller<A> & { input: z.output<S> }): Promise<AppResult<T>>;
}

export function defineAction<const A extends Access, S extends InputFor<A>, T>(
  spec: ActionSpec<A, S, T>,
): (input: z.input<S>) => Promise<AppResult<T>> {
  return async (raw) => {
    try {
      if ((JSON.stringify(raw) ?? '').length > (spec.maxBytes ?? DEFAULT_MAX_BYTES)) {
        return err(
          appError('too_large', 'This is more than one request may carry. Make it smaller and try again.'),
        );
      }
      // Before the input is parsed: a stranger is not told what is wrong with it, and costs no more than this.
      const caller = await admit(spec.access, slugIn(raw));
      if (!caller.ok) return caller;
      const input = spec.input.safeParse(raw);
      if (!input.success) return err(invalidInput(input.error));
      // S is a schema under a condition, which hides its output from the compiler.
      return await spec.run({ ...caller.value, input: input.data as z.output<S> });
    } catch (thrown) {
      return err(await asAppError(thrown, `action ${spec.name}`));
    }
  };
}

function slugIn(input: unknown): string {
  if (typeof input !== 'object' || input === null || !('workspace' in input)) return '';
  return typeof input.workspace === 'string' ? input.workspace : '';
}
