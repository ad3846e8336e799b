import {
  addTree,
  childrenOf,
  ExpressionGraph,
  nearestSymbol,
  parseFormula,
  symbolsOf,
  type FormulaFailure,
  type FormulaNode,
  type NodeId,
  type ParseResult,
} from '../expression/index';
import { listClasses } from '../schema/document-symbols';
import type { PresetDocument } from '../schema/preset';
import { SPREAD_KEY, traitDialKey, traitEntrySymbol } from '../schema/symbols';
import type { Diagnostic, StatePopulation } from './contract';
import { spreadGroups, spreadNodes, type SpreadGroup } from './spread';

/** A process on the graph: its rate, and what one event does to each state. */
export interface ProcessNodes {
  readonly index: number;
  readonly rate: NodeId;
  readonly effects: readonly { readonly state: number; readonly amount: NodeId }[];
}

/** Expressions of a flow du/dt = f: those of the split model, or those of its pooled twin. */
export interface FlowSource {
  readonly graph: ExpressionGraph;
  readonly stateSymbols: readonly string[];
  readonly populations: readonly StatePopulation[];
  readonly nonnegative: readonly boolean[];
  /** Start values, for the size of sample states. */
  readonly starts: Float64Array;
  /** Node of every symbol that formulas can read. */
  readonly symbols: ReadonlyMap<string, NodeId>;
  readonly equations: readonly NodeId[];
  /** Constants of motion entered with the document. */
  readonly givenConstants: readonly string[];
}

/** A document as expressions: the common source of equations, events, checks and the pooled twin. */
export interface ModelGraph extends FlowSource {
  readonly document: PresetDocument;
  readonly parameterKeys: readonly string[];
  readonly defaults: Float64Array;
  /** Index into parameterKeys of the common spread dial. */
  readonly spreadIndex: number;
  readonly groups: readonly SpreadGroup[];
  /** dN_i/dt = sum over processes of effect_i * rate. */
  readonly processes: readonly ProcessNodes[];
}

export interface GraphResult {
  /** Null where an error keeps the model from being built. */
  readonly model: ModelGraph | null;
  readonly errors: readonly Diagnostic[];
}

/** Keys of p in order: parameters, trait values, the dial of each trait that can be pooled, the common dial. */
export function parameterKeysOf(
  document: PresetDocument,
  groups: readonly SpreadGroup[],
): { readonly keys: readonly string[]; readonly defaults: Float64Array } {
  const pooled = document.traits.filter((_, index) => groups.some((group) => group.trait === index));
  const entries = document.traits.flatMap((trait) =>
    trait.entries.map((entry) => [traitEntrySymbol(trait.symbol, entry.of), entry.value] as const),
  );
  const all: readonly (readonly [string, number])[] = [
    ...document.parameters.map((parameter) => [parameter.symbol, parameter.value] as const),
    ...entries,
    ...pooled.map((trait) => [traitDialKey(trait.symbol), trait.dial] as const),
    [SPREAD_KEY, document.spread],
  ];
  return { keys: all.map(([key]) => key), defaults: Float64Array.from(all, ([, value]) => value) };
}

/** Builds the expressions of a document, collecting every formula's error with its place. */
export function buildModelGraph(document: PresetDocument): GraphResult {
  return new Builder(document).build();
}

/** Recently read formulas: an edit changes one formula and the others need no reading again. */
const parsed = new Map<string, ParseResult>();
const PARSED_LIMIT = 2_000;

export function parseCached(text: string): ParseResult {
  const known = parsed.get(text);
  if (known !== undefined) return known;
  const result = parseFormula(text);
  if (parsed.size >= PARSED_LIMIT) parsed.clear();
  parsed.set(text, result);
  return result;
}

class Builder {
  private readonly graph = new ExpressionGraph();
  private readonly nodes = new Map<string, NodeId>();
  private readonly errors: Diagnostic[] = [];
  private readonly inProgress: string[] = [];
  private readonly stateIndex = new Map<string, number>();

