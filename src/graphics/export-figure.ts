/** A figure for paper: the plot at a chosen size, with its legend, notes and any caution beneath it. */
import type { Figure, Mark } from './marks';
import type { Palette } from './palette';
import type { LegendItem } from './plot-spec';

const MARGIN = 16;
const LINE = 18;

/** Breaks text at spaces to about the given width in pixels. */
export function wrapText(text: string, width: number, size: number): readonly string[] {
  const perLine = Math.max(10, Math.floor(width / (size * 0.52)));
  const lines: string[] = [];
  let current = '';
  for (const word of text.split(/\s+/)) {
    if (current && current.length + 1 + word.length > perLine) {
      lines.push(current);
      current = word;
    } else current = current ? `${current} ${word}` : word;
  }
  return current ? [...lines, current] : lines;
}

function legendSign(item: LegendItem, x: number, y: number, ground: string): Mark[] {
  const marks: Mark[] = [];
  if (item.line === 'band')
    marks.push({ kind: 'rect', x, y: y - 5, width: 22, height: 10, fill: item.colour, opacity: 0.25 });
  else if (item.line !== 'none')
    marks.push({
      kind: 'path',
      points: Float64Array.of(x, y, x + 22, y),
      stroke: item.colour,
      width: item.line === 'solid' ? 2.6 : 1.5,
      ...(item.line === 'dashed' ? { dash: [5, 4] } : {}),
    });
  if (item.marker)
    marks.push({
      kind: 'glyph',
      glyph: item.marker,
      x: x + 11,
      y,
      size: 4.5,
      colour: item.colour,
      ground,
    });
  return marks;
}

export interface FooterContent {
  readonly title: string;
  readonly legend: readonly LegendItem[];
  readonly notes: readonly string[];
}

/** Height of the title, and of everything beneath the plot, so that the plot fits the chosen size. */
export function exportRoom(
  content: FooterContent,
  width: number,
): { readonly head: number; readonly foot: number } {
  return { head: 34, foot: footerMarks(content, width, 0, null).height };
}

function footerMarks(
  content: FooterContent,
  width: number,
  top: number,
  palette: Palette | null,
): { readonly marks: readonly Mark[]; readonly height: number } {
  const marks: Mark[] = [];
  const ink = palette?.ink ?? '#000000';
  let x = MARGIN;
  let y = top + 12;
  for (const item of content.legend) {
    const room = 34 + item.label.length * 6.8;
    if (x > MARGIN && x + room > width - MARGIN) {
      x = MARGIN;
      y += LINE;
    }
    marks.push(...legendSign(item, x, y, palette?.raised ?? '#ffffff'), {
      kind: 'text',
      x: x + 28,
      y,
      text: item.label,
      size: 12,
      colour: ink,
      anchor: 'start',
      baseline: 'middle',
      family: 'text',
    });
    x += room + 12;
  }
  for (const note of content.notes.flatMap((one) => wrapText(one, width - 2 * MARGIN, 12))) {
    y += LINE;
    marks.push({
      kind: 'text',
      x: MARGIN,
      y,
      text: note,
      size: 12,
      colour: palette?.muted ?? '#000000',
      anchor: 'start',
      baseline: 'middle',
      family: 'text',
    });
  }
  return { marks, height: y - top + 16 };
}

function moved(mark: Mark, dy: number): Mark {
  switch (mark.kind) {
    case 'path':
      return { ...mark, points: mark.points.map((value, k) => (k % 2 === 1 ? value + dy : value)) };
    case 'strokes':
      return { ...mark, segments: mark.segments.map((value, k) => (k % 2 === 1 ? value + dy : value)) };
    case 'clip':
      return { ...mark, y: mark.y + dy, marks: mark.marks.map((inner) => moved(inner, dy)) };
    default:
      return { ...mark, y: mark.y + dy };
  }
}

export function exportFigure(plot: Figure, content: FooterContent, palette: Palette): Figure {
  const { head } = exportRoom(content, plot.width);
  const footer = footerMarks(content, plot.width, head + plot.height, palette);
  const height = head + plot.height + footer.height;
  return {
    ...plot,
    height,
    marks: [
      { kind: 'rect', x: 0, y: 0, width: plot.width, height, fill: palette.raised },
      {
        kind: 'text',
        x: MARGIN,
        y: 20,
        text: content.title,
        size: 17,
        colour: palette.ink,
        anchor: 'start',
        baseline: 'middle',
        family: 'heading',
        weight: 560,
      },
      ...plot.marks.map((mark) => moved(mark, head)),
      ...footer.marks,
    ],
  };
}
