import type { CompiledSystem } from '../system/contract';
import { FadingWatch } from './fading';
import type { TangentFlow } from './tangent-flow';

const RECORD_DEFAULTS = {
  /** Share of its size that a state must vary by to count as moving. */
  flat: 1e-6,
} as const;

/** Growth of displacements and range of the states, recorded at evenly spaced times of a run. */
export class RunRecord {
  readonly times: number[] = [];
  /** Integrals of the growth up to each recorded time, m a record. */
  private readonly sums: number[] = [];
  private readonly divergences: number[] = [];
  private readonly growth: Float64Array;
  private divergence = 0;
  /** Lowest and highest of each state within each record, n a record. */
  private readonly lows: number[] = [];
  private readonly highs: number[] = [];
  private readonly low: Float64Array;
  private readonly high: Float64Array;
  private readonly watch: FadingWatch;

  /** @param m displacements. @param from time at which averaging begins */
  constructor(
    private readonly system: CompiledSystem,
    readonly m: number,
    readonly from: number,
  ) {
    const n = system.dimension;
    this.watch = new FadingWatch(system.nonnegative);
    this.growth = new Float64Array(m);
    this.low = new Float64Array(n).fill(Infinity);
    this.high = new Float64Array(n).fill(-Infinity);
  }

  /** Looks at the state alone, before averaging begins. */
  look(flow: TangentFlow): void {
    this.watch.note(flow.state);
  }

  /** Adds the stretch that a flow has just gone. */
  add(flow: TangentFlow): void {
    for (let j = 0; j < this.m; j += 1) this.growth[j] += flow.logs[j];
    this.divergence += flow.divergence;
    this.look(flow);
    for (let i = 0; i < this.system.dimension; i += 1) {
      this.low[i] = Math.min(this.low[i], flow.state[i]);
      this.high[i] = Math.max(this.high[i], flow.state[i]);
    }
  }

  close(time: number): void {
    this.times.push(time);
    this.sums.push(...this.growth);
    this.divergences.push(this.divergence);
    this.lows.push(...this.low);
    this.highs.push(...this.high);
    this.low.fill(Infinity);
    this.high.fill(-Infinity);
  }

  /** Integral of the growth of displacement j at each recorded time. */
  integrals(j: number): Float64Array {
    return Float64Array.from(this.times, (_, k) => this.sums[k * this.m + j]);
  }

  /** Mean growth of displacement j; NaN before the first record. */
  mean(j: number): number {
    const last = this.times.length - 1;
    return last < 0 ? Number.NaN : this.sums[last * this.m + j] / (this.times[last] - this.from);
  }

  meanDivergence(): number {
    const last = this.times.length - 1;
    return this.divergences[last] / (this.times[last] - this.from);
  }

  /** Running means, running[k*m + i] for the displacements in an order. */
  running(order: readonly number[]): Float64Array {
    const { m, times, from } = this;
    const out = new Float64Array(times.length * m);
    times.forEach((time, k) => {
      order.forEach((j, at) => {
        out[k * m + at] = this.sums[k * m + j] / (time - from);
      });
    });
    return out;
  }

  /** Whether any state varied in the last half of the records, those left out that only decline. */
  moves(): boolean {
    const count = this.times.length;
    const from = Math.floor(count / 2);
    return this.extremes(from, count).some(({ low, high }, i) => {
      const flat = high - low <= RECORD_DEFAULTS.flat * Math.max(Math.abs(low), Math.abs(high));
      return !flat && !this.onlyDeclines(i, from);
    });
  }

  /** Symbols of states that reach lower and lower while they come back every time. */
  fading(): string[] {
    return this.watch.fading().map((i) => this.system.stateSymbols[i]);
  }

  private onlyDeclines(i: number, from: number): boolean {
    const n = this.system.dimension;
    if (!this.system.nonnegative[i]) return false;
    for (let k = from + 1; k < this.times.length; k += 1)
      if (this.highs[k * n + i] > this.lows[(k - 1) * n + i]) return false;
    return true;
  }

  private extremes(from: number, to: number): { low: number; high: number }[] {
    const n = this.system.dimension;
    return Array.from({ length: n }, (_, i) => {
      let low = Infinity;
      let high = -Infinity;
      for (let k = from; k < to; k += 1) {
        low = Math.min(low, this.lows[k * n + i]);
        high = Math.max(high, this.highs[k * n + i]);
      }
      return { low, high };
    });
  }
}
