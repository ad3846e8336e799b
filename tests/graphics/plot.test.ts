import { describe, expect, it } from 'vitest';

import { axisTicks, createScale, paddedDomain } from '@/graphics/axis';
import { exportFigure, exportRoom } from '@/graphics/export-figure';
import { PALETTES } from '@/graphics/palette';
import { plotFigure } from '@/graphics/plot-figure';
import { layoutPlot } from '@/graphics/plot-layout';
import type { PlotSpec } from '@/graphics/plot-spec';
import { csvCell, plotTables, tablesToCsv } from '@/graphics/plot-table';
import { figureToSvg } from '@/graphics/svg-renderer';

const spec: PlotSpec = {
  title: 'Trajectories of <script>alert(1)</script> & "kin"',
  description: 'two lines',
  x: { name: 'time', unit: 'week', logarithm: false, domain: [0, 10] },
  y: { name: 'density', unit: 'per m²', logarithm: false, domain: [0, 2] },
  lines: [
    {
      id: 'a',
      label: '=cmd()',
      colour: '#1d4f8c',
      width: 2,
      marker: null,
      x: Float64Array.of(0, 5, 10),
      y: Float64Array.of(0, 1, 2),
      twin: false,
    },
    {
      id: 'b',
      label: 'other, "quoted"',
      colour: '#8f897b',
      width: 1.4,
      dash: [4, 3],
      marker: null,
      x: Float64Array.of(0, 5, 10),
      y: Float64Array.of(1, NaN, 1),
      twin: true,
    },
  ],
  bands: [],
  points: [
    {
      id: 'p',
      label: 'Hopf',
      description: 'Hopf at 5.',
      x: 5,
      y: 1,
      glyph: 'Hopf',
      colour: '#000000',
      size: 7,
      named: true,
      twin: false,
    },
    {
      id: 'q',
      label: 'fold',
      description: 'Outside.',
      x: 50,
      y: 1,
      glyph: 'fold',
      colour: '#000000',
      size: 7,
      named: true,
      twin: false,
    },
  ],
  handles: [],
  flow: null,
  legend: [{ label: 'a <b>', colour: '#1d4f8c', marker: 'circle', line: 'solid' }],
  notes: ['A model is no permit.'],
  empty: null,
};

describe('axes', () => {
  it('maps there and back, linear and logarithmic', () => {
    for (const logarithm of [false, true]) {
      const scale = createScale({ name: '', unit: '', logarithm, domain: [0.01, 100] }, [30, 530]);
      for (const value of [0.02, 1, 77]) expect(scale.invert(scale(value))).toBeCloseTo(value, 9);
    }
  });

  it('has no place for zero on a logarithmic axis', () => {
    expect(createScale({ name: '', unit: '', logarithm: true, domain: [0.01, 100] }, [0, 1])(0)).toBeNaN();
  });

  it('ticks lie within the domain and are round', () => {
    const ticks = axisTicks({ name: '', unit: '', logarithm: false, domain: [0.13, 7.9] }, 5).map(
      (one) => one.value,
    );
    expect(ticks).toEqual([2, 4, 6]);
    const powers = axisTicks({ name: '', unit: '', logarithm: true, domain: [1e-8, 10] }, 4);
    expect(powers.length).toBeLessThanOrEqual(6);
    for (const { value } of powers) expect(Math.log10(value)).toBeCloseTo(Math.round(Math.log10(value)), 12);
  });

  it('widens what has no size', () => {
    const [low, high] = paddedDomain(3, 3, { logarithm: false });
    expect(low).toBeLessThan(3);
    expect(high).toBeGreaterThan(3);
    expect(paddedDomain(Infinity, -Infinity, { logarithm: true })[0]).toBeGreaterThan(0);
  });
});

describe('a plot as a figure', () => {
  const layout = layoutPlot(spec, 600, 400, null);
  const figure = plotFigure(spec, layout, PALETTES.light);

  it('puts data where the axes say', () => {
    const clip = figure.marks.find((mark) => mark.kind === 'clip');
    const paths = clip?.kind === 'clip' ? clip.marks.filter((mark) => mark.kind === 'path') : [];
    const own = paths.find((mark) => mark.stroke === '#1d4f8c');
    expect(own?.points[4]).toBeCloseTo(layout.left + layout.innerWidth, 6);
    expect(own?.points[5]).toBeCloseTo(layout.top, 6);
    // The twin lies beneath.
    expect(paths.findIndex((mark) => mark.stroke === '#8f897b')).toBeLessThan(
      paths.findIndex((mark) => mark === own),
    );
  });

  it('names points in view in words and leaves out those outside', () => {
    const glyphs = figure.marks.filter((mark) => mark.kind === 'glyph');
    expect(glyphs.map((mark) => mark.glyph)).toEqual(['Hopf']);
    expect(figure.marks.some((mark) => mark.kind === 'text' && mark.text === 'Hopf')).toBe(true);
  });

  it('becomes well-formed SVG whatever the words hold, with notes and legend, at the chosen size', () => {
    const content = { title: spec.title, legend: spec.legend, notes: spec.notes };
    const room = exportRoom(content, 600);
    const plot = plotFigure(spec, layoutPlot(spec, 600, 500 - room.head - room.foot, null), PALETTES.light);
    const svg = figureToSvg(exportFigure(plot, content, PALETTES.light));
    const parsed = new DOMParser().parseFromString(svg, 'image/svg+xml');
    expect(parsed.querySelector('parsererror')).toBeNull();
    expect(parsed.querySelector('script')).toBeNull();
    expect(parsed.documentElement.getAttribute('width')).toBe('600');
    expect(Number(parsed.documentElement.getAttribute('height'))).toBeCloseTo(500, 6);
    const words = [...parsed.querySelectorAll('text')].map((one) => one.textContent);
    expect(words).toContain(spec.title);
    expect(words).toContain('A model is no permit.');
    expect(words).toContain('a <b>');
    expect(words).toContain('density (per m²)');
  });

  it('lifts the pen at gaps', () => {
    const svg = figureToSvg(figure);
    const dashed = /<path d="([^"]*)"[^>]*stroke-dasharray="4 3"/.exec(svg)?.[1] ?? '';
    expect(dashed.match(/M/g)).toHaveLength(2);
    expect(svg).not.toContain('NaN');
  });
});

describe('the same numbers as a table', () => {
  it('puts lines with common abscissae side by side', () => {
    const tables = plotTables(spec);
    expect(tables[0]?.columns).toEqual(['time (week)', '=cmd()', 'other, "quoted"']);
    expect(tables[0]?.rows[2]).toEqual([10, 2, 1]);
    expect(tables.at(-1)?.rows[0]?.[0]).toBe('Hopf');
  });

  it('disarms formulas and quotes in CSV, and carries the notes', () => {
    const csv = tablesToCsv(spec.title, plotTables(spec), spec.notes);
    expect(csv).toContain('# A model is no permit.\r\n');
    expect(csv).toContain(`time (week),'=cmd(),"other, ""quoted"""`);
    expect(csv).toContain('5,1,\r\n');
    expect(csvCell('-1')).toBe("'-1");
    expect(csvCell(-1)).toBe('-1');
  });
});
