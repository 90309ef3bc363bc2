'use client';

import Link from 'next/link';
import { usePathname } from 'next/navigation';
import { Brand } from './brand';

interface RailProps {
  workspace: { slug: string; name: string };
  userName: string;
  role: string;
}

const places = [
  { path: 'kernels', label: 'Kernels' },
  { path: 'fabrics', label: 'Fabrics' },
  { path: 'mappings', label: 'Mappings' },
  { path: 'settings', label: 'Settings' },
] as const;

/** The way between the workspace's places: on the left, or at the foot of a narrow screen. */
export function Rail({ workspace, userName, role }: RailProps) {
  const pathname = usePathname();
  return (
    <header className="fixed inset-x-0 bottom-0 z-30 flex border-t border-rule bg-surface md:static md:h-dvh md:w-40 md:flex-none md:flex-col md:border-t-0 md:border-r">
      <Link
        href={`/w/${workspace.slug}/kernels`}
        className="hidden px-4 pt-4 pb-6 md:block"
        aria-label="Pinloom, home"
      >
        <Brand />
      </Link>
      <nav aria-label="Workspace" className="flex flex-1 md:flex-col">
        {places.map((place) => {
          const href = `/w/${workspace.slug}/${place.path}`;
          const here = pathname.startsWith(href);
          return (
            <Link
              key={place.path}
              href={href}
              aria-current={here ? 'page' : undefined}
              className={`flex min-h-12 flex-1 items-center justify-center border-t-2 text-sm md:min-h-9 md:flex-none md:justify-start md:border-t-0 md:border-l-3 md:px-4 ${
                here
                  ? 'border-indigo! bg-indigo-wash font-semibold text-indigo'
                  : 'border-transparent! text-ink hover:bg-paper'
              }`}
            >
              {place.label}
            </Link>
          );
        })}
      </nav>
      <Link
        href={`/w/${workspace.slug}/settings/account`}
        title="Account, sign-out and other workspaces"
        className="hidden px-4 py-4 text-sm hover:bg-paper md:block"
      >
        <span className="block truncate font-semibold">{workspace.name}</span>
        <span className="block truncate text-quiet">{userName}</span>
        <span className="block text-quiet">{role}</span>
      </Link>
    </header>
  );
}
