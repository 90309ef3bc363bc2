import type { ReactNode } from 'react';
import { openWorkspace } from '@/app/_server/access';
import { Rail } from '@/components/shell/rail';

interface WorkspaceLayoutProps {
  params: Promise<{ workspace: string }>;
  children: ReactNode;
}

export default async function WorkspaceLayout({ params, children }: WorkspaceLayoutProps) {
  const { workspace: slug } = await params;
  const { workspace, user, role } = await openWorkspace(slug);
  return (
    <div className="md:flex">
      <a
        href="#content"
        className="sr-only z-50 rounded bg-surface px-3 py-2 focus:not-sr-only focus:absolute focus:top-2 focus:left-2"
      >
        Skip to the content
      </a>
      <Rail workspace={{ slug: workspace.slug, name: workspace.name }} userName={user.name} role={role} />
      <main
        id="content"
        tabIndex={-1}
        className="min-h-dvh min-w-0 flex-1 pb-14 outline-none md:h-dvh md:overflow-y-auto md:pb-0"
      >
        {children}
      </main>
    </div>
  );
}
