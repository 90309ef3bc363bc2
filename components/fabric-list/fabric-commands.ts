import type { FabricFormInput } from '@/components/fabric-form/form-values';
import type { Id } from '@/lib/ids';
import type { Result } from '@/lib/result';

export interface Refusal {
  code: string;
  message: string;
  fields?: Record<string, string>;
}
type Answer<T> = Promise<Result<T, Refusal>>;
type OneFabric = { workspace: string; fabricId: Id<'fabric'> };

/** What the server offers for fabrics. The page hands them down; where a role may not, the page leaves them out. */
export interface FabricCommands {
  create: (input: { workspace: string; form: FabricFormInput }) => Answer<{ fabricId: Id<'fabric'> }>;
  import: (input: { workspace: string; text: string }) => Answer<{ fabricId: Id<'fabric'> }>;
  duplicate: (input: OneFabric) => Answer<{ fabricId: Id<'fabric'> }>;
  rename: (input: OneFabric & { name: string }) => Answer<null>;
  archive: (input: OneFabric & { archived: boolean }) => Answer<{ name: string }>;
  keepVersion: (
    input: OneFabric & { revision: number; label: string },
  ) => Answer<{ number: number; created: boolean }>;
}

export const UNREACHABLE_SERVER = 'The server could not be reached. Nothing was changed; try again.';
