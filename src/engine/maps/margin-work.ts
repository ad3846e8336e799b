import { sameState } from '../equilibria/merge';
import type { CompiledSystem } from '../system/contract';
import { Coexistence } from './coexistence';
import type { MapAxis } from './contract';
import { axisValues, refinementStrides, type LevelRow, type MapSheet } from './map-sheet';
import { marginCells, type MarginCells } from './margin-cells';
import { nativeMarginCells } from './native-margin-cells';
import { Seeds, type SeedKind } from './seeds';

export interface MarginWorkRequest {
  readonly x: MapAxis;
  readonly y: MapAxis;
  /** Indices of the two parameters in p. */
  readonly columns: readonly [number, number];
  /** State to begin searches from. */
  readonly starts: Float64Array;
  readonly box?: readonly ({ readonly from: number; readonly to: number } | null)[];
  /** What solves many cells at once; the compiled core, or plain code where there is none, unless given. */
  readonly cells?: MarginCells;
}

export const MARGIN_WORK_DEFAULTS = {
  /** Of the first cells every so many are searched even where a neighbour's equilibrium arrives. */
  searchEvery: 4,
  /** Cells solved together. */
  cellsPerSlice: 512,
} as const;

/** Neighbours of a first cell that can have been computed before it: beside it, and in the row before. */
const BEFORE = [
  [-1, 0],
  [1, 0],
  [-1, -1],
  [0, -1],
  [1, -1],
] as const;

/** Solves rows of cells and keeps what later cells begin from. */
export class MarginWork {
  private readonly cells: MarginCells;
  private readonly coexistence: Coexistence;
  private readonly seeds: Seeds;
  private readonly xs: Float64Array;
  private readonly ys: Float64Array;
  private readonly n: number;
  private readonly one = new Float64Array(1);
  /** Buffers of one slice of a row. */
  private readonly states: Float64Array;
  private readonly margins = new Float64Array(MARGIN_WORK_DEFAULTS.cellsPerSlice);
  private readonly x = new Float64Array(MARGIN_WORK_DEFAULTS.cellsPerSlice);
  private readonly y = new Float64Array(MARGIN_WORK_DEFAULTS.cellsPerSlice);
  private readonly kinds: SeedKind[] = [];
  readonly firstStride: number;
  /** All coexistence equilibria known in each of the first cells. */
  private readonly branches = new Map<number, readonly Float64Array[]>();
  private empty = 0;
  private searched = 0;

  constructor(
    private readonly system: CompiledSystem,
    private readonly p: Float64Array,
    private readonly request: MarginWorkRequest,
    private readonly sheet: MapSheet,
  ) {
    this.n = system.dimension;
    [this.firstStride] = refinementStrides(sheet.nx, sheet.ny);
    this.states = new Float64Array(MARGIN_WORK_DEFAULTS.cellsPerSlice * this.n);
    this.cells =
      request.cells ??
      (system.native
        ? nativeMarginCells(system, system.native, p, request.columns)
        : marginCells(system, p, request.columns));
    system.setParameters(p);
    this.coexistence = new Coexistence(system, [request.starts], request.box);
    this.seeds = new Seeds(sheet.nx, sheet.ny, this.n);
    this.xs = axisValues(request.x);
    this.ys = axisValues(request.y);
  }

  isFirst(row: LevelRow): boolean {
    return row.stride === this.firstStride;
  }

  /** Solves the cells of a row together from their best starts, then those by themselves where that is not all. */
  solve(row: LevelRow): void {
    const { n, seeds, sheet, states, margins, x, y } = this;
    const { iy, stride, columns } = row;
    const first = this.isFirst(row);
    for (let k = 0; k < columns.length; k += 1) {
      this.kinds[k] = seeds.best(columns[k], iy, stride, states, k * n);
      if (this.kinds[k] === 'none') states.fill(Number.NaN, k * n, (k + 1) * n);
      x[k] = this.xs[columns[k]];
      y[k] = this.ys[iy];
    }
    this.cells.solve(columns.length, x, y, states, margins);
    for (let k = 0; k < columns.length; k += 1) {
      const plain = this.kinds[k] === 'one branch' && !Number.isNaN(margins[k]) && !first;
      if (plain && this.coexistence.has(states, k * n)) {
        seeds.keep(columns[k], iy, states, k * n);
        sheet.set(columns[k], iy, stride, margins[k]);
      } else this.solveAlone(row, k);
    }
  }

