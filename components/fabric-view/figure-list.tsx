import type { ReactNode } from 'react';

export interface Figure {
  label: string;
  value: ReactNode;
  note?: ReactNode;
}

/** Names and numbers in two columns, the numbers in tabular figures. */
export function FigureList({ title, figures }: { title: string; figures: readonly Figure[] }) {
  return (
    <section aria-label={title}>
      <h2 className="mb-1 text-xs font-semibold tracking-widest text-quiet uppercase">{title}</h2>
      <dl className="figures space-y-1 text-sm">
        {figures.map((figure) => (
          <div key={figure.label} className="grid grid-cols-[auto_1fr] items-baseline gap-x-4">
            <dt className="text-quiet">{figure.label}</dt>
            <dd className="text-right font-mono">{figure.value}</dd>
            {figure.note ? <dd className="col-span-2 text-xs text-quiet">{figure.note}</dd> : null}
          </div>
        ))}
      </dl>
    </section>
  );
}
