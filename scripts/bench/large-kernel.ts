/** A kernel of any size for measuring, the same at every call: columns of ops, each fed by the column before. */

import { initialParams } from '../../lib/graph/edits';
import {
  type Edge,
  edgeIdSchema,
  emptyKernel,
  type Kernel,
  type Op,
  opIdSchema,
} from '../../lib/graph/kernel';

const ROWS = 10;
const COLUMN_PX = 260;
const ROW_PX = 120;
const kinds = ['add', 'subtract', 'multiply', 'max', 'min'] as const;

/** `columns` × 10 ops: loads first, stores last, and between them ops of two operands. */
export function largeKernel(name: string, columns: number): Kernel {
  const ops: Op[] = [];
  const edges: Edge[] = [];
  const idAt = (column: number, row: number) => opIdSchema.parse(`op_${column}_${row % ROWS}`);
  for (let column = 0; column < columns; column++) {
    for (let row = 0; row < ROWS; row++) {
      const end = column === 0 ? 'load' : column === columns - 1 ? 'store' : null;
      const kind = end ?? kinds[(3 * column + row) % kinds.length] ?? 'add';
      ops.push({
        id: idAt(column, row),
        kind,
        label: `${kind} ${column}.${row}`,
        widthBits: 32,
        params: end ? { array: `x${row}`, base: 0, stride: 1 } : initialParams(kind),
        immediates: {},
        positionPx: { x: column * COLUMN_PX, y: row * ROW_PX },
      });
      const operands =
        column === 0
          ? []
          : end
            ? ([['value', row]] as const)
            : ([
                ['a', row],
                ['b', row + 1],
              ] as const);
      for (const [port, from] of operands) {
        edges.push({
          id: edgeIdSchema.parse(`edge_${column}_${row}_${port}`),
          from: idAt(column - 1, from),
          to: idAt(column, row),
          port,
          distance: 0,
          initialValues: [],
        });
      }
    }
  }
  return { ...emptyKernel(name), ops, edges };
}
