import { drawFigure } from '@/graphics/canvas-renderer';
import { exportFigure, exportRoom } from '@/graphics/export-figure';
import type { Figure } from '@/graphics/marks';
import type { Palette } from '@/graphics/palette';
import type { LegendItem } from '@/graphics/plot-spec';
import { tablesToCsv, type PlotTable } from '@/graphics/plot-table';
import { figureToSvg } from '@/graphics/svg-renderer';

/** A picture that can be taken out of the page: flat plots and scenes alike. */
export interface ExportSource {
  readonly title: string;
  readonly legend: readonly LegendItem[];
  readonly notes: readonly string[];
  figure(width: number, height: number): Figure;
  tables(): readonly PlotTable[];
}

export type ExportFormat = 'svg' | 'png' | 'csv';

/** Pixels a PNG has for each pixel of its size, so that it prints well. */
const PNG_SCALE = 2;

function composed(source: ExportSource, palette: Palette, width: number, height: number): Figure {
  const room = exportRoom(source, width);
  const plot = source.figure(width, Math.max(120, height - room.head - room.foot));
  return exportFigure(plot, source, palette);
}

async function toPng(figure: Figure): Promise<Blob> {
  const canvas = document.createElement('canvas');
  canvas.width = Math.round(figure.width * PNG_SCALE);
  canvas.height = Math.round(figure.height * PNG_SCALE);
  const context = canvas.getContext('2d');
  if (!context) throw new Error('This browser gives no canvas to draw on. Export SVG instead.');
  await document.fonts?.ready;
  context.scale(PNG_SCALE, PNG_SCALE);
  drawFigure(context, figure);
  return new Promise((resolve, reject) =>
    canvas.toBlob(
      (blob) =>
        blob ? resolve(blob) : reject(new Error('The picture is too large for PNG. Choose a smaller size.')),
      'image/png',
    ),
  );
}

export async function exportBlob(
  source: ExportSource,
  format: ExportFormat,
  palette: Palette,
  width: number,
  height: number,
): Promise<Blob> {
  if (format === 'csv')
    return new Blob([tablesToCsv(source.title, source.tables(), source.notes)], {
      type: 'text/csv;charset=utf-8',
    });
  const figure = composed(source, palette, width, height);
  if (format === 'png') return toPng(figure);
  return new Blob([figureToSvg(figure)], { type: 'image/svg+xml' });
}

/** A file name made of letters and digits alone, whatever the title holds. */
export function exportFileName(title: string, format: ExportFormat): string {
  const plain = title
    .toLowerCase()
    .normalize('NFKD')
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 60);
  return `${plain || 'plot'}.${format}`;
}
