'use client';

import Link from 'next/link';
import { usePathname } from 'next/navigation';

const tabs = [
  { path: 'account', label: 'Account' },
  { path: 'members', label: 'Members' },
  { path: 'workspace', label: 'Workspace' },
  { path: 'activity', label: 'Activity' },
] as const;

export function SettingsTabs({ workspaceSlug }: { workspaceSlug: string }) {
  const pathname = usePathname();
  return (
    <nav aria-label="Settings" className="flex flex-wrap gap-x-1 border-b border-rule px-4">
      {tabs.map((tab) => {
        const href = `/w/${workspaceSlug}/settings/${tab.path}`;
        const here = pathname === href;
        return (
          <Link
            key={tab.path}
            href={href}
            aria-current={here ? 'page' : undefined}
            className={`-mb-px min-h-9 border-b-2 px-3 py-2 text-sm ${
              here
                ? 'border-indigo! font-semibold text-indigo'
                : 'border-transparent! text-ink hover:bg-surface'
            }`}
          >
            {tab.label}
          </Link>
        );
      })}
    </nav>
  );
}
