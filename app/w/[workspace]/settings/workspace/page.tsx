import type { Metadata } from 'next';
import { requireMember } from '@/app/_server/access';
import { roleReaches } from '@/lib/roles';
import { Section } from '../section';
import { SettingsBar } from '../settings-bar';
import { RenameWorkspaceForm } from './rename-workspace-form';

export const metadata: Metadata = { title: 'Workspace' };

export default async function WorkspacePage({ params }: { params: Promise<{ workspace: string }> }) {
  const { workspace, role } = await requireMember((await params).workspace);
  return (
    <>
      <SettingsBar workspaceSlug={workspace.slug} title="Workspace" />
      <div className="px-4">
        <Section
          title="Name"
          text="Addresses stay as they are, so links to kernels and mappings keep working."
        >
          {roleReaches(role, 'owner') ? (
            <RenameWorkspaceForm workspaceSlug={workspace.slug} name={workspace.name} />
          ) : (
            <p className="text-sm">{workspace.name}. Only owners rename the workspace.</p>
          )}
        </Section>
        <Section title="Address">
          <p className="font-mono text-sm">/w/{workspace.slug}</p>
        </Section>
      </div>
    </>
  );
}
