import type { CompiledSystem } from '../system/contract';

/** What all curves of one run share: the system, two parameters with their ranges, and the scales of the states. */
export class BoundaryScope {
  readonly n: number;
  readonly firstScale: number;
  readonly secondScale: number;
  /** Evaluated last by `load`. */
  readonly u: Float64Array;
  readonly f: Float64Array;
  readonly J: Float64Array;
  private readonly parameters: Float64Array;

  constructor(
    readonly system: CompiledSystem,
    p: Float64Array,
    readonly firstIndex: number,
    readonly firstRange: readonly [number, number],
    readonly secondIndex: number,
    readonly secondRange: readonly [number, number],
    readonly stateScale: Float64Array,
  ) {
    this.n = system.dimension;
    this.firstScale = Math.abs(firstRange[1] - firstRange[0]);
    this.secondScale = Math.abs(secondRange[1] - secondRange[0]);
    this.parameters = Float64Array.from(p);
    this.u = new Float64Array(this.n);
    this.f = new Float64Array(this.n);
    this.J = new Float64Array(this.n * this.n);
  }

  setParameters(first: number, second: number): void {
    this.parameters[this.firstIndex] = first;
    this.parameters[this.secondIndex] = second;
    this.system.setParameters(this.parameters);
  }

  /** Parameters, f and its Jacobian at a state (n); false where they are not finite. */
  load(first: number, second: number, u: Float64Array): boolean {
    this.setParameters(first, second);
    this.u.set(u);
    this.system.rhs(0, this.u, this.f);
    this.system.jacobian(0, this.u, this.J);
    return this.f.every(Number.isFinite) && this.J.every(Number.isFinite);
  }

  isInside(first: number, second: number, slack = 1e-12): boolean {
    const within = (value: number, [a, b]: readonly [number, number], scale: number): boolean =>
      value >= Math.min(a, b) - slack * scale && value <= Math.max(a, b) + slack * scale;
    return (
      within(first, this.firstRange, this.firstScale) && within(second, this.secondRange, this.secondScale)
    );
  }

  isFeasible(u: Float64Array): boolean {
    return this.system.nonnegative.every((needed, i) => !needed || u[i] >= -1e-9 * this.stateScale[i]);
  }
}
