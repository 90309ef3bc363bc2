import { Instant } from '../fabric-list/instant';

export interface FabricVersionRow {
  number: number;
  label: string;
  createdByName: string;
  /** ISO 8601. */
  createdAt: string;
}

interface VersionListProps {
  workspace: string;
  fabricId: string;
  versions: readonly FabricVersionRow[];
}

/** The numbered states that mappings stand on; each can be saved as a file. */
export function VersionList({ workspace, fabricId, versions }: VersionListProps) {
  return (
    <section aria-label="Versions" className="text-sm">
      <h2 className="mb-1 text-xs font-semibold tracking-widest text-quiet uppercase">Versions</h2>
      {versions.length === 0 ? (
        <p className="text-quiet">None is kept yet. A mapping needs one to stand on.</p>
      ) : (
        <ol reversed className="space-y-2">
          {versions.map((version) => (
            <li key={version.number} className="flex items-baseline justify-between gap-3">
              <span>
                <span className="font-mono font-semibold">{version.number}</span> {version.label}
                <span className="block text-quiet">
                  <Instant at={version.createdAt} /> by {version.createdByName}
                </span>
              </span>
              <a
                className="font-semibold text-indigo underline"
                href={`/api/w/${workspace}/fabrics/${fabricId}/export?version=${version.number}`}
                download
                aria-label={`Export version ${version.number} as JSON`}
              >
                JSON
              </a>
            </li>
          ))}
        </ol>
      )}
    </section>
  );
}
