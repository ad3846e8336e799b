/** Draws a figure on a two-dimensional canvas context, already scaled to the device. */
import { GLYPHS } from './glyphs';
import {
  FONT_FAMILIES,
  type Figure,
  type GlyphMark,
  type Mark,
  type PathMark,
  type RectMark,
  type TextMark,
} from './marks';

const compiled = new Map<string, Path2D>();
function pathOf(d: string): Path2D {
  let path = compiled.get(d);
  if (!path) compiled.set(d, (path = new Path2D(d)));
  return path;
}

function drawPath(context: CanvasRenderingContext2D, mark: PathMark): void {
  const { points } = mark;
  context.beginPath();
  let down = false;
  for (let k = 0; k + 1 < points.length; k += 2) {
    const x = points[k] ?? NaN;
    const y = points[k + 1] ?? NaN;
    if (!Number.isFinite(x) || !Number.isFinite(y)) down = false;
    else if (down) context.lineTo(x, y);
    else {
      context.moveTo(x, y);
      down = true;
    }
  }
  if (mark.closed) context.closePath();
  context.globalAlpha = mark.opacity ?? 1;
  if (mark.fill) {
    context.fillStyle = mark.fill;
    context.fill();
  }
  if (mark.stroke) {
    context.strokeStyle = mark.stroke;
    context.lineWidth = mark.width;
    context.setLineDash([...(mark.dash ?? [])]);
    context.stroke();
  }
}

function drawGlyph(context: CanvasRenderingContext2D, mark: GlyphMark): void {
  context.save();
  context.globalAlpha = mark.opacity ?? 1;
  context.translate(mark.x, mark.y);
  context.rotate(mark.angle ?? 0);
  context.scale(mark.size, mark.size);
  context.lineWidth = 1.7 / mark.size;
  context.setLineDash([]);
  for (const { d, fill, stroke } of GLYPHS[mark.glyph]) {
    const path = pathOf(d);
    if (fill !== 'none') {
      context.fillStyle = fill === 'ground' ? mark.ground : mark.colour;
      context.fill(path);
    }
    if (stroke) {
      context.strokeStyle = mark.colour;
      context.stroke(path);
    }
  }
  context.restore();
}

function drawText(context: CanvasRenderingContext2D, mark: TextMark): void {
  context.save();
  context.globalAlpha = 1;
  context.translate(mark.x, mark.y);
  if (mark.rotate) context.rotate((mark.rotate * Math.PI) / 180);
  context.font = `${mark.weight ?? 400} ${mark.size}px ${FONT_FAMILIES[mark.family]}`;
  context.textAlign = mark.anchor === 'middle' ? 'center' : mark.anchor;
  context.textBaseline = mark.baseline;
  if (mark.halo) {
    context.lineJoin = 'round';
    context.setLineDash([]);
    context.lineWidth = 4;
    context.strokeStyle = mark.halo;
    context.strokeText(mark.text, 0, 0);
  }
  context.fillStyle = mark.colour;
  context.fillText(mark.text, 0, 0);
  context.restore();
}

function drawRect(context: CanvasRenderingContext2D, mark: RectMark): void {
  context.globalAlpha = mark.opacity ?? 1;
  context.fillStyle = mark.fill;
  context.beginPath();
  context.roundRect(mark.x, mark.y, mark.width, mark.height, mark.radius ?? 0);
  context.fill();
}

function drawMark(context: CanvasRenderingContext2D, mark: Mark): void {
  if (mark.kind === 'path') drawPath(context, mark);
  else if (mark.kind === 'glyph') drawGlyph(context, mark);
  else if (mark.kind === 'text') drawText(context, mark);
  else if (mark.kind === 'rect') drawRect(context, mark);
  else if (mark.kind === 'strokes') {
    context.beginPath();
    for (let k = 0; k + 3 < mark.segments.length; k += 4) {
      context.moveTo(mark.segments[k] ?? 0, mark.segments[k + 1] ?? 0);
      context.lineTo(mark.segments[k + 2] ?? 0, mark.segments[k + 3] ?? 0);
    }
    context.globalAlpha = mark.opacity ?? 1;
    context.strokeStyle = mark.stroke;
    context.lineWidth = mark.width;
    context.setLineDash([...(mark.dash ?? [])]);
    context.stroke();
  } else {
    context.save();
    context.beginPath();
    context.rect(mark.x, mark.y, mark.width, mark.height);
    context.clip();
    for (const inner of mark.marks) drawMark(context, inner);
    context.restore();
  }
}

export function drawFigure(context: CanvasRenderingContext2D, figure: Figure): void {
  context.clearRect(0, 0, figure.width, figure.height);
  context.lineJoin = 'round';
  context.lineCap = 'butt';
  for (const mark of figure.marks) drawMark(context, mark);
  context.globalAlpha = 1;
}
