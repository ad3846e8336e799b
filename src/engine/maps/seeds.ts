/** Neighbours of a cell in opposite pairs, dx and dy of one; the other lies opposite. Along the axes, then the diagonals. */
const PAIRS = [1, 0, 0, 1, 1, 1, 1, -1];
const NEIGHBOURS = 8;

/** Neighbours count as one branch where no state differs by more than this share. */
const SAME_BRANCH = 0.3;

/** What the neighbours of a cell offer to begin from. */
export type SeedKind = 'none' | 'one branch' | 'several branches';

/**
 * Equilibria found in the cells of a map, as starts for the cells between them. Kept in single precision:
 * Newton's method mends the rest in one step.
 */
export class Seeds {
  private readonly states: Float32Array;
  private readonly known: Uint8Array;

  constructor(
    private readonly nx: number,
    private readonly ny: number,
    private readonly n: number,
  ) {
    this.states = new Float32Array(nx * ny * n);
    this.known = new Uint8Array(nx * ny);
  }

  /** Keeps the equilibrium of a cell: n values of `states` from an index on. */
  keep(ix: number, iy: number, states: Float64Array, at: number): void {
    const cell = iy * this.nx + ix;
    for (let i = 0; i < this.n; i += 1) this.states[cell * this.n + i] = states[at + i];
    this.known[cell] = 1;
  }

  /**
   * Writes the best start for a cell, from its neighbours at a distance, to n values of `out` from an index
   * on: the mean of the first opposite pair on one branch, else the first neighbour there is. Allocates
   * nothing. Tells whether neighbours lie on other branches, which `others` then lists.
   */
  best(ix: number, iy: number, distance: number, out: Float64Array, at: number): SeedKind {
    const { n, states } = this;
    let begun = false;
    let paired = false;
    for (let k = 0; k < PAIRS.length && !paired; k += 2) {
      const a = this.cellAt(ix - PAIRS[k] * distance, iy - PAIRS[k + 1] * distance);
      const b = this.cellAt(ix + PAIRS[k] * distance, iy + PAIRS[k + 1] * distance);
      if (a >= 0 && b >= 0 && this.alike(states, a * n, states, b * n)) {
        for (let i = 0; i < n; i += 1) out[at + i] = (states[a * n + i] + states[b * n + i]) / 2;
        paired = true;
        begun = true;
      } else if (!begun && (a >= 0 || b >= 0)) {
        const one = a >= 0 ? a : b;
        for (let i = 0; i < n; i += 1) out[at + i] = states[one * n + i];
        begun = true;
      }
    }
    if (!begun) return 'none';
    for (let k = 0; k < NEIGHBOURS; k += 1) {
      const cell = this.neighbour(ix, iy, distance, k);
      if (cell >= 0 && !this.alike(states, cell * n, out, at)) return 'several branches';
    }
    return 'one branch';
  }

  /** Starts from neighbours on other branches than a state. */
  others(ix: number, iy: number, distance: number, state: Float64Array): Float64Array[] {
    const { n } = this;
    const starts = [state];
    for (let k = 0; k < NEIGHBOURS; k += 1) {
      const cell = this.neighbour(ix, iy, distance, k);
      if (cell < 0 || starts.some((known) => this.alike(this.states, cell * n, known, 0))) continue;
      starts.push(Float64Array.from(this.states.subarray(cell * n, (cell + 1) * n)));
    }
    return starts.slice(1);
  }

  /** The k-th of the eight neighbours; -1 where there is none with an equilibrium. */
  private neighbour(ix: number, iy: number, distance: number, k: number): number {
    const pair = k & 6;
    const step = k % 2 === 0 ? -distance : distance;
    return this.cellAt(ix + PAIRS[pair] * step, iy + PAIRS[pair + 1] * step);
  }

  private cellAt(ix: number, iy: number): number {
    if (ix < 0 || iy < 0 || ix >= this.nx || iy >= this.ny) return -1;
    const cell = iy * this.nx + ix;
    return this.known[cell] === 1 ? cell : -1;
  }

  private alike(a: Float32Array, atA: number, b: Float32Array | Float64Array, atB: number): boolean {
    for (let i = 0; i < this.n; i += 1) {
      const x = a[atA + i];
      const y = b[atB + i];
      if (Math.abs(x - y) > SAME_BRANCH * Math.max(Math.abs(x), Math.abs(y))) return false;
    }
    return true;
  }
}
