import { listSymbols, freeSymbol } from '../document-symbols';
import { freeProcessId } from '../process-groups';
import type {
  Parameter,
  Population,
  PresetDocument,
  Process,
  ProcessKind,
  TemplateName,
  Trait,
} from '../preset';
import { isSymbol, traitEntrySymbol } from '../symbols';
import type { TemplateProblem } from './contract';
import { factor } from './wording';

type NewParameter = Pick<Parameter, 'name' | 'value' | 'min' | 'max' | 'unit' | 'meaning'>;
type NewTrait = Pick<Trait, 'name' | 'unit' | 'meaning' | 'role' | 'per' | 'domain' | 'followsSpread'>;

/** What a template is writing: a document that grows, the settings as completed, and refusals. */
export class TemplateDraft {
  readonly problems: TemplateProblem[] = [];
  private seasonal = '';

  constructor(
    public document: PresetDocument,
    private readonly template: TemplateName,
    readonly group: string,
    /** As given; symbols left empty are filled in as they are chosen. */
    readonly settings: Record<string, unknown>,
    /** Where the next process goes: in the place of those it replaces, or at the end. */
    private place: number = document.processes.length,
  ) {}

  refuse(field: string, message: string): void {
    this.problems.push({ field, message });
  }

  /** The population called so, or null with a refusal. */
  population(field: string, symbol: string): Population | null {
    const found = this.document.populations.find((entry) => entry.symbol === symbol) ?? null;
    if (found === null) {
      this.refuse(field, symbol === '' ? 'Choose a population.' : `There is no population called ${symbol}.`);
    }
    return found;
  }

  /** The chosen classes of a population in its order, all of them where none are chosen. */
  classes(field: string, population: Population, chosen: readonly string[]): readonly string[] {
    const all = population.classes.map((entry) => entry.symbol);
    const strange = chosen.find((symbol) => !all.includes(symbol));
    if (strange !== undefined) {
      this.refuse(field, `${strange} is no class of ${population.name || population.symbol}.`);
    }
    return chosen.length === 0 ? all : all.filter((symbol) => chosen.includes(symbol));
  }

  /** Symbol of a parameter: an existing one, or a new one added to the document. */
  parameter(field: string, suggestion: string, defaults: NewParameter, shared = false): string {
    const asked = this.asked(field);
    const wanted = asked === '' && shared ? suggestion : asked;
    const exists = this.document.parameters.some((entry) => entry.symbol === wanted);
    if (exists) return this.settle(field, wanted);
    if (asked !== '' && !this.mayCreate(field, asked)) return asked;
    const symbol = asked === '' ? freeSymbol(this.document, suggestion) : asked;
    const parameter: Parameter = { ...defaults, symbol, standardError: null, source: '' };
    this.document = { ...this.document, parameters: [...this.document.parameters, parameter] };
    return this.settle(field, symbol);
  }

  /**
   * Reader of a trait's values by class (or pair of classes): an existing trait, completed where values
   * are missing, or a new one. Unasked, a trait of the same role and suggested name is shared.
   */
  trait(
    field: string,
    suggestion: string,
    defaults: NewTrait,
    of: readonly (readonly string[])[],
    value: (of: readonly string[]) => number,
  ): (...of: readonly string[]) => string {
    const symbol = this.traitSymbol(field, suggestion, defaults, of);
    const before: Trait = this.document.traits.find((entry) => entry.symbol === symbol) ?? {
      ...defaults,
      symbol,
      mean: 'arithmetic',
      dial: 1,
      entries: [],
    };
    const missing = of.filter((one) => !before.entries.some((entry) => sameClasses(entry.of, one)));
    const entries = missing.map((one) => ({
      of: [...one],
      value: value(one),
      standardError: null,
      source: '',
      survival: null,
    }));
    const trait = { ...before, entries: [...before.entries, ...entries] };
    const known = this.document.traits.some((entry) => entry.symbol === symbol);
    this.document = {
      ...this.document,
      traits: known
        ? this.document.traits.map((entry) => (entry.symbol === symbol ? trait : entry))
        : [...this.document.traits, trait],
    };
    this.settle(field, symbol);
    return (...classes) => traitEntrySymbol(symbol, classes);
  }

  /** Symbol of an intermediate formula, added or written anew. */
  intermediate(suggestion: string, formula: string, meaning: string): string {
    const symbol = freeSymbol(this.document, suggestion);
    const entry = { symbol, formula, unit: '', meaning };
    this.document = { ...this.document, intermediates: [...this.document.intermediates, entry] };
    return symbol;
  }

