/** The same numbers as a plot shows, as a table and as comma-separated values. */
import { axisLabel } from './axis';
import { cellCentre } from './cell-marks';
import type { PlotSpec } from './plot-spec';

export interface PlotTable {
  readonly name: string;
  readonly columns: readonly string[];
  readonly rows: readonly (readonly (number | string)[])[];
}

function sameNumbers(a: Float64Array, b: Float64Array): boolean {
  return a === b || (a.length === b.length && a.every((value, k) => value === b[k]));
}

/** Lines that share their x stand side by side; others below one another. */
export function plotTables(spec: PlotSpec): readonly PlotTable[] {
  const tables: PlotTable[] = [];
  const x = axisLabel(spec.x);
  const groups: PlotSpec['lines'][number][][] = [];
  for (const line of spec.lines) {
    const group = groups.find((one) => one[0] && !line.segments && sameNumbers(one[0].x, line.x));
    if (group) group.push(line);
    else groups.push([line]);
  }
  for (const group of groups) {
    const first = group[0];
    if (!first || first.x.length === 0) continue;
    const rows: (number | string)[][] = [];
    first.x.forEach((value, k) => {
      if (Number.isFinite(value)) rows.push([value, ...group.map((line) => line.y[k] ?? NaN)]);
    });
    tables.push({
      name: group.map((line) => line.label).join(', '),
      columns: [x, ...group.map((line) => line.label)],
      rows,
    });
  }
  for (const band of spec.bands) {
    const rows = [...band.x].map((value, k) => [value, band.low[k] ?? NaN, band.high[k] ?? NaN]);
    tables.push({ name: band.label, columns: [x, 'lowest', 'highest'], rows });
  }
  if (spec.cells) {
    const { x: across, y: up, value, describe, label } = spec.cells;
    const rows: (number | string)[][] = [];
    for (let cell = 0; cell < across.count * up.count; cell += 1) {
      const text = describe(cell);
      if (text === null) continue;
      const [ix, iy] = [cell % across.count, Math.floor(cell / across.count)];
      rows.push([cellCentre(across, ix), cellCentre(up, iy), value(cell), text]);
    }
    tables.push({ name: label, columns: [x, axisLabel(spec.y), label, 'in words'], rows });
  }
  if (spec.points.length > 0) {
    tables.push({
      name: 'Marked points',
      columns: ['point', x, axisLabel(spec.y), 'meaning'],
      rows: spec.points.map((point) => [point.label, point.x, point.y, point.description]),
    });
  }
  return tables;
}

/** Quotes a cell; one that a spreadsheet might take for a formula is disarmed. */
export function csvCell(value: number | string): string {
  if (typeof value === 'number') return Number.isFinite(value) ? String(value) : '';
  const safe = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value;
  return /[",\n\r]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

/** One row a number: table, then its columns. Notes (the caution among them) stand first as comments. */
export function tablesToCsv(title: string, tables: readonly PlotTable[], notes: readonly string[]): string {
  const lines = [title, ...notes].map((note) => `# ${note.replace(/[\r\n]+/g, ' ')}`);
  for (const table of tables) {
    lines.push('', `# ${table.name.replace(/[\r\n]+/g, ' ')}`, table.columns.map(csvCell).join(','));
    for (const row of table.rows) lines.push(row.map(csvCell).join(','));
  }
  return `${lines.join('\r\n')}\r\n`;
}
