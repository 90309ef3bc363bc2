import type { ReactNode } from 'react';

export function DoorHeading({ title, children }: { title: string; children?: ReactNode }) {
  return (
    <header className="mb-4">
      <h1 className="text-xl font-semibold">{title}</h1>
      {children ? <div className="mt-1 text-sm text-quiet">{children}</div> : null}
    </header>
  );
}

/** For a link that was used, replaced or has expired. */
export function EndedLink({ children }: { children: ReactNode }) {
  return (
    <>
      <DoorHeading title="This link has ended" />
      <div className="text-sm">{children}</div>
    </>
  );
}
