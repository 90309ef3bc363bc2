import type { ReactNode } from 'react';
import type { Objective } from '@/lib/mapping/mapping';

/** Weights of nets or connections, a row each; the heads are for those who hear the table. */
export function WeightsTable({ objective, children }: { objective: Objective; children: ReactNode }) {
  return (
    <table className="w-full">
      <thead className="sr-only">
        <tr>
          <th scope="col">{objective === 'wire' ? 'Net' : 'Connection'}</th>
          <th scope="col">Weight</th>
        </tr>
      </thead>
      <tbody>{children}</tbody>
    </table>
  );
}