  constructor(private readonly document: PresetDocument) {}

  build(): GraphResult {
    const { document, graph } = this;
    const classes = listClasses(document);
    classes.forEach((entry, i) => {
      this.stateIndex.set(entry.class.symbol, i);
      this.nodes.set(entry.class.symbol, graph.state(i));
    });
    const populations = document.populations.map((population) => ({
      symbol: population.symbol,
      name: population.name,
      states: population.classes.map((entry) => this.stateIndex.get(entry.symbol) ?? 0),
    }));
    for (const population of populations) {
      if (!this.nodes.has(population.symbol)) {
        this.nodes.set(population.symbol, graph.sum(population.states.map((i) => graph.state(i))));
      }
    }
    const groups = spreadGroups(document);
    const { keys, defaults } = parameterKeysOf(document, groups);
    this.addParameters(keys, groups);
    document.intermediates.forEach((entry) => this.intermediate(entry.symbol));
    const processes = document.processes.map((_, index) => this.process(index));
    const equations = classes.map((_, i) => this.equation(processes, i));
    if (graph.full) this.errors.push(tooLarge(graph.capacity));
    if (this.errors.length > 0) return { model: null, errors: this.errors };
    const model: ModelGraph = {
      document,
      graph,
      stateSymbols: classes.map((entry) => entry.class.symbol),
      populations,
      nonnegative: classes.map((entry) => entry.population.sign === 'nonnegative'),
      parameterKeys: keys,
      defaults,
      spreadIndex: keys.length - 1,
      groups,
      symbols: this.nodes,
      processes,
      equations,
      starts: Float64Array.from(classes, (entry) => entry.class.start),
      givenConstants: document.constantsOfMotion,
    };
    return { model, errors: [] };
  }

  private addParameters(keys: readonly string[], groups: readonly SpreadGroup[]): void {
    const { document, graph } = this;
    const at = new Map(keys.map((key, k) => [key, graph.parameter(k)]));
    for (const parameter of document.parameters) this.define(parameter.symbol, at.get(parameter.symbol));
    const inForce = new Map<string, NodeId>();
    for (const group of groups) {
      const trait = document.traits[group.trait];
      if (trait === undefined) continue;
      const symbols = group.entries.map((k) => traitEntrySymbol(trait.symbol, trait.entries[k]?.of ?? []));
      const own = at.get(traitDialKey(trait.symbol)) ?? graph.constant(1);
      const common = at.get(SPREAD_KEY) ?? graph.constant(1);
      const s = trait.followsSpread ? graph.multiply(own, common) : own;
      const entered = symbols.map((symbol) => at.get(symbol) ?? graph.constant(Number.NaN));
      const values = spreadNodes(graph, trait.mean, entered, group.weights, s);
      symbols.forEach((symbol, i) => inForce.set(symbol, values[i] ?? 0));
    }
    for (const trait of document.traits) {
      for (const entry of trait.entries) {
        const symbol = traitEntrySymbol(trait.symbol, entry.of);
        this.define(symbol, inForce.get(symbol) ?? at.get(symbol));
      }
    }
  }

  private define(symbol: string, node: NodeId | undefined): void {
    if (node !== undefined && !this.nodes.has(symbol)) this.nodes.set(symbol, node);
  }

  /** Node of an intermediate formula, built when first needed; null where it goes round in a circle. */
  private intermediate(symbol: string): NodeId | null {
    const known = this.nodes.get(symbol);
    if (known !== undefined) return known;
    const index = this.document.intermediates.findIndex((entry) => entry.symbol === symbol);
    const entry = this.document.intermediates[index];
    if (entry === undefined) return null;
    const start = this.inProgress.indexOf(symbol);
    const path = ['intermediates', index, 'formula'];
    if (start >= 0) {
      const circle = [...this.inProgress.slice(start), symbol].join(' -> ');
      this.errors.push(
        failed(path, `This formula needs itself: ${circle}. Write one of them without the others.`),
      );
      return this.nodes.get(symbol) ?? this.poison(symbol);
    }
    this.inProgress.push(symbol);
    const node = this.formula(entry.formula, path);
    this.inProgress.pop();
    if (!this.nodes.has(symbol)) this.nodes.set(symbol, node);
    return this.nodes.get(symbol) ?? node;
  }

