import '@testing-library/jest-dom/vitest';
import { cleanup, configure } from '@testing-library/react';
import { afterEach } from 'vitest';

// A busy machine is slow, not wrong.
configure({ asyncUtilTimeout: 10_000 });
afterEach(cleanup);

// jsdom lays nothing out; the canvas library measures its nodes through these.
class ImmediateResizeObserver {
  constructor(private readonly callback: ResizeObserverCallback) {}
  observe(target: Element) {
    this.callback([{ target } as ResizeObserverEntry], this as unknown as ResizeObserver);
  }
  unobserve() {}
  disconnect() {}
}
class ScaleMatrix {
  readonly m22: number;
  constructor(transform?: string) {
    this.m22 = Number(transform?.match(/scale\(([\d.]+)\)/)?.[1] ?? 1);
  }
}
globalThis.ResizeObserver = ImmediateResizeObserver as unknown as typeof ResizeObserver;
globalThis.DOMMatrixReadOnly = ScaleMatrix as unknown as typeof DOMMatrixReadOnly;
Object.defineProperties(HTMLElement.prototype, {
  offsetHeight: { configurable: true, get: () => 40 },
  offsetWidth: { configurable: true, get: () => 120 },
});
Object.assign(SVGElement.prototype, { getBBox: () => ({ x: 0, y: 0, width: 0, height: 0 }) });