  /** A cell whose neighbours disagree, or from which Newton's method did not arrive, or one of the first. */
  private solveAlone(row: LevelRow, k: number): void {
    const { n, seeds } = this;
    const ix = row.columns[k];
    const best = new BestOf(this.coexistence);
    const state = this.states.slice(k * n, (k + 1) * n);
    best.offer(this.margins[k], state);
    if (this.kinds[k] === 'several branches')
      for (const start of seeds.others(ix, row.iy, row.stride, state)) this.offer(best, start, ix, row.iy);
    if (this.isFirst(row)) this.searchHere(best, ix, row);
    if (best.state === null && this.kinds[k] !== 'none') this.followHere(best, ix, row);
    if (best.state === null && this.isBesideCoexistence(ix, row)) this.seek(best, ix, row.iy);
    const kept = best.state ?? best.infeasible;
    if (kept) seeds.keep(ix, row.iy, kept, 0);
    if (best.state === null) this.empty += 1;
    this.sheet.set(ix, row.iy, row.stride, best.margin);
  }

  message(): string {
    const { sheet, empty } = this;
    const found =
      'Where several populations can rest together in several ways, the margin is that of the most stable.';
    if (empty === 0) return `Every cell has a coexistence equilibrium. ${found}`;
    if (empty === sheet.cells)
      return `No coexistence equilibrium was found in any cell, from ${this.searched} searches; no search is a proof that there is none.`;
    const share = Number(((100 * empty) / sheet.cells).toPrecision(2));
    return `No coexistence equilibrium was found in ${share} % of the cells. ${found}`;
  }

  /** Follows every branch of the neighbours to one of the first cells; a search at some, and where none arrives. */
  private searchHere(best: BestOf, ix: number, { iy, stride }: LevelRow): void {
    const { nx } = this.sheet;
    for (const [dx, dy] of BEFORE) {
      const cell = (iy + dy * stride) * nx + ix + dx * stride;
      for (const state of this.branches.get(cell) ?? []) this.offer(best, state, ix, iy);
    }
    const sparse = stride * MARGIN_WORK_DEFAULTS.searchEvery;
    if (best.state === null || (ix % sparse === 0 && iy % sparse === 0)) {
      this.seek(best, ix, iy);
    }
    this.branches.set(iy * nx + ix, best.all);
  }

  /** Whether a neighbour has a coexistence equilibrium: then one that is not found here is worth a search. */
  private isBesideCoexistence(ix: number, { iy, stride }: LevelRow): boolean {
    // Like no state there can be, so that every neighbour is another.
    const nowhere = new Float64Array(this.n).fill(-Number.MAX_VALUE / 2);
    return this.seeds.others(ix, iy, stride, nowhere).some((state) => this.coexistence.has(state, 0));
  }

  private seek(best: BestOf, ix: number, iy: number): void {
    this.setParameters(ix, iy);
    this.searched += 1;
    for (const state of this.coexistence.search()) this.offer(best, state, ix, iy);
  }

  private followHere(best: BestOf, ix: number, { iy, stride }: LevelRow): void {
    const start = new Float64Array(this.n);
    this.seeds.best(ix, iy, stride, start, 0);
    // Among states that are none of a community already, an infeasible answer is as good as another.
    if (best.infeasible !== null && !this.coexistence.has(start, 0)) return;
    this.setParameters(ix, iy);
    const state = this.coexistence.follow(start);
    if (state) this.offer(best, state, ix, iy);
  }

  private offer(best: BestOf, start: Float64Array, ix: number, iy: number): void {
    const state = start.slice();
    this.cells.solve(1, this.xs.subarray(ix, ix + 1), this.ys.subarray(iy, iy + 1), state, this.one);
    best.offer(this.one[0], state);
  }

  private setParameters(ix: number, iy: number): void {
    this.p[this.request.columns[0]] = this.xs[ix];
    this.p[this.request.columns[1]] = this.ys[iy];
    this.system.setParameters(this.p);
  }
}

/** The equilibrium with the largest margin among those offered for one cell. */
class BestOf {
  margin = Number.NaN;
  state: Float64Array | null = null;
  /** One that is not feasible: no answer, but a start for cells where it may be. */
  infeasible: Float64Array | null = null;

  /** All different ones. */
  readonly all: Float64Array[] = [];

  constructor(private readonly coexistence: Coexistence) {}

  offer(margin: number, state: Float64Array): void {
    if (Number.isNaN(margin) || this.coexistence.lacks(state, 0)) return;
    if (!this.coexistence.has(state, 0)) {
      this.infeasible ??= state;
      return;
    }
    if (!this.all.some((known) => sameState(known, state, this.coexistence.scale, 0))) this.all.push(state);
    if (this.state === null || margin > this.margin) {
      this.margin = margin;
      this.state = state;
    }
  }
}
