/** What the editor and the list ask of the server. The pages hand these in; components know no server code. */
import type { Kernel } from '@/lib/graph';
import type { Id } from '@/lib/ids';
import type { Result } from '@/lib/result';

export interface CallError {
  code: string;
  /** A sentence that says what to do. */
  message: string;
}
export type CallResult<T> = Promise<Result<T, CallError>>;

interface InWorkspace {
  workspace: string;
}
interface OfKernel extends InWorkspace {
  kernelId: Id<'kernel'>;
}

export type SaveOutcome =
  | { outcome: 'saved'; revision: number; savedAt: string }
  | { outcome: 'conflict'; revision: number; document: Kernel; changedByName: string };

export interface EditorCalls {
  save(input: OfKernel & { revision: number; document: Kernel }): CallResult<SaveOutcome>;
  create(input: InWorkspace & { document: Kernel }): CallResult<{ id: Id<'kernel'> }>;
  keepVersion(
    input: OfKernel & { revision: number; label: string },
  ): CallResult<{ number: number; created: boolean }>;
}

/** A version as the list of versions shows it, and with its document. Dates travel as ISO texts. */
export interface VersionSummary {
  number: number;
  label: string;
  opCount: number;
  edgeCount: number;
  createdByName: string;
  createdAt: string;
}

export interface KernelPlaces {
  workspace: string;
  kernelId: Id<'kernel'>;
}

export const kernelPath = ({ workspace, kernelId }: KernelPlaces): string =>
  `/w/${workspace}/kernels/${kernelId}`;
export const versionPath = (places: KernelPlaces, number: number): string =>
  `${kernelPath(places)}/versions/${number}`;
const apiPath = ({ workspace, kernelId }: KernelPlaces): string => `/api/w/${workspace}/kernels/${kernelId}`;
export const versionsApi = (places: KernelPlaces): string => `${apiPath(places)}/versions`;
export const versionApi = (places: KernelPlaces, number: number): string =>
  `${versionsApi(places)}/${number}`;
/** The draft as a file, or a version of it. */
export const exportApi = (places: KernelPlaces, format: 'json' | 'dot', number?: number): string =>
  `${apiPath(places)}/export?format=${format}${number === undefined ? '' : `&version=${number}`}`;
