import type { PlotLayout } from '@/graphics/plot-layout';
import type { Viewport } from '@/graphics/plot-spec';

/** The view after scaling about a pixel; `factor` below 1 comes nearer. */
export function zoomedView(layout: PlotLayout, px: number, py: number, factor: number): Viewport {
  const right = layout.left + layout.innerWidth;
  const bottom = layout.top + layout.innerHeight;
  const x = (pixel: number) => layout.x.invert(px + (pixel - px) * factor);
  const y = (pixel: number) => layout.y.invert(py + (pixel - py) * factor);
  return { x: [x(layout.left), x(right)], y: [y(bottom), y(layout.top)] };
}

/** The view after dragging the ground by so many pixels. */
export function pannedView(layout: PlotLayout, dx: number, dy: number): Viewport {
  const right = layout.left + layout.innerWidth;
  const bottom = layout.top + layout.innerHeight;
  return {
    x: [layout.x.invert(layout.left - dx), layout.x.invert(right - dx)],
    y: [layout.y.invert(bottom - dy), layout.y.invert(layout.top - dy)],
  };
}

/** Refuses views so small or large that numbers would lose their meaning. */
export function isSensible(view: Viewport): boolean {
  return [view.x, view.y].every(([from, to]) => {
    const size = Math.abs(to - from);
    const scale = Math.max(Math.abs(from), Math.abs(to));
    return Number.isFinite(from) && Number.isFinite(to) && size > scale * 1e-10 && size < 1e15;
  });
}
