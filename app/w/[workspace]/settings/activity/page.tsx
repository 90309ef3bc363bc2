import type { Metadata } from 'next';
import { requireMember } from '@/app/_server/access';
import { ButtonLink } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/notice';
import { database } from '@/db/client';
import { listAudit } from '@/db/queries/audit';
import { parseId } from '@/lib/ids';
import { Moment } from '../moment';
import { SettingsBar } from '../settings-bar';
import { detailText } from './detail-text';

export const metadata: Metadata = { title: 'Activity' };

const PAGE = 50;

interface ActivityPageProps {
  params: Promise<{ workspace: string }>;
  searchParams: Promise<{ before?: string | string[] }>;
}

export default async function ActivityPage({ params, searchParams }: ActivityPageProps) {
  const { workspace } = await requireMember((await params).workspace);
  const { before } = await searchParams;
  const from = typeof before === 'string' ? parseId('audit', before) : null;
  const entries = await listAudit(database(), {
    workspaceId: workspace.id,
    limit: PAGE,
    ...(from ? { beforeId: from } : {}),
  });
  const last = entries.at(-1);
  return (
    <>
      <SettingsBar workspaceSlug={workspace.slug} title="Activity" />
      <div className="p-4">
        {entries.length === 0 ? (
          <EmptyState title={from ? 'Nothing earlier' : 'Nothing yet'}>
            Changes to members, kernels, fabrics and mappings are recorded here.
          </EmptyState>
        ) : (
          <section
            aria-label="Activity"
            className="max-w-4xl overflow-x-auto rounded-md border border-rule bg-surface"
          >
            <table className="w-full text-sm">
              <caption className="sr-only">Activity, newest first</caption>
              <thead>
                <tr className="text-left text-xs text-quiet">
                  <th scope="col" className="px-3 py-2 font-semibold">
                    When
                  </th>
                  <th scope="col" className="px-3 py-2 font-semibold">
                    Who
                  </th>
                  <th scope="col" className="px-3 py-2 font-semibold">
                    What
                  </th>
                  <th scope="col" className="px-3 py-2 font-semibold">
                    Details
                  </th>
                </tr>
              </thead>
              <tbody>
                {entries.map((entry) => (
                  <tr key={entry.id} className="border-t border-rule align-top">
                    <td className="px-3 py-2 whitespace-nowrap tabular-nums">
                      <Moment iso={entry.createdAt.toISOString()} />
                    </td>
                    <td className="px-3 py-2">{entry.actorName}</td>
                    <td className="px-3 py-2">{entry.action}</td>
                    <td className="px-3 py-2 text-quiet">{detailText(entry.detail)}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          </section>
        )}
        <div className="mt-4 flex gap-2">
          {from ? <ButtonLink href={`/w/${workspace.slug}/settings/activity`}>Newest</ButtonLink> : null}
          {last && entries.length === PAGE ? (
            <ButtonLink href={`/w/${workspace.slug}/settings/activity?before=${last.id}`}>Earlier</ButtonLink>
          ) : null}
        </div>
      </div>
    </>
  );
}
