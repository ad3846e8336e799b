import type { PresetDocument } from '../schema/preset';
import { SPREAD_KEY } from '../schema/symbols';
import { compileSystem, type CompileOptions } from './compile-system';
import type { CompiledSystem, Diagnostic, ModelReport } from './contract';
import { checkDefinition } from './diagnostics';
import { describeModel } from './describe-model';
import { buildModelGraph, type ModelGraph } from './model-graph';
import { makePooledTwin, type PooledTwin } from './pooled-twin';

/** A document ready to be computed with: the split model, its pooled twin, and how they correspond. */
export interface CompiledModel {
  readonly document: PresetDocument;
  /** The split model, states in the order of the classes. */
  readonly system: CompiledSystem;
  readonly twin: PooledTwin;
  /** The expressions that both were compiled from. */
  readonly source: ModelGraph;
  /** Start values of the document, in the order of the state. */
  readonly starts: Float64Array;
  /** Everything shown of the model besides its solutions; worked out when first asked for. */
  readonly report: ModelReport;
  /** Start of the twin from start values of the split model: totals, or totals shared out by the weights. */
  toTwinStarts(starts: ArrayLike<number>): Float64Array;
  /** State of the split model that a state of the twin stands for, composed by the weights. */
  fromTwinState(state: ArrayLike<number>): Float64Array;
  /** Index of a key in p; `spread` also means the common dial unless the document uses that name. -1 if unknown. */
  parameterIndex(key: string): number;
  /** The document's parameters with some values replaced by key; unknown keys are left out of account. */
  valuesToParameters(values: Readonly<Record<string, number>>): Float64Array;
}

export type CompileResult =
  | { readonly ok: true; readonly model: CompiledModel }
  | { readonly ok: false; readonly diagnostics: readonly Diagnostic[] };

/**
 * Compiles a document. Refuses one whose formulas cannot be built or whose parts contradict each
 * other, with every error at its place.
 */
export function compileModel(document: PresetDocument, options: CompileOptions = {}): CompileResult {
  const built = buildModelGraph(document);
  const diagnostics = checkDefinition(document, built);
  const errors = diagnostics.filter((one) => one.severity === 'error');
  if (built.model === null || errors.length > 0) return { ok: false, diagnostics };
  return { ok: true, model: new Model(document, built.model, diagnostics, options) };
}

class Model implements CompiledModel {
  readonly system: CompiledSystem;
  readonly twin: PooledTwin;
  readonly starts: Float64Array;
  private readonly index: ReadonlyMap<string, number>;
  private described: ModelReport | null = null;

  constructor(
    readonly document: PresetDocument,
    readonly source: ModelGraph,
    private readonly diagnostics: readonly Diagnostic[],
    options: CompileOptions,
  ) {
    this.system = compileSystem(source, options);
    this.twin = makePooledTwin(source, options);
    this.starts = Float64Array.from(source.starts);
    this.index = new Map(source.parameterKeys.map((key, k) => [key, k]));
  }

  get report(): ModelReport {
    this.described ??= describeModel(this.source, this.system, this.twin.report, this.diagnostics);
    return this.described;
  }

  toTwinStarts(starts: ArrayLike<number>): Float64Array {
    const { twin } = this;
    const totals = this.source.populations.map((one) =>
      one.states.reduce((sum, i) => sum + (starts[i] ?? 0), 0),
    );
    if (twin.report.kind === 'lumped') return Float64Array.from(totals);
    return this.shareOut(totals);
  }

  fromTwinState(state: ArrayLike<number>): Float64Array {
    if (this.twin.report.kind !== 'lumped') return Float64Array.from(state);
    return this.shareOut(Array.from(state));
  }

  parameterIndex(key: string): number {
    const own = this.index.get(key);
    if (own !== undefined) return own;
    return key === 'spread' ? (this.index.get(SPREAD_KEY) ?? -1) : -1;
  }

  valuesToParameters(values: Readonly<Record<string, number>>): Float64Array {
    const p = Float64Array.from(this.source.defaults);
    for (const [key, value] of Object.entries(values)) {
      const k = this.parameterIndex(key);
      if (k >= 0) p[k] = value;
    }
    return p;
  }

  private shareOut(totals: readonly number[]): Float64Array {
    const out = new Float64Array(this.source.stateSymbols.length);
    this.source.populations.forEach((population, k) => {
      const lone = population.states.length === 1;
      for (const i of population.states) {
        const weight = lone ? 1 : (this.twin.weights[i] ?? 0);
        out[i] = weight * (totals[k] ?? 0);
      }
    });
    return out;
  }
}
