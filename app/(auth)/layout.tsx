import type { ReactNode } from 'react';
import { Brand } from '@/components/shell/brand';

export default function DoorLayout({ children }: { children: ReactNode }) {
  return (
    <main className="mx-auto flex min-h-dvh w-full max-w-md flex-col justify-center px-4 py-10">
      <div className="mb-6">
        <Brand />
      </div>
      <div className="rounded-md border border-rule bg-surface p-6">{children}</div>
    </main>
  );
}
