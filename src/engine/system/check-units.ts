import {
  describeDimension,
  dimensionOf,
  multiplyDimensions,
  parseUnit,
  sameExponents,
  sameScale,
  type Dimension,
  type DimensionReport,
} from '../expression/index';
import { describeClass, listClasses, listSymbols } from '../schema/document-symbols';
import type { PresetDocument } from '../schema/preset';
import { TIME_SYMBOL } from '../schema/symbols';
import type { Diagnostic } from './contract';
import { parseCached } from './model-graph';
import { remark } from './remark';

/**
 * Units that cannot be read or do not fit: within a formula, and where rate times amount is not a
 * density per time. A unit left empty is unknown and fits everywhere.
 */
export function checkUnits(document: PresetDocument): readonly Diagnostic[] {
  return new UnitCheck(document).run();
}

class UnitCheck {
  private readonly found: Diagnostic[] = [];
  private readonly units = new Map<string, Dimension | null>();
  private readonly formulas = new Map<string, { readonly formula: string; readonly index: number }>();

  constructor(private readonly document: PresetDocument) {
    const time = this.read(document.timeUnit, ['timeUnit']);
    const density = this.read(document.densityUnit, ['densityUnit']);
    this.units.set(TIME_SYMBOL, time);
    this.due = time === null || density === null ? null : multiplyDimensions(density, time, -1);
    document.traits.forEach((trait, k) => this.read(trait.unit, ['traits', k, 'unit']));
    document.parameters.forEach((one, k) => this.read(one.unit, ['parameters', k, 'unit']));
    document.intermediates.forEach((one, k) => {
      const unit = this.read(one.unit, ['intermediates', k, 'unit']);
      if (unit === null) this.formulas.set(one.symbol, { formula: one.formula, index: k });
    });
    for (const entry of listSymbols(document)) {
      if (this.formulas.has(entry.symbol)) continue;
      const unit = parseUnit(entry.unit);
      this.units.set(entry.symbol, unit.ok ? unit.dimension : null);
    }
  }

  /** Density per time; null where either is unknown. */
  private readonly due: Dimension | null;

  run(): readonly Diagnostic[] {
    const { document } = this;
    document.intermediates.forEach((entry, k) => {
      const path = ['intermediates', k, 'formula'];
      const report = this.report(entry.formula, path);
      const declared = this.units.get(entry.symbol) ?? null;
      if (report === null || report.dimension === null || declared === null) return;
      if (!fits(report.dimension, declared)) {
        const message = `This has ${describeDimension(report.dimension)}, and its unit is entered as ${entry.unit}.`;
        this.found.push(remark('warning', path, message));
      }
    });
    document.processes.forEach((_, k) => this.process(k));
    return this.found;
  }

  private process(k: number): void {
    const process = this.document.processes[k];
    if (process === undefined) return;
    const rate = this.report(process.rate, ['processes', k, 'rate']);
    const labels = new Map(
      listClasses(this.document).map((one) => [one.class.symbol, describeClass(one.population, one.class)]),
    );
    const told = new Set<string>();
    process.effects.forEach((effect, j) => {
      const amount = this.report(effect.amount, ['processes', k, 'effects', j, 'amount']);
      if (rate === null || amount === null || this.due === null) return;
      if (rate.dimension === null || amount.dimension === null) return;
      const flow = multiplyDimensions(rate.dimension, amount.dimension);
      if (fits(flow, this.due) || told.has(describeDimension(flow))) return;
      told.add(describeDimension(flow));
      const message = `Rate times amount gives ${labels.get(effect.class) ?? effect.class} a change in ${describeDimension(flow)}, where ${describeDimension(this.due)} is due.`;
      this.found.push(remark('warning', ['processes', k, 'rate'], message));
    });
  }

  /** Dimension of a formula, with its own problems told; null where they leave nothing to go on. */
  private report(text: string, path: Diagnostic['path']): DimensionReport | null {
    const parsed = parseCached(text);
    if (!parsed.ok) return null;
    const report = dimensionOf(parsed.tree, (symbol) => this.unitOf(symbol));
    for (const { message, range } of report.problems) {
      this.found.push({ severity: 'warning', path, range, message, suggestion: null });
    }
    return report.problems.length === 0 ? report : null;
  }

  /** Unit of a symbol; that of an intermediate formula without one follows from its formula. */
  private unitOf(symbol: string): Dimension | null {
    const known = this.units.get(symbol);
    if (known !== undefined) return known;
    const entry = this.formulas.get(symbol);
    const parsed = entry === undefined ? null : parseCached(entry.formula);
    // Set first, so that a formula that needs itself ends here.
    this.units.set(symbol, null);
    if (parsed === null || !parsed.ok) return null;
    const { dimension } = dimensionOf(parsed.tree, (name) => this.unitOf(name));
    this.units.set(symbol, dimension);
    return dimension;
  }

  private read(text: string, path: Diagnostic['path']): Dimension | null {
    const unit = parseUnit(text);
    if (unit.ok) return unit.dimension;
    this.found.push(remark('warning', path, unit.message));
    return null;
  }
}

function fits(a: Dimension, b: Dimension): boolean {
  return sameExponents(a, b) && sameScale(a, b);
}
