import type { ReactNode } from 'react';

export function Section({ title, text, children }: { title: string; text?: ReactNode; children: ReactNode }) {
  return (
    <section className="max-w-3xl border-b border-rule py-6 last:border-b-0">
      <h2 className="text-lg font-semibold">{title}</h2>
      {text ? <p className="mt-0.5 mb-4 text-sm text-quiet">{text}</p> : <div className="mb-4" />}
      {children}
    </section>
  );
}
