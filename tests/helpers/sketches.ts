/** Kernels and fabrics written in a line of text, for tests that show what they are about. */
import { type Fabric, fabricSchema } from '../../lib/fabric/fabric';
import { initialParams } from '../../lib/graph/edits';
import { edgeId, opId } from '../../lib/graph/ids';
import { emptyKernel, type Kernel } from '../../lib/graph/kernel';
import { type OpKind, portsOf } from '../../lib/graph/op-catalog';

/**
 * Ops with their kinds and operands, port by port: `x=load sum=add:x,@sum out=store:sum`. An operand is an op, an op
 * with `@` for its value of the iteration before, or a constant.
 */
export function kernelSketch(plan: string): Kernel {
  const parts = plan
    .trim()
    .split(/\s+/)
    .map((part) => {
      const [name = '', kind = '', operands = ''] = part.split(/[=:]/);
      const named = operands === '' ? [] : operands.split(',');
      return {
        name,
        kind: kind as OpKind,
        operands: named.map((text, i) => ({ text, port: portsOf(kind as OpKind)[i]?.name ?? '' })),
      };
    });
  const isConstant = (text: string) => /^-?\d+$/.test(text);
  const ops = parts.map(({ name, kind, operands }) => ({
    id: opId(`op_${name}`),
    kind,
    label: name,
    widthBits: 32 as const,
    params: initialParams(kind),
    immediates: Object.fromEntries(
      operands.filter(({ text }) => isConstant(text)).map(({ text, port }) => [port, Number(text)]),
    ),
    positionPx: { x: 0, y: 0 },
  }));
  const edges = parts.flatMap(({ name, operands }) =>
    operands
      .filter(({ text }) => !isConstant(text))
      .map(({ text, port }) => ({
        id: edgeId(`edge_${name}_${port}`),
        from: opId(`op_${text.replace('@', '')}`),
        to: opId(`op_${name}`),
        port,
        distance: text.startsWith('@') ? 1 : 0,
        initialValues: [],
      })),
  );
  return { ...emptyKernel('sketch'), ops, edges };
}

const units: Record<string, string | null> = {
  m: 'unit_memory',
  a: 'unit_arithmetic',
  x: 'unit_multiplier',
  '.': null,
};

/** One text a row, one letter a tile: m memory, a arithmetic, x multiplier, a dot for a router alone. */
export function fabricSketch(
  rows: readonly string[],
  more: Partial<Record<keyof Fabric, unknown>> = {},
): Fabric {
  return fabricSchema.parse({
    format: 'pinloom.fabric',
    formatVersion: 1,
    name: 'sketch',
    description: '',
    rows: rows.length,
    cols: rows[0]?.length,
    topology: 'mesh',
    units: [...rows.join('')].map((letter) => units[letter] ?? null),
    channels: 1,
    removedLinks: [],
    addedLinks: [],
    linkChannels: {},
    bufferDepth: 4,
    clock: null,
    memoryBanks: 4,
    ...more,
  });
}

/** Both links between neighbouring tiles in two columns, row by row but for some rows: a wall with openings. */
export const wall = (rows: number, col: number, openings: readonly number[] = []): string[] =>
  Array.from({ length: rows }, (_, row) => row)
    .filter((row) => !openings.includes(row))
    .flatMap((row) => [`r${row}c${col}>r${row}c${col + 1}`, `r${row}c${col + 1}>r${row}c${col}`]);
