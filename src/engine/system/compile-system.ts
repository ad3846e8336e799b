import {
  compileDirectional,
  compileProgram,
  differentiate,
  differentiateByStates,
  kinksOf,
  type Backend,
  type ExpressionGraph,
  type NodeId,
  type Program,
  type TaylorProgram,
} from '../expression/index';
import type { NativeSystem } from '../core/contract';
import { bindToCore } from '../core/bind-to-core';
import { workspaceFor } from '../core/workspace';
import type { CompiledSystem, StatePopulation } from './contract';
import { commonPeriod, forcingFrequencies } from './forcing-period';

/**
 * What a system is compiled from. State i is `graph.state(i)`, parameter k is `graph.parameter(k)`,
 * time is `graph.time()`. Trait values under the spread dials are ordinary expressions of parameters
 * in the equations: whatever depends on parameters alone is computed once per `setParameters`.
 */
export interface SystemSpec {
  readonly graph: ExpressionGraph;
  /** Right-hand sides, one a state, in the order of `stateSymbols`. */
  readonly equations: readonly NodeId[];
  readonly stateSymbols: readonly string[];
  readonly parameterKeys: readonly string[];
  readonly defaults: ArrayLike<number>;
  readonly nonnegative: readonly boolean[];
  readonly populations: readonly StatePopulation[];
}

export interface CompileOptions {
  /** Defaults to WebAssembly, with closures where the host has none. */
  readonly backend?: Backend;
}

/**
 * Compiles a system: formulas and Jacobian at once, derivatives with respect to a parameter and along
 * directions when first asked for. Derivatives are added to the spec's graph; should they not fit
 * into it, they are computed by Taylor arithmetic along the coordinate directions instead, which is
 * as exact but slower. The system starts with its defaults set.
 * A graph that was already full is a programmer's mistake and throws.
 */
export function compileSystem(spec: SystemSpec, options: CompileOptions = {}): CompiledSystem {
  if (spec.graph.full) throw new Error('The graph is full: refuse the model before compiling it.');
  return new System(spec, options.backend ?? 'wasm');
}

const RHS = 0;
const JACOBIAN = 1;

class System implements CompiledSystem {
  readonly dimension: number;
  readonly stateSymbols: readonly string[];
  readonly parameterKeys: readonly string[];
  readonly defaults: Float64Array;
  readonly nonnegative: readonly boolean[];
  readonly populations: readonly StatePopulation[];
  readonly autonomous: boolean;
  readonly smooth: boolean;
  readonly backend: Backend;
  readonly native?: NativeSystem;
  private readonly program: Program;
  private readonly symbolicJacobian: boolean;
  private readonly byParameter = new Map<number, (t: number, u: Float64Array, out: Float64Array) => void>();
  /** Programs compiled on demand, told of every change of parameters. */
  private readonly followers: { prepare(p: Float64Array): void }[] = [];
  private taylor: TaylorProgram | null = null;
  private readonly p: Float64Array;
  private frequencies: (() => number | null) | null = null;

  constructor(
    private readonly spec: SystemSpec,
    private readonly wanted: Backend,
  ) {
    const { graph, equations } = spec;
    this.dimension = equations.length;
    this.stateSymbols = spec.stateSymbols;
    this.parameterKeys = spec.parameterKeys;
    this.defaults = Float64Array.from(spec.defaults);
    this.nonnegative = spec.nonnegative;
    this.populations = spec.populations;
    this.autonomous = !equations.some((node) => graph.dependsOnTime(node));
    this.smooth = kinksOf(graph, equations).length === 0;
    const jacobian = differentiateByStates(graph, equations, this.dimension);
    this.symbolicJacobian = !graph.full;
    graph.forgiveOverflow();
    const groups = this.symbolicJacobian ? [equations, jacobian] : [equations];
    this.program = this.compile(groups, workspaceFor(this.dimension));
    this.backend = this.program.backend;
    const native = bindToCore(this.program);
    if (native) this.native = native;
    this.p = Float64Array.from(this.defaults);
    this.program.prepare(this.p);
  }

  setParameters(p: Float64Array): void {
    for (let k = 0; k < this.p.length; k += 1) this.p[k] = p[k] as number;
    this.program.prepare(this.p);
    for (const follower of this.followers) follower.prepare(this.p);
  }

  rhs(t: number, u: Float64Array, out: Float64Array): void {
    this.program.evaluate(RHS, t, u, out);
  }

  jacobian(t: number, u: Float64Array, out: Float64Array): void {
    if (this.symbolicJacobian) this.program.evaluate(JACOBIAN, t, u, out);
    else this.jacobianByDirections(t, u, out);
  }

  parameterDerivative(t: number, u: Float64Array, k: number, out: Float64Array): void {
    let evaluate = this.byParameter.get(k);
    if (evaluate === undefined) {
      evaluate = this.compileByParameter(k);
      this.byParameter.set(k, evaluate);
    }
    evaluate(t, u, out);
  }

  directional(t: number, u: Float64Array, v: Float64Array, out: Float64Array): void {
    this.alongStates().evaluate(t, u, v, out);
  }

  forcingPeriod(): number | null {
    if (this.autonomous) return null;
    this.frequencies ??= this.compileFrequencies();
    return this.frequencies();
  }

  private compileFrequencies(): () => number | null {
    const { graph, equations } = this.spec;
    const rates = forcingFrequencies(graph, equations);
    if (rates === null || graph.full) {
      graph.forgiveOverflow();
      return () => null;
    }
    const program = this.compile([rates]);
    this.follow(program);
    const out = new Float64Array(rates.length);
    const state = new Float64Array(this.dimension);
    return () => {
      program.evaluate(0, 0, state, out);
      return commonPeriod(out);
    };
  }

  private compile(groups: readonly (readonly NodeId[])[], workspace = 0): Program {
    const { graph, parameterKeys } = this.spec;
    return compileProgram(graph, groups, this.dimension, parameterKeys.length, this.wanted, workspace);
  }

  private alongStates(): TaylorProgram {
    if (this.taylor === null) {
      const { graph, equations, parameterKeys } = this.spec;
      this.taylor = compileDirectional(graph, equations, this.dimension, parameterKeys.length);
      this.follow(this.taylor);
    }
    return this.taylor;
  }

  private follow(program: { prepare(p: Float64Array): void }): void {
    program.prepare(this.p);
    this.followers.push(program);
  }

  private compileByParameter(k: number): (t: number, u: Float64Array, out: Float64Array) => void {
    const { graph, equations } = this.spec;
    const derivative = differentiate(graph, equations, graph.parameter(k));
    if (graph.full) {
      graph.forgiveOverflow();
      return (t, u, out) => this.alongStates().byParameter(t, u, k, out);
    }
    const program = this.compile([derivative]);
    this.follow(program);
    return (t, u, out) => program.evaluate(0, t, u, out);
  }

  private jacobianByDirections(t: number, u: Float64Array, out: Float64Array): void {
    const n = this.dimension;
    const [direction, orders] = [new Float64Array(n), new Float64Array(3 * n)];
    for (let j = 0; j < n; j += 1) {
      direction[j] = 1;
      this.alongStates().evaluate(t, u, direction, orders);
      direction[j] = 0;
      for (let i = 0; i < n; i += 1) out[i * n + j] = orders[i] as number;
    }
  }
}