  /** From here on every rate is multiplied by a yearly course: 1 + strength*cos(2 pi (t - peak)/period). */
  season(on: boolean): void {
    if (!on) return;
    const unit = this.document.timeUnit;
    const strength = this.parameter(
      'seasonStrength',
      'season_strength',
      {
        name: 'Strength of season',
        value: 0.3,
        min: 0,
        max: 1,
        unit: '',
        meaning: 'Relative rise of the rate at its peak; at 1 the rate falls to zero in the low season.',
      },
      true,
    );
    const period = this.parameter(
      'seasonPeriod',
      'season_period',
      {
        name: 'Length of a seasonal cycle',
        value: 1,
        min: 0.25,
        max: 4,
        unit,
        meaning: 'Time from one peak to the next.',
      },
      true,
    );
    const peak = this.parameter(
      'seasonPeak',
      'season_peak',
      {
        name: 'Time of the seasonal peak',
        value: 0,
        min: 0,
        max: 1,
        unit,
        meaning: 'When in the cycle the rate is highest.',
      },
      true,
    );
    this.seasonal = `*(1 + ${strength}*cos(6.283185307179586*(t - ${peak})/${period}))`;
  }

  /** Adds a process; amounts on one class are summed. */
  process(name: string, kind: ProcessKind, rate: string, effects: Process['effects']): void {
    const merged = new Map<string, string>();
    for (const effect of effects) {
      const before = merged.get(effect.class);
      merged.set(effect.class, before === undefined ? effect.amount : `${before} + ${effect.amount}`);
    }
    const process: Process = {
      id: freeProcessId(this.document, `${this.group}-${this.count + 1}`),
      name,
      kind,
      rate: this.seasonal === '' ? rate : factor(rate) + this.seasonal,
      effects: [...merged].map(([symbol, amount]) => ({ class: symbol, amount })),
      signed: false,
      template: { name: this.template, settings: this.settings, group: this.group },
    };
    this.count += 1;
    const processes = [...this.document.processes];
    processes.splice(this.place, 0, process);
    this.place += 1;
    this.document = { ...this.document, processes };
  }
  private count = 0;

  private asked(field: string): string {
    const value = this.settings[field];
    return typeof value === 'string' ? value : '';
  }

  private settle(field: string, symbol: string): string {
    this.settings[field] = symbol;
    return symbol;
  }

  private mayCreate(field: string, symbol: string): boolean {
    if (!isSymbol(symbol)) {
      this.refuse(
        field,
        `${symbol} cannot be a symbol: it starts with a letter, holds letters, digits and underscores, and is no reserved name.`,
      );
      return false;
    }
    const taken = listSymbols(this.document).find((entry) => entry.symbol === symbol);
    if (taken === undefined) return true;
    this.refuse(field, `${symbol} is taken by ${taken.label}; choose another symbol.`);
    return false;
  }

  private traitSymbol(
    field: string,
    suggestion: string,
    defaults: NewTrait,
    of: readonly (readonly string[])[],
  ): string {
    const asked = this.asked(field);
    const existing = this.document.traits.find((entry) => entry.symbol === (asked || suggestion));
    if (asked !== '') {
      if (existing !== undefined && existing.per !== defaults.per) {
        this.refuse(
          field,
          `The trait ${asked} is kept per ${existing.per}, and one per ${defaults.per} is needed here.`,
        );
      } else if (existing === undefined && !isSymbol(asked)) {
        this.mayCreate(field, asked);
      }
      return asked;
    }
    if (existing !== undefined && existing.role === defaults.role && existing.per === defaults.per) {
      return existing.symbol;
    }
    const taken = new Set(listSymbols(this.document).map((entry) => entry.symbol));
    for (let k = 1; ; k += 1) {
      const symbol = k === 1 ? suggestion : `${suggestion}${k}`;
      const free =
        !taken.has(symbol) &&
        !this.document.traits.some((entry) => entry.symbol === symbol) &&
        !of.some((one) => taken.has(traitEntrySymbol(symbol, one)));
      if (free) return symbol;
    }
  }
}

function sameClasses(a: readonly string[], b: readonly string[]): boolean {
  return a.length === b.length && a.every((symbol, k) => symbol === b[k]);
}
