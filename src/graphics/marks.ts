/** Marks of a figure in pixels: a display list drawn alike on canvas and written as SVG. */
import type { GlyphName } from './glyphs';

export interface PathMark {
  readonly kind: 'path';
  /** x0, y0, x1, y1, …; a non-finite number lifts the pen. */
  readonly points: Float64Array;
  readonly stroke: string | null;
  readonly width: number;
  readonly dash?: readonly number[];
  readonly fill?: string;
  readonly opacity?: number;
  readonly closed?: boolean;
}

/** Unconnected strokes x0, y0, x1, y1 each, drawn in one go. */
export interface StrokesMark {
  readonly kind: 'strokes';
  readonly segments: Float64Array;
  readonly stroke: string;
  readonly width: number;
  readonly dash?: readonly number[];
  readonly opacity?: number;
}

export interface GlyphMark {
  readonly kind: 'glyph';
  readonly glyph: GlyphName;
  readonly x: number;
  readonly y: number;
  /** Half of its extent. */
  readonly size: number;
  readonly colour: string;
  readonly ground: string;
  readonly angle?: number;
  readonly opacity?: number;
}

export interface TextMark {
  readonly kind: 'text';
  readonly x: number;
  readonly y: number;
  readonly text: string;
  readonly size: number;
  readonly colour: string;
  readonly anchor: 'start' | 'middle' | 'end';
  readonly baseline: 'top' | 'middle' | 'bottom';
  readonly family: 'text' | 'figures' | 'heading';
  readonly weight?: number;
  readonly rotate?: number;
  /** Colour of a ground behind the letters. */
  readonly halo?: string;
}

export interface RectMark {
  readonly kind: 'rect';
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
  readonly fill: string;
  readonly radius?: number;
  readonly opacity?: number;
}

/** Marks seen through a window. */
export interface ClipMark {
  readonly kind: 'clip';
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
  readonly marks: readonly Mark[];
}

export type Mark = PathMark | StrokesMark | GlyphMark | TextMark | RectMark | ClipMark;

export interface Figure {
  readonly width: number;
  readonly height: number;
  readonly title: string;
  readonly description: string;
  readonly marks: readonly Mark[];
}

export const FONT_FAMILIES: Readonly<Record<TextMark['family'], string>> = {
  text: "'Atkinson Hyperlegible Next Variable', 'Atkinson Hyperlegible Next', system-ui, sans-serif",
  figures: "'Atkinson Hyperlegible Mono Variable', 'Atkinson Hyperlegible Mono', ui-monospace, monospace",
  heading: "'Newsreader Variable', Newsreader, Georgia, serif",
};
