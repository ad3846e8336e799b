import { useEffect, useMemo, useRef, useState, type MouseEvent, type ReactNode } from 'react';

import { drawFigure } from '@/graphics/canvas-renderer';
import type { Palette } from '@/graphics/palette';
import { plotFigure } from '@/graphics/plot-figure';
import { layoutPlot, type PlotLayout } from '@/graphics/plot-layout';
import type { PlotSpec } from '@/graphics/plot-spec';

import { useWidth } from './use-width';

interface KeptPlotProps {
  readonly spec: PlotSpec;
  readonly palette: Palette;
  readonly height?: number;
  /** Called with a place of the plot that was clicked. */
  readonly onPlace?: ((x: number, y: number) => void) | undefined;
  /** What lies over the plot, e.g. pins. */
  readonly over?: (layout: PlotLayout) => ReactNode;
}

function Legend({ spec }: { readonly spec: PlotSpec }) {
  return (
    <ul aria-label="Legend" className="flex flex-wrap gap-x-4 gap-y-0.5 text-sm">
      {spec.legend.map(({ label, colour }) => (
        <li key={label} className="flex items-center gap-1.5">
          <svg width="20" height="10" viewBox="0 0 20 10" aria-hidden>
            <path d="M0,5H20" stroke={colour} strokeWidth="2.6" />
          </svg>
          {label}
        </li>
      ))}
      <li className="text-muted">solid attracts, dashed repels, a band is a cycle</li>
    </ul>
  );
}

/** A plot of kept sweeps; their special points are named in it and read out under the pointer. */
export function KeptPlot({ spec, palette, height = 380, onPlace, over }: KeptPlotProps) {
  const frame = useRef<HTMLDivElement>(null);
  const canvas = useRef<HTMLCanvasElement>(null);
  const width = useWidth(frame);
  const [read, setRead] = useState('');
  const layout = useMemo(
    () => (width > 80 ? layoutPlot(spec, width, height, null) : null),
    [spec, width, height],
  );
  useEffect(() => {
    const context = layout ? canvas.current?.getContext('2d') : null;
    if (!canvas.current || !context || !layout) return;
    const ratio = window.devicePixelRatio || 1;
    canvas.current.width = Math.round(width * ratio);
    canvas.current.height = Math.round(height * ratio);
    context.setTransform(ratio, 0, 0, ratio, 0, 0);
    drawFigure(context, plotFigure(spec, layout, palette));
  }, [spec, layout, palette, width, height]);

  const within = (event: MouseEvent) => {
    const box = event.currentTarget.getBoundingClientRect();
    return [event.clientX - box.left, event.clientY - box.top] as const;
  };
  const handleMove = (event: MouseEvent) => {
    if (!layout) return;
    const [x, y] = within(event);
    const near = spec.points.find(
      (point) => Math.hypot(layout.x(point.x) - x, layout.y(point.y) - y) < point.size + 5,
    );
    setRead(near?.description ?? '');
  };
  const handleClick = (event: MouseEvent) => {
    if (!layout || !onPlace) return;
    const [x, y] = within(event);
    const inside =
      x >= layout.left &&
      x <= layout.left + layout.innerWidth &&
      y >= layout.top &&
      y <= layout.top + layout.innerHeight;
    if (inside) onPlace(layout.x.invert(x), layout.y.invert(y));
  };

  return (
    <figure className="grid gap-2">
      <div ref={frame} className="relative rounded-lg border bg-raised" style={{ height }}>
        <canvas
          ref={canvas}
          role="img"
          aria-label={spec.description}
          className={onPlace ? 'size-full cursor-crosshair rounded-lg' : 'size-full rounded-lg'}
          onMouseMove={handleMove}
          onMouseLeave={() => setRead('')}
          onClick={handleClick}
        />
        {layout ? over?.(layout) : null}
        {spec.empty ? (
          <p className="pointer-events-none absolute inset-x-16 top-1/3 text-center text-muted">
            {spec.empty}
          </p>
        ) : null}
      </div>
      <figcaption className="flex flex-wrap justify-between gap-x-6">
        <Legend spec={spec} />
        <p className="min-h-6 text-sm text-muted">{read}</p>
      </figcaption>
    </figure>
  );
}