  private poison(symbol: string): NodeId {
    const node = this.graph.constant(Number.NaN);
    this.nodes.set(symbol, node);
    return node;
  }

  private process(index: number): ProcessNodes {
    const process = this.document.processes[index];
    if (process === undefined) return { index, rate: this.graph.constant(0), effects: [] };
    const rate = this.formula(process.rate, ['processes', index, 'rate']);
    const effects = process.effects.flatMap((effect, k) => {
      const state = this.stateIndex.get(effect.class);
      if (state === undefined) {
        this.errors.push(this.unknownClass(effect.class, ['processes', index, 'effects', k, 'class']));
        return [];
      }
      return [{ state, amount: this.formula(effect.amount, ['processes', index, 'effects', k, 'amount']) }];
    });
    return { index, rate, effects };
  }

  private equation(processes: readonly ProcessNodes[], state: number): NodeId {
    let total = this.graph.constant(0);
    for (const process of processes) {
      for (const effect of process.effects) {
        if (effect.state !== state) continue;
        total = this.graph.add(total, this.graph.multiply(effect.amount, process.rate));
      }
    }
    return total;
  }

  /** Adds a formula, or an error at its place and not-a-number in its stead. */
  private formula(text: string, path: Diagnostic['path']): NodeId {
    const result = parseCached(text);
    if (!result.ok) {
      this.errors.push(ofFailure(path, result.failure));
      return this.graph.constant(Number.NaN);
    }
    for (const name of symbolsOf(result.tree)) this.intermediate(name);
    const added = addTree(this.graph, result.tree, (name) => this.nodes.get(name) ?? null);
    if (added.ok) return added.node;
    if (!this.graph.full) this.reportUnknown(result.tree, path);
    return this.graph.constant(Number.NaN);
  }

  private reportUnknown(tree: FormulaNode, path: Diagnostic['path']): void {
    const seen = new Set<string>();
    const walk = (node: FormulaNode): void => {
      if (node.kind === 'symbol') {
        if (node.name === 't' || this.nodes.has(node.name) || seen.has(node.name)) return;
        seen.add(node.name);
        const near = nearestSymbol(node.name, this.nodes.keys());
        const trait = this.document.traits.some((one) => one.symbol === node.name);
        const message = trait
          ? `${node.name} is a trait; formulas read its value for a class, such as ${node.name}_${this.document.populations[0]?.classes[0]?.symbol ?? 'class'}.`
          : near === null
            ? `The symbol ${node.name} is unknown; add a parameter or an intermediate formula of this name, or correct it.`
            : `The symbol ${node.name} is unknown; ${near} may be meant.`;
        this.errors.push({
          severity: 'error',
          path,
          range: { from: node.from, to: node.to },
          message,
          suggestion: near,
        });
        return;
      }
      for (const child of childrenOf(node)) walk(child);
    };
    walk(tree);
  }

  private unknownClass(symbol: string, path: Diagnostic['path']): Diagnostic {
    const near = nearestSymbol(symbol, this.stateIndex.keys());
    const hint = near === null ? 'choose an existing class' : `${near} may be meant`;
    return { ...failed(path, `There is no class ${symbol}; ${hint}.`), suggestion: near };
  }
}

function failed(path: Diagnostic['path'], message: string): Diagnostic {
  return { severity: 'error', path, range: null, message, suggestion: null };
}

export function ofFailure(path: Diagnostic['path'], failure: FormulaFailure): Diagnostic {
  return {
    severity: 'error',
    path,
    range: failure.range,
    message: failure.message,
    suggestion: failure.suggestion,
  };
}

function tooLarge(capacity: number): Diagnostic {
  return failed(
    ['processes'],
    `The formulas together have more than ${capacity} parts; make the model smaller.`,
  );
}
