'use client';

import { type ReactNode, useCallback, useEffect, useRef, useState } from 'react';
import { IconButton } from '@/components/ui/button';

interface ZoomFrameProps {
  /** Width of the drawing at 100 %. */
  naturalWidthPx: number;
  naturalHeightPx: number;
  /** Draws at a width in px; without one, as wide as there is room. */
  children: (widthPx: number | undefined) => ReactNode;
}

const STEP = 1.25;
const LEAST = 0.1;
const MOST = 4;
const PAN_PX = 160;
const bounded = (zoom: number) => Math.min(MOST, Math.max(LEAST, zoom));

const pans = [
  { label: 'Move the view left', symbol: '←', rightPx: -PAN_PX, downPx: 0 },
  { label: 'Move the view up', symbol: '↑', rightPx: 0, downPx: -PAN_PX },
  { label: 'Move the view down', symbol: '↓', rightPx: 0, downPx: PAN_PX },
  { label: 'Move the view right', symbol: '→', rightPx: PAN_PX, downPx: 0 },
] as const;

/**
 * A drawing that can be enlarged: by buttons, by + − 0 on the keyboard, by the wheel with Ctrl. It is moved by
 * buttons, by the plain wheel and the scroll bars, and follows the keyboard's focus.
 */
export function ZoomFrame({ naturalWidthPx, naturalHeightPx, children }: ZoomFrameProps) {
  /** Null: fitted to the room there is. */
  const [zoom, setZoom] = useState<number | null>(null);
  const view = useRef<HTMLDivElement>(null);
  const change = useCallback(
    (factor: number) => setZoom((now) => bounded((now ?? fitted(view.current, naturalWidthPx)) * factor)),
    [naturalWidthPx],
  );

  useEffect(() => {
    const element = view.current;
    if (!element) return;
    const onWheel = (event: WheelEvent) => {
      if (!event.ctrlKey && !event.metaKey) return;
      event.preventDefault();
      change(event.deltaY < 0 ? STEP : 1 / STEP);
    };
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.ctrlKey || event.metaKey || event.altKey) return;
      if (event.key === '+' || event.key === '=') change(STEP);
      else if (event.key === '-') change(1 / STEP);
      else if (event.key === '0') setZoom(null);
      else return;
      event.preventDefault();
    };
    // Not through React: its wheel listeners are passive and cannot keep the browser from zooming the page.
    element.addEventListener('wheel', onWheel, { passive: false });
    element.addEventListener('keydown', onKeyDown);
    return () => {
      element.removeEventListener('wheel', onWheel);
      element.removeEventListener('keydown', onKeyDown);
    };
  }, [change]);

  return (
    <div>
      <div className="mb-2 flex flex-wrap items-center gap-1" role="toolbar" aria-label="View">
        <IconButton label="Zoom out" onClick={() => change(1 / STEP)}>
          −
        </IconButton>
        <IconButton label="Zoom in" onClick={() => change(STEP)}>
          +
        </IconButton>
        <IconButton label="Fit to the screen" onClick={() => setZoom(null)}>
          <span className="px-1">Fit</span>
        </IconButton>
        <span className="w-14 text-center font-mono text-xs text-quiet" role="status">
          {zoom === null ? 'fitted' : `${Math.round(zoom * 100)} %`}
        </span>
        {zoom === null
          ? null
          : pans.map((pan) => (
              <IconButton
                key={pan.label}
                label={pan.label}
                onClick={() => view.current?.scrollBy({ left: pan.rightPx, top: pan.downPx })}
              >
                {pan.symbol}
              </IconButton>
            ))}
      </div>
      <div ref={view} className="max-h-[78dvh] overflow-auto rounded-md border border-rule bg-surface p-3">
        {zoom === null ? (
          <div
            className="mx-auto"
            // As wide as there is room, and no wider than what shows it whole in the frame's height.
            style={{ maxWidth: `calc((78dvh - 1.75rem) * ${naturalWidthPx / naturalHeightPx})` }}
          >
            {children(undefined)}
          </div>
        ) : (
          children(naturalWidthPx * zoom)
        )}
      </div>
    </div>
  );
}

/** The scale at which the drawing stands while it is fitted. */
function fitted(view: HTMLElement | null, naturalWidthPx: number): number {
  const drawnPx = view?.firstElementChild?.getBoundingClientRect().width ?? naturalWidthPx;
  return drawnPx > 0 ? drawnPx / naturalWidthPx : 1;
}
