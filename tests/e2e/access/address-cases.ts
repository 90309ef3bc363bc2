/** Every route handler and page with the least that a reader needs. */
import type { Need } from './action-cases';

export interface RouteCase {
  route: string;
  query?: string;
  /** Anybody may read it. */
  open?: true;
  /** The mapping has to be one that a solve has proved. */
  proved?: true;
}

const w = '/w/[workspace]';
const api = `/api${w}`;

/** All of them are read by GET, and need the role viewer where they are not open. */
export const routeCases: readonly RouteCase[] = [
  { route: '/api/health', open: true },
  { route: `${api}/kernels/[kernel]/export`, query: '?format=json' },
  { route: `${api}/kernels/[kernel]/versions` },
  { route: `${api}/kernels/[kernel]/versions/[number]` },
  { route: `${api}/fabrics/[fabric]/export` },
  { route: `${api}/mappings/[mapping]/certificate.json`, proved: true },
  { route: `${api}/mappings/[mapping]/mapping.json` },
  { route: `${api}/mappings/[mapping]/picture.svg` },
  { route: `${api}/mappings/[mapping]/picture.png` },
  { route: `${api}/solves/[solve]` },
];

export interface PageCase {
  route: string;
  need: Need;
  /** True where a page only leads to another one. */
  leadsTo?: true;
}

export const pageCases: readonly PageCase[] = [
  { route: '/', need: 'anybody', leadsTo: true },
  { route: '/sign-in', need: 'nobody' },
  { route: '/sign-up', need: 'nobody' },
  { route: '/sign-up/[token]', need: 'nobody' },
  { route: '/forgotten', need: 'nobody' },
  { route: '/reset/[token]', need: 'nobody' },
  { route: '/invite/[token]', need: 'nobody' },
  { route: '/mail', need: 'nobody' },
  { route: '/welcome', need: 'anybody' },
  { route: w, need: 'viewer', leadsTo: true },
  { route: `${w}/kernels`, need: 'viewer' },
  { route: `${w}/kernels/[kernel]`, need: 'viewer' },
  { route: `${w}/kernels/[kernel]/versions/[number]`, need: 'viewer' },
  { route: `${w}/fabrics`, need: 'viewer' },
  { route: `${w}/fabrics/new`, need: 'editor' },
  { route: `${w}/fabrics/[fabric]`, need: 'viewer' },
  { route: `${w}/mappings`, need: 'viewer' },
  { route: `${w}/mappings/new`, need: 'editor' },
  { route: `${w}/mappings/bench/[draft]`, need: 'viewer' },
  { route: `${w}/mappings/[mapping]`, need: 'viewer' },
  { route: `${w}/settings`, need: 'viewer', leadsTo: true },
  { route: `${w}/settings/account`, need: 'viewer' },
  { route: `${w}/settings/activity`, need: 'viewer' },
  { route: `${w}/settings/members`, need: 'viewer' },
  { route: `${w}/settings/workspace`, need: 'viewer' },
];
