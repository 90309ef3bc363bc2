import type { Topology } from '@/lib/fabric/fabric';

export const topologyLabels: Record<Topology, string> = {
  mesh: 'Mesh, 4 neighbours',
  torus: 'Torus, edges joined',
  diagonal: 'Diagonal, 8 neighbours',
};
/** In one word, for tables. */
export const topologyWords: Record<Topology, string> = { mesh: 'mesh', torus: 'torus', diagonal: 'diagonal' };
