import { hostsOf, type UnitForm } from '@/lib/fabric/unit-library';
import { type OpKind, opKinds } from '@/lib/graph';

const formByKind = new Map<OpKind, UnitForm>(
  opKinds.map((kind) => [kind, hostsOf(kind)[0]?.form ?? 'plain']),
);

/** The form of the unit that an op of the kind needs. */
export const formOf = (kind: OpKind): UnitForm => formByKind.get(kind) ?? 'plain';

const tint: Record<UnitForm, string> = {
  plain: 'var(--tile-arithmetic)',
  cornerTicks: 'var(--tile-multiplier)',
  footBar: 'var(--tile-memory)',
  notch: 'var(--tile-scratchpad)',
  stitched: 'var(--tile-arithmetic)',
};

const NOTCH_PX = 14;
const TICK_PX = 9;

interface UnitOutlineProps {
  form: UnitForm;
  widthPx: number;
  heightPx: number;
  selected: boolean;
}

/** The outline of an op by the unit it needs: the form tells the kind, the tint only helps. */
export function UnitOutline({ form, widthPx: w, heightPx: h, selected }: UnitOutlineProps) {
  const outline =
    form === 'notch'
      ? `M3 1H${w - NOTCH_PX}L${w - 1} ${NOTCH_PX}V${h - 3}Q${w - 1} ${h - 1} ${w - 3} ${h - 1}H3Q1 ${h - 1} 1 ${h - 3}V3Q1 1 3 1Z`
      : `M3 1H${w - 3}Q${w - 1} 1 ${w - 1} 3V${h - 3}Q${w - 1} ${h - 1} ${w - 3} ${h - 1}H3Q1 ${h - 1} 1 ${h - 3}V3Q1 1 3 1Z`;
  return (
    <svg
      aria-hidden="true"
      className="absolute inset-0 overflow-visible"
      width={w}
      height={h}
      viewBox={`0 0 ${w} ${h}`}
    >
      <path
        d={outline}
        fill={tint[form]}
        stroke={selected ? 'var(--indigo)' : 'var(--edge)'}
        strokeWidth={selected ? 2.5 : 1.25}
        strokeDasharray={form === 'stitched' ? '5 3' : undefined}
      />
      <path d={marks(form, w, h)} fill="none" stroke="var(--edge)" strokeWidth={1.25} />
    </svg>
  );
}

function marks(form: UnitForm, w: number, h: number): string {
  if (form === 'footBar') return `M7 ${h - 6.5}H${w - 7}M7 ${h - 3.5}H${w - 7}`;
  if (form !== 'cornerTicks') return '';
  const t = TICK_PX;
  return `M2 ${t}L${t} 2M${w - t} 2L${w - 2} ${t}M2 ${h - t}L${t} ${h - 2}M${w - t} ${h - 2}L${w - 2} ${h - t}`;
}
