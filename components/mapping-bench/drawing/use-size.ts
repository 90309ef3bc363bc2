import { type RefObject, useEffect, useState } from 'react';

/** The size of an element in px, kept up to date; zeros before it is known. */
export function useSize(element: RefObject<HTMLElement | null>): { width: number; height: number } {
  const [size, setSize] = useState({ width: 0, height: 0 });
  useEffect(() => {
    const watched = element.current;
    if (!watched) return;
    const observer = new ResizeObserver(() => {
      setSize({ width: watched.clientWidth, height: watched.clientHeight });
    });
    observer.observe(watched);
    return () => observer.disconnect();
  }, [element]);
  return size;
}
