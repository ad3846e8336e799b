/** What a space is drawn from: lines and signs in data units. */
import type { GlyphName } from '@/graphics/glyphs';

export interface SpaceLine {
  readonly id: string;
  readonly label: string;
  /** What the legend calls it, where the label holds numbers that move. */
  readonly name?: string;
  readonly colour: string;
  readonly dashed: boolean;
  readonly opacity: number;
  readonly twin: boolean;
  /** x, y, z of each point in data units. */
  readonly points: Float64Array;
}

export interface SpacePoint {
  readonly label: string;
  readonly description: string;
  readonly at: readonly [number, number, number];
  readonly glyph: GlyphName;
  readonly colour: string;
  readonly size: number;
  readonly named: boolean;
  readonly twin: boolean;
}

/** Reads a state as a place in the space. */
export type ReadPoint = (
  states: Float64Array,
  offset: number,
  time: number,
  parameter: number,
) => [number, number, number];
