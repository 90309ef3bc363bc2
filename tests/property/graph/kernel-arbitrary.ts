/** Random kernels for laws: well-typed, possibly unfinished, with labels of any characters. */
import fc from 'fast-check';
import {
  type Edge,
  edgeId,
  emptyKernel,
  initialParams,
  type Kernel,
  type Op,
  opId,
  opKinds,
  opSpec,
  portsOf,
  wordWidthsBits,
} from '@/lib/graph';

const label = fc
  .oneof(
    fc.string({ maxLength: 20 }),
    fc.string({ unit: 'binary', maxLength: 20 }),
    fc.constant('a\\N"&amp;\r\n<b>'),
  )
  .map((text) => text.trim().slice(0, 60).trim());
const coordinate = fc.oneof(
  fc.integer({ min: -5000, max: 5000 }),
  fc.double({ min: -1e6, max: 1e6, noNaN: true }).map((value) => value + 0),
);

interface RawOp {
  kind: Op['kind'];
  label: string;
  widthBits: Op['widthBits'];
  positionPx: Op['positionPx'];
  operands: { pick: number; distance: number; constant: number; mode: number }[];
}

const rawOp: fc.Arbitrary<RawOp> = fc.record({
  kind: fc.constantFrom(...opKinds),
  label,
  widthBits: fc.constantFrom(...wordWidthsBits),
  positionPx: fc.record({ x: coordinate, y: coordinate }),
  operands: fc.array(
    fc.record({
      pick: fc.nat(1000),
      distance: fc.nat(3),
      constant: fc.integer({ min: -128, max: 127 }),
      mode: fc.nat(9),
    }),
    { minLength: 5, maxLength: 5 },
  ),
});

/** Edges of distance 0 run forwards in the list of ops, all others are carried: there is always an order. */
function kernelOf(raw: readonly RawOp[], name: string, description: string): Kernel {
  const ops = raw.map(
    (one, i): Op => ({
      id: opId(`op_${one.kind}_${i}`),
      kind: one.kind,
      label: one.label,
      widthBits: one.widthBits,
      params: initialParams(one.kind),
      immediates: {},
      positionPx: one.positionPx,
    }),
  );
  const edges: Edge[] = [];
  ops.forEach((op, i) => {
    portsOf(op.kind).forEach((port, p) => {
      const choice = raw[i]!.operands[p]!;
      if (choice.mode === 0 || (!port.required && choice.mode < 7)) return;
      const sources = ops.filter((from) => {
        const { output } = opSpec(from.kind);
        if (port.type === 'flag') return output === 'flag';
        return output === 'word' && (port.type === 'index' || from.widthBits === op.widthBits);
      });
      const from = sources[choice.pick % Math.max(1, sources.length)];
      if (from === undefined || choice.mode === 1) {
        op.immediates[port.name] = port.type === 'flag' ? choice.constant & 1 : choice.constant;
        return;
      }
      const isEarlier = ops.indexOf(from) < i;
      const distance = isEarlier ? choice.distance : choice.distance + 1;
      edges.push({
        id: edgeId(`edge_${edges.length + 1}`),
        from: from.id,
        to: op.id,
        port: port.name,
        distance,
        initialValues: Array<number>(Math.min(distance, choice.pick % 3)).fill(
          port.type === 'flag' ? 1 : choice.constant,
        ),
      });
    });
  });
  return { ...emptyKernel(name), description, ops, edges };
}

export const anyKernel = (maxOps = 16): fc.Arbitrary<Kernel> =>
  fc
    .tuple(
      fc.array(rawOp, { maxLength: maxOps }),
      fc.string({ unit: 'binary', maxLength: 30 }),
      fc.string({ unit: 'binary', maxLength: 60 }),
    )
    .map(([raw, name, description]) => kernelOf(raw, name.trim() || 'kernel', description));
