/** Writes a figure as an SVG document. Every text passes `escapeXml`; nothing else comes from a user. */
import { GLYPHS } from './glyphs';
import { FONT_FAMILIES, type Figure, type GlyphMark, type Mark, type TextMark } from './marks';

export function escapeXml(text: string): string {
  return text
    .replace(/[^\t\n\r\u0020-\ud7ff\ue000-\ufffd\u{10000}-\u{10ffff}]/gu, '')
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}

const round = (value: number) => String(Math.round(value * 100) / 100);

function pathData(points: Float64Array, closed: boolean): string {
  let out = '';
  let down = false;
  for (let k = 0; k + 1 < points.length; k += 2) {
    const x = points[k] ?? NaN;
    const y = points[k + 1] ?? NaN;
    if (!Number.isFinite(x) || !Number.isFinite(y)) down = false;
    else {
      out += `${down ? 'L' : 'M'}${round(x)},${round(y)}`;
      down = true;
    }
  }
  return closed && out ? `${out}Z` : out;
}

function strokesData(segments: Float64Array): string {
  let out = '';
  for (let k = 0; k + 3 < segments.length; k += 4) {
    const [a = 0, b = 0, c = 0, d = 0] = segments.subarray(k, k + 4);
    out += `M${round(a)},${round(b)}L${round(c)},${round(d)}`;
  }
  return out;
}

function stroke(colour: string | null, width: number, dash?: readonly number[], opacity?: number): string {
  const dashes = dash && dash.length > 0 ? ` stroke-dasharray="${dash.join(' ')}"` : '';
  const clear = opacity !== undefined && opacity < 1 ? ` opacity="${round(opacity)}"` : '';
  return (colour ? ` stroke="${escapeXml(colour)}" stroke-width="${round(width)}"${dashes}` : '') + clear;
}

function glyph(mark: GlyphMark): string {
  const turn = mark.angle ? ` rotate(${round((mark.angle * 180) / Math.PI)})` : '';
  const parts = GLYPHS[mark.glyph].map(({ d, fill, stroke: drawn }) => {
    const paint = fill === 'none' ? 'none' : escapeXml(fill === 'ground' ? mark.ground : mark.colour);
    const line = drawn ? ` stroke="${escapeXml(mark.colour)}" stroke-width="${round(1.7 / mark.size)}"` : '';
    return `<path d="${d}" fill="${paint}"${line}/>`;
  });
  const clear = mark.opacity !== undefined ? ` opacity="${round(mark.opacity)}"` : '';
  return `<g transform="translate(${round(mark.x)} ${round(mark.y)})${turn} scale(${round(mark.size)})"${clear}>${parts.join('')}</g>`;
}

function text(mark: TextMark): string {
  const shift = { top: '0.8em', middle: '0.32em', bottom: '-0.2em' }[mark.baseline];
  const turn = mark.rotate ? ` rotate(${round(mark.rotate)})` : '';
  const halo = mark.halo
    ? ` paint-order="stroke" stroke="${escapeXml(mark.halo)}" stroke-width="4" stroke-linejoin="round"`
    : '';
  return `<text transform="translate(${round(mark.x)} ${round(mark.y)})${turn}" dy="${shift}" text-anchor="${mark.anchor}" font-family="${escapeXml(FONT_FAMILIES[mark.family])}" font-size="${round(mark.size)}" font-weight="${mark.weight ?? 400}" fill="${escapeXml(mark.colour)}"${halo}>${escapeXml(mark.text)}</text>`;
}

function markToSvg(mark: Mark, clips: string[]): string {
  switch (mark.kind) {
    case 'path': {
      const d = pathData(mark.points, mark.closed ?? false);
      if (!d) return '';
      return `<path d="${d}" fill="${mark.fill ? escapeXml(mark.fill) : 'none'}"${stroke(mark.stroke, mark.width, mark.dash, mark.opacity)}/>`;
    }
    case 'strokes':
      return `<path d="${strokesData(mark.segments)}" fill="none"${stroke(mark.stroke, mark.width, mark.dash, mark.opacity)}/>`;
    case 'glyph':
      return glyph(mark);
    case 'text':
      return text(mark);
    case 'rect':
      return `<rect x="${round(mark.x)}" y="${round(mark.y)}" width="${round(mark.width)}" height="${round(mark.height)}" rx="${mark.radius ?? 0}" fill="${escapeXml(mark.fill)}"${mark.opacity !== undefined ? ` opacity="${round(mark.opacity)}"` : ''}/>`;
    case 'clip': {
      const id = `clip-${clips.length}`;
      clips.push(
        `<clipPath id="${id}"><rect x="${round(mark.x)}" y="${round(mark.y)}" width="${round(mark.width)}" height="${round(mark.height)}"/></clipPath>`,
      );
      return `<g clip-path="url(#${id})">${mark.marks.map((inner) => markToSvg(inner, clips)).join('')}</g>`;
    }
  }
}

export function figureToSvg(figure: Figure): string {
  const clips: string[] = [];
  const body = figure.marks.map((mark) => markToSvg(mark, clips)).join('\n');
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${figure.width}" height="${figure.height}" viewBox="0 0 ${figure.width} ${figure.height}" role="img" stroke-linejoin="round">`,
    `<title>${escapeXml(figure.title)}</title>`,
    `<desc>${escapeXml(figure.description)}</desc>`,
    `<defs>${clips.join('')}</defs>`,
    body,
    '</svg>',
    '',
  ].join('\n');
}
