import type { AttractorClass, MapAxis, MapResult } from './contract';

export const SHEET_DEFAULTS = {
  /** Finest distance of the first cells: every 8th. */
  firstStride: 8,
  /** Larger maps begin with cells further apart, so that about so many a side come first. */
  firstCells: 16,
} as const;

/** Value at the centre of each cell of an axis. */
export function axisValues({ from, to, cells }: MapAxis): Float64Array {
  return Float64Array.from({ length: cells }, (_, k) => from + ((k + 0.5) / cells) * (to - from));
}

/** Distances between the cells of each level, falling to 1: 8, 4, 2, 1 up to about 200 cells a side. */
export function refinementStrides(nx: number, ny: number): number[] {
  let stride: number = SHEET_DEFAULTS.firstStride;
  while (Math.max(nx, ny) / stride > 2 * SHEET_DEFAULTS.firstCells) stride *= 2;
  const strides: number[] = [];
  for (; stride >= 1; stride /= 2) strides.push(stride);
  return strides;
}

/** One row of the cells that are new at a level, in the order in which they are computed. */
export interface LevelRow {
  readonly iy: number;
  readonly stride: number;
  readonly columns: readonly number[];
}

/**
 * Rows of all levels, coarse first: at each stride the cells on its lattice that no coarser one has, row
 * after row, every second one backwards so that neighbours follow each other.
 */
export function* levelRows(nx: number, ny: number): Generator<LevelRow, void> {
  const strides = refinementStrides(nx, ny);
  for (const [level, stride] of strides.entries()) {
    let backwards = false;
    for (let iy = 0; iy < ny; iy += stride) {
      const coarseRow = level > 0 && iy % (2 * stride) === 0;
      const columns: number[] = [];
      for (let ix = coarseRow ? stride : 0; ix < nx; ix += coarseRow ? 2 * stride : stride) columns.push(ix);
      if (columns.length === 0) continue;
      yield { iy, stride, columns: backwards ? columns.reverse() : columns };
      backwards = !backwards;
    }
  }
}

/** A map while it is filled: coarse cells stand for their surroundings until those are computed. */
export class MapSheet {
  readonly nx: number;
  readonly ny: number;
  readonly values: Float64Array;
  readonly state: Uint8Array;
  computed = 0;
  private readonly began: number;

  constructor(
    private readonly quantity: MapResult['quantity'],
    readonly x: MapAxis,
    readonly y: MapAxis,
    private readonly clock: () => number = () => 0,
  ) {
    this.nx = x.cells;
    this.ny = y.cells;
    this.values = new Float64Array(this.nx * this.ny).fill(Number.NaN);
    this.state = new Uint8Array(this.nx * this.ny);
    this.began = clock();
  }

  get cells(): number {
    return this.nx * this.ny;
  }

  get fraction(): number {
    return this.computed / this.cells;
  }

  /** Sets a cell computed at a level, and its surroundings where they have nothing of their own. */
  set(ix: number, iy: number, stride: number, value: number): void {
    const { nx, ny, values, state } = this;
    const back = Math.floor(stride / 2);
    // The last cells of a lattice stand for all up to the edge.
    const toX = ix + stride >= nx ? nx : ix + stride - back;
    const toY = iy + stride >= ny ? ny : iy + stride - back;
    for (let b = Math.max(0, iy - back); b < toY; b += 1)
      for (let a = Math.max(0, ix - back); a < toX; a += 1) {
        const at = b * nx + a;
        if (state[at] === 2) continue;
        values[at] = value;
        state[at] = 1;
      }
    state[iy * nx + ix] = 2;
    this.computed += 1;
  }

  /** The map as it is now; its arrays are copies. */
  result(status: MapResult['status'], message: string, kinds: readonly AttractorClass[] = []): MapResult {
    return {
      status,
      message,
      quantity: this.quantity,
      x: this.x,
      y: this.y,
      values: this.values.slice(),
      state: this.state.slice(),
      kinds: [...kinds],
      computed: this.computed,
      milliseconds: this.clock() - this.began,
    };
  }
}
