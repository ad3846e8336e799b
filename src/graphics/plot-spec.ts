/** What a flat plot shows, in data units: independent of size, zoom and the way it is drawn. */
import type { AxisSpec } from './axis';
import type { GlyphName } from './glyphs';

export interface PlotLine {
  readonly id: string;
  readonly label: string;
  /** What the legend calls it, where the label holds numbers that move. */
  readonly name?: string;
  readonly colour: string;
  readonly width: number;
  readonly dash?: readonly number[];
  readonly opacity?: number;
  /** Placed here and there along the line, so that colour is not alone. */
  readonly marker: GlyphName | null;
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** Part of the pooled twin. */
  readonly twin: boolean;
  /** Rows that the table and the readout leave out, e.g. a zero-growth line made of segments. */
  readonly segments?: boolean;
}

export interface PlotBand {
  readonly id: string;
  readonly label: string;
  readonly colour: string;
  readonly x: Float64Array;
  readonly low: Float64Array;
  readonly high: Float64Array;
  readonly opacity: number;
  readonly dash?: readonly number[];
  /** Edges of a continued cycle are as wide as branches; else they are thin. */
  readonly edge?: { readonly width: number; readonly opacity: number };
  readonly twin: boolean;
}

export interface PlotPoint {
  readonly id: string;
  readonly label: string;
  /** Whole sentence for readers and the readout. */
  readonly description: string;
  readonly x: number;
  readonly y: number;
  readonly glyph: GlyphName;
  readonly colour: string;
  readonly size: number;
  /** Names beside the mark where there is room. */
  readonly named: boolean;
  readonly twin: boolean;
  /** Direction of a line that the sign sits on, from one data point to another. */
  readonly along?: { readonly dx: number; readonly dy: number };
}

/** A draggable thing: a start ring, or the line of the current parameter value. */
export interface PlotHandle {
  readonly id: string;
  readonly label: string;
  readonly shape: 'ring' | 'vertical';
  readonly x: number;
  readonly y: number;
  readonly moves: 'x' | 'y' | 'both';
  readonly colour: string;
}

export interface LegendItem {
  readonly label: string;
  readonly colour: string;
  readonly marker: GlyphName | null;
  readonly line: 'solid' | 'dashed' | 'thin' | 'band' | 'none';
}

/** Coloured cells on a grid, beneath everything else. */
export interface PlotCells {
  readonly x: { readonly from: number; readonly to: number; readonly count: number };
  readonly y: { readonly from: number; readonly to: number; readonly count: number };
  /** Colour of cell iy*nx + ix; null where there is none. */
  readonly colour: (cell: number) => string | null;
  /** What a cell says under the pointer and in the table. */
  readonly describe: (cell: number) => string | null;
  /** Number of a cell for the table; NaN where there is none. */
  readonly value: (cell: number) => number;
  readonly label: string;
}

export interface PlotSpec {
  readonly title: string;
  /** Sentence for readers who do not see the plot. */
  readonly description: string;
  readonly x: AxisSpec;
  readonly y: AxisSpec;
  readonly lines: readonly PlotLine[];
  readonly bands: readonly PlotBand[];
  readonly points: readonly PlotPoint[];
  readonly handles: readonly PlotHandle[];
  readonly cells?: PlotCells | null;
  /** x, y, dx, dy of arrows, in data units. */
  readonly flow: Float64Array | null;
  readonly legend: readonly LegendItem[];
  /** Said under the plot, and under its exports. */
  readonly notes: readonly string[];
  /** Why there is nothing to draw, with the next thing to do. */
  readonly empty: string | null;
}

export interface Viewport {
  readonly x: readonly [number, number];
  readonly y: readonly [number, number];
}
