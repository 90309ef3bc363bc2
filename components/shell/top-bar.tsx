import Link from 'next/link';
import type { ReactNode } from 'react';

export interface Crumb {
  label: string;
  href?: string;
}

interface TopBarProps {
  /** Where one is; the last one is this page's heading. */
  path: readonly Crumb[];
  /** Quiet words about the state, such as "draft · saved 10:42". */
  status?: ReactNode;
  /** The one main action of the screen, at the right, after lesser ones. */
  actions?: ReactNode;
}

/** The bar at the top of every screen: the path, the state, the main action. */
export function TopBar({ path, status, actions }: TopBarProps) {
  return (
    <header className="sticky top-0 z-20 flex min-h-13 flex-wrap items-center gap-x-6 gap-y-1 border-b border-rule bg-surface px-4 py-2">
      <div className="flex min-w-0 items-baseline gap-1.5">
        {path.map((crumb, index) =>
          index === path.length - 1 ? (
            <h1 key={crumb.label} className="truncate text-base font-semibold">
              {crumb.label}
            </h1>
          ) : (
            <span key={crumb.label} className="flex-none text-base whitespace-nowrap text-quiet">
              {crumb.href ? (
                <Link href={crumb.href} className="hover:text-ink hover:underline">
                  {crumb.label}
                </Link>
              ) : (
                crumb.label
              )}
              <span aria-hidden="true"> /</span>
            </span>
          ),
        )}
      </div>
      {status ? <div className="min-w-0 text-sm text-quiet">{status}</div> : null}
      {actions ? <div className="ml-auto flex flex-wrap items-center gap-2">{actions}</div> : null}
    </header>
  );
}
