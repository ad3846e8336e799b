/** Arrows of the flow in a phase plane, of equal length in pixels with a small head. */
import type { Mark } from './marks';
import type { Palette } from './palette';
import type { PlotLayout } from './plot-layout';

const LENGTH = 11;
const HEAD = 3.4;

/** `flow` holds x, y, dx, dy of each arrow in data units; its direction alone is drawn. */
export function flowMarks(flow: Float64Array, layout: PlotLayout, palette: Palette): Mark[] {
  const segments: number[] = [];
  for (let k = 0; k + 3 < flow.length; k += 4) {
    const [x = NaN, y = NaN, dx = NaN, dy = NaN] = flow.subarray(k, k + 4);
    const px = layout.x(x);
    const py = layout.y(y);
    const step = 1e-4;
    const ux = layout.x(x + dx * step) - px;
    const uy = layout.y(y + dy * step) - py;
    const size = Math.hypot(ux, uy);
    if (!(size > 0) || !Number.isFinite(size)) continue;
    const cx = ux / size;
    const cy = uy / size;
    const tipX = px + (cx * LENGTH) / 2;
    const tipY = py + (cy * LENGTH) / 2;
    segments.push(px - (cx * LENGTH) / 2, py - (cy * LENGTH) / 2, tipX, tipY);
    for (const side of [-1, 1]) {
      segments.push(tipX, tipY, tipX - HEAD * (cx - side * cy * 0.7), tipY - HEAD * (cy + side * cx * 0.7));
    }
  }
  if (segments.length === 0) return [];
  return [
    {
      kind: 'strokes',
      segments: Float64Array.from(segments),
      stroke: palette.muted,
      width: 1,
      opacity: 0.75,
    },
  ];
}
