'use client';

import { type KeyboardEvent, type PointerEvent, useMemo, useRef, useState } from 'react';
import { FabricGrid, plainTileText } from '@/components/fabric-grid/fabric-grid';
import type { TileLook } from '@/components/fabric-grid/tile-shape';
import { IconButton } from '@/components/ui/button';
import type { OpId } from '@/lib/graph/kernel';
import { linkBoxes } from '@/lib/mapping/picture/channel-bars';
import { consumerHops } from '@/lib/mapping/picture/consumer-hops';
import { pictureSize, positionOf, tileBox } from '@/lib/mapping/picture/fabric-geometry';
import { shortName } from '@/lib/mapping/picture/op-label';
import { OpPlates } from '../drawing/op-plates';
import { ThreadLayer } from '../drawing/thread-layer';
import { useSize } from '../drawing/use-size';
import { tileRefusal } from '../store/bench-content';
import { useBench, useBenchStore } from '../store/bench-context';
import { litBy } from '../store/lit';
import type { BenchView } from './bench-view';

interface GridPaneProps {
  /** What is drawn: the bench's own content, or a solve's best that is being looked at. */
  shown: BenchView;
  onOpDown: (event: PointerEvent, op: OpId) => void;
  wasDragged: () => boolean;
}

const ROOM_PX = 16;
/** The panes stand side by side from this window width on (Tailwind's lg). */
const STACKED_BELOW_PX = 1024;
const ZOOM_STEPS = [0.4, 0.55, 0.7, 0.85, 1, 1.25, 1.5, 2];

/** The fabric with everything on it, to point at and to place on. */
export function GridPane({ shown, onOpDown, wasDragged }: GridPaneProps) {
  const store = useBenchStore();
  const { setting, fabric } = store;
  const { graph, kernel, library } = setting;
  const frame = useRef<HTMLDivElement>(null);
  const size = useSize(frame);
  const [zoom, setZoom] = useState<number | null>(null);
  const cursor = useBench((state) => state.cursor);
  const held = useBench((state) => state.held);
  const content = useBench((state) => state.content);
  const pointedOp = useBench((state) => state.pointedOp);
  const lit = useMemo(() => litBy(kernel, pointedOp), [kernel, pointedOp]);
  const arriving = useMemo(() => consumerHops(kernel, shown.facts.metrics), [kernel, shown]);
  const refusals = useMemo(
    () =>
      held === null || shown.preview
        ? null
        : graph.tiles.map((_, tile) => tileRefusal(setting, content, held, tile)),
    [held, content, graph, setting, shown.preview],
  );
  const heldName = held === null ? '' : shortName(setting.ops.get(held) ?? { label: '', kind: 'pass' });
  const tileLook = (tile: number): TileLook => {
    if (refusals?.[tile]) return 'dimmed';
    return shown.byTile.has(tile) ? 'taken' : 'free';
  };
  const tileText = (tile: number): string => {
    const there = shown.byTile.get(tile);
    const op = there === undefined ? undefined : setting.ops.get(there);
    const pinned = there !== undefined && content.pins[there] !== undefined ? ', pinned' : '';
    const refusal = refusals?.[tile];
    return [
      plainTileText(graph, library, tile),
      op ? `holds ${shortName(op)}${pinned}` : graph.units[tile] ? 'free' : '',
      refusal ? `not for ${heldName}: ${refusal}` : '',
    ]
      .filter(Boolean)
      .join('; ');
  };
  const onPoint = (tile: number | null) => {
    const state = store.getState();
    state.point(state.held ?? (tile === null ? null : (shown.byTile.get(tile) ?? null)), tile);
  };
  const onTileDown = (event: PointerEvent, tile: number) => {
    const there = store.getState().held === null && !shown.preview ? shown.byTile.get(tile) : undefined;
    if (there !== undefined) onOpDown(event, there);
    else wasDragged();
  };
  const picture = pictureSize(fabric);
  const fit = Math.min(
    (size.width - ROOM_PX) / picture.width,
    (size.height - ROOM_PX) / picture.height,
    1.35,
  );
  // Stacked, the pane is as high as its drawing; beside others, the drawing fits the pane.
  const stacked = size.width > 0 && window.innerWidth < STACKED_BELOW_PX;
  const scale = zoom ?? (stacked ? Math.min(1.2, (size.width - ROOM_PX) / picture.width) : fit);
  return (
    <div className="relative lg:min-h-0 lg:flex-1">
      <div ref={frame} className="flex max-h-[75dvh] w-full overflow-auto p-2 lg:size-full lg:max-h-none">
        <div className="m-auto">
          <FabricGrid
            fabric={fabric}
            graph={graph}
            library={library}
            label={`Fabric ${fabric.name}, ${fabric.rows} rows and ${fabric.cols} columns`}
            widthPx={Number.isFinite(scale) && scale > 0 ? picture.width * scale : undefined}
            tileLook={tileLook}
            tileText={tileText}
            cursor={cursor}
            onCursor={store.getState().moveCursor}
            onPoint={onPoint}
            onTile={(tile) => {
              if (!wasDragged() && !shown.preview) store.getState().press(tile);
            }}
            onTileKey={(event, tile) => gridKey(event, tile, store.getState())}
            onTileDown={onTileDown}
            isDisabled={(tile) => Boolean(refusals?.[tile])}
            isSelected={(tile) => held !== null && shown.byTile.get(tile) === held}
            underlay={<MarkedLinks shown={shown} />}
            overlay={
              <>
                <ThreadLayer threads={shown.facts.threads} lit={lit?.nets ?? null} />
                <OpPlates
                  graph={graph}
                  byTile={shown.byTile}
                  ops={setting.ops}
                  pins={content.pins}
                  arriving={arriving}
                  lit={lit}
                  held={held}
                />
                <TileMarks />
              </>
            }
          />
        </div>
      </div>
      <ZoomButtons scale={scale} onZoom={setZoom} />
    </div>
  );
}

