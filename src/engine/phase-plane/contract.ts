/** Shared shapes of the phase plane: a slice through state space along two axes. */

export interface PlaneRequest {
  /**
   * Symbols of what lies on the axes: a state, or a population, which then means its total with the
   * composition of the held state.
   */
  readonly x: string;
  readonly y: string;
  readonly xRange: readonly [number, number];
  readonly yRange: readonly [number, number];
  /** Cells a side for the zero-growth lines, arrows a side for the flow. */
  readonly cells: number;
  readonly arrows: number;
}

export interface PlaneResult {
  readonly x: string;
  readonly y: string;
  /**
   * Zero-growth lines: for each axis, segments x0,y0,x1,y1 in the units of the axes; segments of one
   * line follow each other end to start.
   */
  readonly lines: readonly { readonly state: string; readonly segments: Float64Array }[];
  /** Arrows: x, y, dx, dy in the units of the axes, each as long as the ranges: direction alone. */
  readonly flow: Float64Array;
  /** What was held fixed, in words. */
  readonly note: string;
}
