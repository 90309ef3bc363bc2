/**
 * Costs on a plain mesh, where hops are row distance plus column distance: an op's row and column are linear in
 * its binaries, so a pair's hops and a net's bounding box need a few rows only.
 */
import type { PlacementInstance } from '../instance';
import type { AssignmentColumns } from './assignment-columns';
import type { FillColumns, ProgramBuilder } from './integer-program';
import { addStarRows, leastTreeRow, undirectedPairs } from './star-rows';

const AT_LEAST = Number.POSITIVE_INFINITY;

interface Coordinates {
  row: number[];
  col: number[];
  fill: FillColumns;
}

function addCoordinates(
  builder: ProgramBuilder,
  instance: PlacementInstance,
  x: AssignmentColumns,
): Coordinates {
  const { cols, opCount } = instance;
  const rowOf = (tile: number) => Math.floor(tile / cols);
  const colOf = (tile: number) => tile % cols;
  const row: number[] = [];
  const col: number[] = [];
  for (let op = 0; op < opCount; op++) {
    row.push(builder.column(`row_${op}`, { lower: 0 }));
    col.push(builder.column(`col_${op}`, { lower: 0 }));
    builder.row(`atRow_${op}`, 0, 0, [[row[op] as number, -1], ...x.weigh(op, rowOf)]);
    builder.row(`atCol_${op}`, 0, 0, [[col[op] as number, -1], ...x.weigh(op, colOf)]);
  }
  return {
    row,
    col,
    fill: (tiling, values) => {
      for (let op = 0; op < opCount; op++) {
        values[row[op] as number] = rowOf(tiling[op] as number);
        values[col[op] as number] = colOf(tiling[op] as number);
      }
    },
  };
}

/** One column of whole hops a pair: hops ≥ |Δrow| + |Δcol|, hops ≥ 1. */
export function addMeshPath(
  builder: ProgramBuilder,
  instance: PlacementInstance,
  x: AssignmentColumns,
  star: Float64Array | null,
): FillColumns {
  const at = addCoordinates(builder, instance, x);
  const pairs = undirectedPairs(instance.pairs).map(({ from, to, weight }, k) => {
    const hops = builder.column(`hops_${k}`, {
      lower: 1,
      cost: weight,
      integer: true,
    });
    const rise = builder.column(`rise_${k}`, { lower: 0 });
    const run = builder.column(`run_${k}`, { lower: 0 });
    for (const sign of [1, -1]) {
      const side = sign > 0 ? 'a' : 'b';
      builder.row(`rise_${k}${side}`, 0, AT_LEAST, [
        [rise, 1],
        [at.row[from] as number, sign],
        [at.row[to] as number, -sign],
      ]);
      builder.row(`run_${k}${side}`, 0, AT_LEAST, [
        [run, 1],
        [at.col[from] as number, sign],
        [at.col[to] as number, -sign],
      ]);
    }
    builder.row(`hops_${k}`, 0, AT_LEAST, [
      [hops, 1],
      [rise, -1],
      [run, -1],
    ]);
    return { from, to, weight, hops, rise, run };
  });
  addStarRows(builder, instance, x, star, pairs);
  return (tiling, values) => {
    at.fill(tiling, values);
    for (const { from, to, hops, rise, run } of pairs) {
      const [up, along] = [at.row, at.col].map((axis) =>
        Math.abs((values[axis[from] as number] as number) - (values[axis[to] as number] as number)),
      ) as [number, number];
      values[rise] = up;
      values[run] = along;
      values[hops] = up + along;
    }
  };
}

/** One column of whole links a net: links ≥ half perimeter of the terminals' box, links ≥ consumers. */
export function addMeshWire(
  builder: ProgramBuilder,
  instance: PlacementInstance,
  x: AssignmentColumns,
): FillColumns {
  const at = addCoordinates(builder, instance, x);
  const nets = instance.nets.map(({ source, consumers, weight }, k) => {
    const ops = [source, ...consumers];
    const links = builder.column(`wire_${k}`, {
      lower: consumers.length,
      cost: weight,
      integer: true,
    });
    const boxes = (['row', 'col'] as const).map((axis) => {
      const low = builder.column(`${axis}Low_${k}`, { lower: 0 });
      const high = builder.column(`${axis}High_${k}`, { lower: 0 });
      for (const op of ops) {
        const place = at[axis][op] as number;
        builder.row(`${axis}Low_${k}_${op}`, 0, AT_LEAST, [
          [place, 1],
          [low, -1],
        ]);
        builder.row(`${axis}High_${k}_${op}`, 0, AT_LEAST, [
          [high, 1],
          [place, -1],
        ]);
      }
      return { low, high, places: ops.map((op) => at[axis][op] as number) };
    });
    builder.row(`wire_${k}`, 0, AT_LEAST, [
      [links, 1],
      ...boxes.flatMap(({ low, high }) => [[high, -1] as const, [low, 1] as const]),
    ]);
    leastTreeRow(builder, instance, x, k, links);
    return { links, boxes, least: consumers.length };
  });
  return (tiling, values) => {
    at.fill(tiling, values);
    for (const { links, boxes, least } of nets) {
      let span = 0;
      for (const { low, high, places } of boxes) {
        const along = places.map((column) => values[column] as number);
        values[low] = Math.min(...along);
        values[high] = Math.max(...along);
        span += (values[high] as number) - (values[low] as number);
      }
      values[links] = Math.max(least, span);
    }
  };
}
