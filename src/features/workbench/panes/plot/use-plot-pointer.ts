import { useEffect, useRef, type PointerEvent, type RefObject } from 'react';

import { readNearest, type Reading } from './plot-reading';
import type { PlotView } from './plot-view';
import { isSensible, pannedView, zoomedView } from './plot-zoom';

/** Hover reads, wheel zooms, dragging pans, double click resets. */
export function usePlotPointer(
  frame: RefObject<HTMLDivElement | null>,
  view: RefObject<PlotView | null>,
  showReading: (reading: Reading | null) => void,
) {
  const last = useRef<{ x: number; y: number } | null>(null);

  useEffect(() => {
    const element = frame.current;
    if (!element) return;
    // React listens to the wheel passively, so that it could not keep the page from scrolling.
    const handleWheel = (event: WheelEvent) => {
      const layout = view.current?.layout;
      if (!layout) return;
      event.preventDefault();
      const box = element.getBoundingClientRect();
      const factor = Math.exp(Math.max(-60, Math.min(60, event.deltaY)) * 0.003);
      const zoomed = zoomedView(layout, event.clientX - box.left, event.clientY - box.top, factor);
      if (isSensible(zoomed)) view.current?.setViewport(zoomed);
    };
    element.addEventListener('wheel', handleWheel, { passive: false });
    return () => element.removeEventListener('wheel', handleWheel);
  }, [frame, view]);

  return {
    onPointerDown: (event: PointerEvent<HTMLDivElement>) => {
      if (event.button !== 0 || event.pointerType === 'touch') return;
      last.current = { x: event.clientX, y: event.clientY };
      event.currentTarget.setPointerCapture(event.pointerId);
      showReading(null);
    },
    onPointerMove: (event: PointerEvent<HTMLDivElement>) => {
      const { spec, layout } = view.current ?? {};
      if (!spec || !layout) return;
      if (last.current) {
        const panned = pannedView(layout, event.clientX - last.current.x, event.clientY - last.current.y);
        if (Math.hypot(event.clientX - last.current.x, event.clientY - last.current.y) < 3) return;
        last.current = { x: event.clientX, y: event.clientY };
        if (isSensible(panned)) view.current?.setViewport(panned);
        return;
      }
      const box = event.currentTarget.getBoundingClientRect();
      showReading(readNearest(spec, layout, event.clientX - box.left, event.clientY - box.top));
    },
    onPointerUp: () => {
      last.current = null;
    },
    onPointerLeave: () => {
      last.current = null;
      showReading(null);
    },
    onDoubleClick: () => view.current?.setViewport(null),
  };
}