function ZoomButtons({ scale, onZoom }: { scale: number; onZoom: (zoom: number | null) => void }) {
  const smaller = ZOOM_STEPS.findLast((step) => step < scale - 0.01);
  const larger = ZOOM_STEPS.find((step) => step > scale + 0.01);
  return (
    <div className="mr-2 mb-2 ml-auto flex w-fit rounded border border-rule bg-surface lg:absolute lg:right-2 lg:bottom-2 lg:m-0">
      <IconButton label="Zoom the fabric out" disabled={!smaller} onClick={() => onZoom(smaller ?? null)}>
        −
      </IconButton>
      <IconButton label="Fit the fabric" onClick={() => onZoom(null)}>
        ⤢
      </IconButton>
      <IconButton label="Zoom the fabric in" disabled={!larger} onClick={() => onZoom(larger ?? null)}>
        +
      </IconButton>
    </div>
  );
}

/** Links that a broken rule or a figure names, and those that carry too much. */
function MarkedLinks({ shown }: { shown: BenchView }) {
  const { setting, fabric } = useBenchStore();
  const marks = useBench((state) => state.marks);
  const overfull = shown.facts.violations.filter((violation) => violation.rule === 'R6');
  const ids = new Set([...(marks?.linkIds ?? []), ...overfull.flatMap((violation) => violation.linkIds)]);
  return [...ids].map((id) => {
    const link = setting.graph.links[setting.graph.linkIndex.get(id) ?? -1];
    if (!link) return null;
    return linkBoxes(fabric, link).map((box, i) => (
      <rect
        key={`${id} ${i}`}
        {...box}
        fill="var(--madder-wash)"
        stroke={marks?.linkIds.includes(id) ? 'var(--madder)' : 'none'}
        strokeWidth={1.2}
      />
    ));
  });
}

/** Tiles that a broken rule or a reason names. */
function TileMarks() {
  const { setting, fabric } = useBenchStore();
  const marks = useBench((state) => state.marks);
  const placement = useBench((state) => state.content.placement);
  if (!marks) return null;
  const tiles = new Set<string>(marks.tileIds);
  for (const op of marks.opIds) {
    const tile = placement[op];
    if (tile !== undefined) tiles.add(tile);
  }
  return [...tiles].map((id) => {
    const index = setting.graph.tileIndex(id);
    if (index < 0) return null;
    const { row, col } = positionOf(fabric, index);
    const box = tileBox(row, col);
    return (
      <rect
        key={id}
        x={box.x - 4}
        y={box.y - 4}
        width={box.width + 8}
        height={box.height + 8}
        fill="none"
        stroke="var(--madder)"
        strokeWidth={2.4}
        strokeDasharray="7 4"
      />
    );
  });
}

/** What a key does on a tile besides moving; true when it did something. */
function gridKey(
  event: KeyboardEvent,
  tile: number,
  state: ReturnType<ReturnType<typeof useBenchStore>['getState']>,
): boolean {
  if (event.ctrlKey || event.metaKey || event.altKey) return false;
  const there = state.byTile.get(tile);
  switch (event.key) {
    case 'Escape':
      if (state.held === null) return false;
      state.pick(null);
      return true;
    case 'Delete':
    case 'Backspace':
    case 'u':
      if (there === undefined) state.say('There is no op on this tile.');
      else state.unplace(there);
      return true;
    case 'p':
      if (there === undefined) state.say('There is no op on this tile.');
      else state.togglePin(there);
      return true;
    default:
      return false;
  }
}
