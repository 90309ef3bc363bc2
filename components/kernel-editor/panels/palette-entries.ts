/** What the palette offers, in its groups, and what a search finds. */
import { hostsOf } from '@/lib/fabric/unit-library';
import { type OpGroup, type OpKind, opKinds, opSpec } from '@/lib/graph';

const groupLabels: Record<OpGroup, string> = {
  memory: 'Memory',
  scratchpad: 'Scratchpad',
  arithmetic: 'Arithmetic',
  multiply: 'Multiply',
  logic: 'Shift and logic',
  compare: 'Compare',
  choose: 'Choose',
  reduce: 'Reduce a vector',
};

export interface PaletteGroup {
  label: string;
  kinds: readonly OpKind[];
}

const words = (kind: OpKind): string => {
  const spec = opSpec(kind);
  const units = hostsOf(kind).map((unit) => unit.label);
  return [spec.label, spec.symbol, spec.summary, groupLabels[spec.group], kind, ...units]
    .join(' ')
    .toLowerCase();
};

/** The kinds whose words hold every word of the query, those whose label begins with it first within their group. */
export function paletteGroups(query: string): PaletteGroup[] {
  const asked = query.toLowerCase().split(/\s+/).filter(Boolean);
  const found = opKinds.filter((kind) => asked.every((part) => words(kind).includes(part)));
  const groups = [...new Set(found.map((kind) => opSpec(kind).group))];
  const start = asked.join(' ');
  const rank = (kind: OpKind) => (start !== '' && opSpec(kind).label.toLowerCase().startsWith(start) ? 0 : 1);
  return groups.map((group) => ({
    label: groupLabels[group],
    kinds: found.filter((kind) => opSpec(kind).group === group).sort((a, b) => rank(a) - rank(b)),
  }));
}
