/** Shared shapes of maps: a quantity on a grid over two parameters, or over two start values. */

export type MapQuantity =
  | 'margin' // stability margin of the coexistence equilibrium
  | 'attractor' // kind of attractor, as an index into `kinds`
  | 'lowest' // lowest density of any population on the attractor
  | 'exponent'; // largest Lyapunov exponent

/** `extinct` carries which populations: `kinds` tells in words. */
export type AttractorKind = 'rest' | 'cycle' | 'torus' | 'chaos' | 'extinct' | 'unbounded' | 'undecided';

export interface AttractorClass {
  readonly kind: AttractorKind;
  /** Lowest-to-highest visits of one period, 1 for a simple cycle; null where it has no meaning. */
  readonly windings: number | null;
  /** Populations that die out there. */
  readonly extinct: readonly string[];
  /** In words, e.g. `cycle of period 2`, `Males and Females extinct, rest otherwise`. */
  readonly label: string;
}

export interface MapAxis {
  /** Parameter key, or a state symbol for basins. */
  readonly key: string;
  readonly from: number;
  readonly to: number;
  readonly cells: number;
}

export interface MapResult {
  readonly status: 'complete' | 'cancelled' | 'failed';
  readonly message: string;
  readonly quantity: MapQuantity | 'basin';
  readonly x: MapAxis;
  readonly y: MapAxis;
  /** values[iy*nx + ix] at cell centres; NaN where not computed yet or without an answer. */
  readonly values: Float64Array;
  /** Finest level done at each cell: 0 not yet, 1 filled from a coarser cell, 2 computed itself. */
  readonly state: Uint8Array;
  readonly kinds: readonly AttractorClass[];
  readonly computed: number;
  readonly milliseconds: number;
}
