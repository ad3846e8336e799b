import type { PresetDocument, Trait, TraitEntry } from '@/engine/schema/preset';
import { showNumber } from '@/lib/parse-number';

export const DIFFERENCE_SECTIONS = [
  'Model',
  'Populations',
  'Traits',
  'Parameters',
  'Intermediate formulas',
  'Processes',
  'Other',
] as const;
export type DifferenceSection = (typeof DIFFERENCE_SECTIONS)[number];

/** One thing that differs: absent on a side is null. */
export interface Difference {
  readonly section: DifferenceSection;
  readonly label: string;
  readonly before: string | null;
  readonly after: string | null;
}

type Shown = Readonly<Record<string, string>>;

function text(value: unknown): string {
  if (value === null || value === undefined || value === '') return 'none';
  if (typeof value === 'number') return showNumber(value);
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (typeof value === 'string') return value;
  return JSON.stringify(value);
}

/** Rows of two sets of labelled texts; labels keep the order of the first, then of the second. */
function differ(section: DifferenceSection, a: Shown, b: Shown): Difference[] {
  const labels = [...new Set([...Object.keys(a), ...Object.keys(b)])];
  return labels.flatMap((label) => {
    const before = a[label] ?? null;
    const after = b[label] ?? null;
    return before === after ? [] : [{ section, label, before, after }];
  });
}

function showFields<T extends object>(
  prefix: string,
  value: T,
  names: Partial<Record<keyof T, string>>,
): Shown {
  return Object.fromEntries(
    (Object.entries(names) as [keyof T, string][]).map(([key, name]) => [
      `${prefix}, ${name}`,
      text(value[key]),
    ]),
  );
}

function showModel(document: PresetDocument): Shown {
  return {
    Title: document.title,
    Summary: text(document.summary),
    Notes: text(document.notes),
    Tags: text(document.tags.join(', ')),
    'Time unit': document.timeUnit,
    'Density unit': text(document.densityUnit),
    'Individuals per unit of density': text(document.individualsPerUnit),
    'Density to warn below': text(document.lowDensity),
    'Length of a trajectory': text(document.horizon),
    Spread: text(document.spread),
  };
}

function showPopulations(document: PresetDocument): Shown {
  return Object.assign(
    {},
    ...document.populations.map((one) => ({
      ...showFields(one.symbol, one, { name: 'name', hue: 'hue', sign: 'sign' }),
      [`${one.symbol}, classes`]: one.classes.map((entry) => entry.symbol).join(', '),
      ...Object.assign(
        {},
        ...one.classes.map((entry) =>
          showFields(`class ${entry.symbol}`, entry, { name: 'name', start: 'start value' }),
        ),
      ),
    })),
  );
}

function showEntry(entry: TraitEntry): string {
  const parts = [showNumber(entry.value)];
  if (entry.standardError !== null) parts.push(`± ${showNumber(entry.standardError)}`);
  if (entry.survival)
    parts.push(`(survival ${showNumber(entry.survival.fraction)} over ${showNumber(entry.survival.period)})`);
  if (entry.source) parts.push(`[${entry.source}]`);
  return parts.join(' ');
}

function showTrait(trait: Trait): Shown {
  const name = `${trait.name || trait.symbol} (${trait.symbol})`;
  return {
    ...Object.fromEntries(
      trait.entries.map((entry) => [`${name} of ${entry.of.join(' on ')}`, showEntry(entry)]),
    ),
    ...showFields(name, trait, {
      unit: 'unit',
      meaning: 'meaning',
      role: 'role',
      domain: 'values',
      mean: 'mean held',
      followsSpread: 'follows the spread',
      dial: 'own dial',
    }),
  };
}

function showParameters(document: PresetDocument): Shown {
  return Object.assign(
    {},
    ...document.parameters.map((one) => ({
      [`${one.name || one.symbol} (${one.symbol})`]:
        `${showNumber(one.value)}${one.standardError === null ? '' : ` ± ${showNumber(one.standardError)}`} ${one.unit}`.trim(),
      [`${one.symbol}, range`]: `${showNumber(one.min)} to ${showNumber(one.max)}`,
      ...showFields(one.symbol, one, { name: 'name', meaning: 'meaning', source: 'source' }),
    })),
  );
}

function showIntermediates(document: PresetDocument): Shown {
  return Object.assign(
    {},
    ...document.intermediates.map((one) => ({
      [one.symbol]: one.formula,
      ...showFields(one.symbol, one, { unit: 'unit', meaning: 'meaning' }),
    })),
  );
}

/** Rows of all processes; two of one name are told apart by their ids. */
function showProcesses(document: PresetDocument): Shown {
  const names = document.processes.map((one) => one.name || one.id);
  const rows = document.processes.map((process, at) => {
    const own = names[at] ?? process.id;
    const name = names.filter((one) => one === own).length > 1 ? `${own} (${process.id})` : own;
    return {
      [`${name}, rate`]: process.rate,
      [`${name}, effects`]: process.effects.map((one) => `${one.class} by ${one.amount}`).join(', '),
      [`${name}, kind`]: process.kind,
      [`${name}, may be negative`]: text(process.signed),
    };
  });
  const order = document.processes.map((one) => one.id).join(', ');
  return Object.assign({}, ...rows, { 'Order by id': text(order) });
}

function showPane(pane: PresetDocument['view']['panes'][number]): string {
  const axes = pane.axes.map((axis) => `${axis.logarithm ? 'log ' : ''}${axis.quantity} ${axis.of}`.trim());
  return axes.length === 0 ? pane.view : `${pane.view} (${axes.join(' × ')})`;
}

function showOther(document: PresetDocument): Shown {
  return {
    'Constants of motion': text(document.constantsOfMotion.join('; ')),
    Box: text(
      document.box
        .map((one) => `${one.class} from ${showNumber(one.from)} to ${showNumber(one.to)}`)
        .join(', '),
    ),
    Sweeps: text(
      document.sweeps
        .map((one) => `${one.parameter} from ${showNumber(one.from)} to ${showNumber(one.to)}`)
        .join(', '),
    ),
    'Known facts': text(document.knownFacts.map((fact) => JSON.stringify(fact)).join('; ')),
    Views: text(document.view.panes.map(showPane).join(', ')),
    'Pooled twin shown': text(document.view.showTwin),
  };
}

/** What differs between two documents, field by field; whole things that were added have nothing before. */
export function compareDocuments(a: PresetDocument, b: PresetDocument): readonly Difference[] {
  const traits = (document: PresetDocument): Shown => Object.assign({}, ...document.traits.map(showTrait));
  return [
    ...differ('Model', showModel(a), showModel(b)),
    ...differ('Populations', showPopulations(a), showPopulations(b)),
    ...differ('Traits', traits(a), traits(b)),
    ...differ('Parameters', showParameters(a), showParameters(b)),
    ...differ('Intermediate formulas', showIntermediates(a), showIntermediates(b)),
    ...differ('Processes', showProcesses(a), showProcesses(b)),
    ...differ('Other', showOther(a), showOther(b)),
  ];
}
