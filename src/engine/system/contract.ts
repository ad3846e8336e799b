import type { NativeSystem } from '../core/contract';

/**
 * What the rest of the engine knows of a model: a compiled system of ordinary differential equations
 * du/dt = f(t, u, p). Notation: n state dimension, u state, p parameters, t time,
 * J[i*n+j] = df_i/du_j row-major. All buffers are Float64Array; outputs are owned by the caller.
 */
export interface CompiledSystem {
  /** State dimension n. */
  readonly dimension: number;
  /** Class symbols (population symbols for a lumped twin), in the order of the state. */
  readonly stateSymbols: readonly string[];
  /** Keys of p in order: parameter symbols, trait value symbols, `dial:<trait>`, `dial:spread`. */
  readonly parameterKeys: readonly string[];
  /** Values of p as the document has them; never written to. */
  readonly defaults: Float64Array;
  /** Whether each state must stay >= 0. */
  readonly nonnegative: readonly boolean[];
  /** Groups of state indices that make one population, in the document's order. */
  readonly populations: readonly StatePopulation[];
  /** False where a formula contains the time `t`. */
  readonly autonomous: boolean;
  /** False where min, max, abs or a conditional occurs: normal forms are withheld at kinks. */
  readonly smooth: boolean;
  readonly backend: 'wasm' | 'closure';
  /** The model bound to the compiled core; absent where it is not (closures, other coordinates). */
  readonly native?: NativeSystem;

  /** Sets p for every later call; computes what depends on p alone once. */
  setParameters(p: Float64Array): void;
  /** out[i] = f_i(t, u). Non-finite values are left as they come out. */
  rhs(t: number, u: Float64Array, out: Float64Array): void;
  /** out[i*n+j] = df_i/du_j, exact. */
  jacobian(t: number, u: Float64Array, out: Float64Array): void;
  /** out[i] = df_i/dp_k, exact, k an index into parameterKeys. */
  parameterDerivative(t: number, u: Float64Array, k: number, out: Float64Array): void;
  /**
   * Directional derivatives of f at u along v by truncated Taylor arithmetic:
   * out[(k-1)*n + i] = d^k/ds^k f_i(t, u + s v) at s = 0, for k = 1, 2, 3. Length 3n.
   */
  directional(t: number, u: Float64Array, v: Float64Array, out: Float64Array): void;
  /**
   * Period of the explicit time at the parameters set, in time units: the least common one of all sines and
   * cosines of time. Null for a model without explicit time, and where time enters in another way.
   */
  forcingPeriod(): number | null;
}

export interface StatePopulation {
  readonly symbol: string;
  readonly name: string;
  readonly states: readonly number[];
}

/** A mark on the model, in words, at the place it concerns. */
export interface Diagnostic {
  readonly severity: 'error' | 'warning' | 'note';
  /** Path into the document, e.g. ['processes', 3, 'rate']; the editor marks the field there. */
  readonly path: readonly (string | number)[];
  /** Character range within a formula, where known. */
  readonly range: { readonly from: number; readonly to: number } | null;
  readonly message: string;
  /** Replacement that would mend it, e.g. the nearest known symbol. */
  readonly suggestion: string | null;
}

/** How the community without differences is made; see `pooled-twin.ts`. */
export type TwinKind = 'lumped' | 'unlumped' | 'not-comparable' | 'no-split';

export interface TwinReport {
  readonly kind: TwinKind;
  /** One sentence: what the twin is, or why there is none. */
  readonly reason: string;
  /** Traits whose differences the twin removes, and which mean each holds. */
  readonly pooledTraits: readonly {
    readonly trait: string;
    readonly mean: string;
    readonly coefficientOfVariation: number;
  }[];
  /** Traits left as they are because only some classes of a population have them. */
  readonly leftTraits: readonly string[];
}

export interface SpreadLimit {
  /** `dial:spread` or `dial:<trait>`. */
  readonly key: string;
  readonly from: number;
  readonly to: number;
  /** Why it ends there, e.g. "mortality of males would become negative". */
  readonly fromReason: string;
  readonly toReason: string;
}

/** One number that can be moved: shown in the rail, under a slider, or swept. */
export interface ParameterReport {
  readonly key: string;
  readonly label: string;
  readonly unit: string;
  readonly value: number;
  readonly min: number;
  readonly max: number;
  readonly group: 'parameter' | 'trait' | 'dial';
}

/** Everything the workbench shows of a model besides its solutions. */
export interface ModelReport {
  readonly diagnostics: readonly Diagnostic[];
  /** False when an error keeps it from being compiled; the last valid model stays on screen. */
  readonly valid: boolean;
  readonly autonomous: boolean;
  readonly smooth: boolean;
  readonly deterministicOnly: boolean;
  /** Whether a harvest or control process occurs, so that the caution is due. */
  readonly harvested: boolean;
  readonly parameters: readonly ParameterReport[];
  readonly twin: TwinReport;
  readonly spreadLimits: readonly SpreadLimit[];
  /** TeX of each state's equation, in order, and of each intermediate. */
  readonly equations: readonly { readonly symbol: string; readonly tex: string }[];
  readonly intermediates: readonly { readonly symbol: string; readonly tex: string }[];
  /** Classes, processes and arrows between them, for the process diagram. */
  readonly diagram: ProcessDiagram;
  /** Constants of motion that were proven (given ones that hold, and ones found), as formulas. */
  readonly constantsOfMotion: readonly string[];
  readonly backend: 'wasm' | 'closure' | 'none';
}

export interface ProcessDiagram {
  readonly nodes: readonly { readonly id: string; readonly label: string; readonly population: string }[];
  /** A process: gains and losses of classes, and classes that its rate depends on. */
  readonly arrows: readonly {
    readonly process: string;
    readonly name: string;
    readonly kind: string;
    /** Null: from or to outside the community. */
    readonly from: string | null;
    readonly to: string | null;
    readonly influences: readonly string[];
  }[];
}

/** Sentence due wherever a model with harvest or control is judged or exported. */
export const CAUTION =
  'A model is no permit: before harvesting or controlling a wild population, local regulation and qualified judgement decide.';
