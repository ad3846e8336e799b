import type { KeptBranch, KeptModel, KeptPoint, SweepRange } from '@/contract/kept-sweep';
import type { PresetDocument } from '@/engine/schema/preset';
import { paddedDomain } from '@/graphics/axis';
import { formatNumber } from '@/graphics/numbers';
import { classColours, type Palette } from '@/graphics/palette';
import type { PlotBand, PlotLine, PlotPoint, PlotSpec } from '@/graphics/plot-spec';
import { classQuantity, nameQuantity, parameterName, readQuantity } from '@/graphics/quantities';

/** One model of a kept sweep in the plot. */
export interface KeptLayer {
  readonly id: string;
  /** Whose it is, e.g. `theirs`, `reference`. */
  readonly name: string;
  readonly model: KeptModel;
  /** `thin` lies over the others without hiding them. */
  readonly tone: 'hue' | 'grey' | 'thin';
}

type Read = (series: Readonly<Record<string, readonly number[]>>, point: number) => number;

/** Reads a class from the series of a branch; from a lumped twin its share of the total. Null where neither is there. */
function readerOf(document: PresetDocument, symbol: string, symbols: readonly string[]): Read | null {
  const read = readQuantity(document, classQuantity(symbol), symbols);
  if (!read) return null;
  const state = new Float64Array(symbols.length);
  return (series, point) => {
    symbols.forEach((one, index) => {
      state[index] = series[one]?.[point] ?? NaN;
    });
    return read(state, 0, NaN, NaN);
  };
}

interface Run {
  readonly from: number;
  readonly to: number;
  readonly attracts: number;
}

/** Stretches of one stability; ends overlap by one point. */
function runsOf({ attracts }: KeptBranch): readonly Run[] {
  const runs: Run[] = [];
  let from = 0;
  for (let k = 1; k <= attracts.length; k += 1) {
    if (k < attracts.length && attracts[k] === attracts[from]) continue;
    runs.push({ from, to: Math.min(k, attracts.length - 1), attracts: attracts[from] ?? 2 });
    from = k;
  }
  return runs;
}

const WORDS = ['repels', 'attracts', 'neutral or undecided'] as const;

const SIZES = { hue: 6, grey: 8, thin: 3.5 } as const;
const WIDTHS = { hue: [2.2, 1.4], grey: [4, 2.6], thin: [0.9, 0.9] } as const;

function style(attracts: number, tone: KeptLayer['tone']): { width: number; dash?: readonly number[] } {
  const [solid, broken] = WIDTHS[tone];
  if (attracts === 1) return { width: solid };
  return { width: broken, dash: attracts === 0 ? [6, 4] : [1.5, 3.5] };
}

interface Drawn {
  readonly lines: PlotLine[];
  readonly bands: PlotBand[];
  readonly points: PlotPoint[];
}

/** Where a special point lies in the plot: at its state, or for a cycle at the highest value of the nearest one. */
function heightOf(point: KeptPoint, model: KeptModel, reader: (symbols: readonly string[]) => Read | null) {
  const symbols = Object.keys(point.state);
  if (symbols.length > 0) {
    const series = Object.fromEntries(symbols.map((symbol) => [symbol, [point.state[symbol] ?? NaN]]));
    return reader(symbols)?.(series, 0) ?? NaN;
  }
  let [height, nearest] = [NaN, Infinity];
  for (const branch of model.branches) {
    if (branch.of !== 'cycles') continue;
    const read = reader(Object.keys(branch.values));
    branch.parameters.forEach((parameter, k) => {
      const distance = Math.abs(parameter - point.parameter);
      if (distance < nearest) [height, nearest] = [read?.(branch.values, k) ?? NaN, distance];
    });
  }
  return height;
}

export function describePoint(point: KeptPoint, parameter: string): string {
  const period = point.period === null ? '' : `, period ${formatNumber(point.period, 4)}`;
  return `${point.kind} at ${parameter} = ${formatNumber(point.parameter, 6)}${period}`;
}

function drawLayer(
  layer: KeptLayer,
  parameter: string,
  colour: string,
  reader: (symbols: readonly string[]) => Read | null,
): Drawn {
  const drawn: Drawn = { lines: [], bands: [], points: [] };
  layer.model.branches.forEach((branch, index) => {
    const read = reader(Object.keys(branch.values));
    if (!read) return;
    runsOf(branch).forEach((run, order) => {
      const at = Array.from({ length: run.to - run.from + 1 }, (_, k) => run.from + k);
      const x = Float64Array.from(at, (k) => branch.parameters[k] ?? NaN);
      const y = Float64Array.from(at, (k) => read(branch.values, k));
      const { width, dash } = style(run.attracts, layer.tone);
      const common = {
        id: `${layer.id}:${branch.of}:${index}:${order}`,
        label: `${layer.name}, ${branch.of === 'cycles' ? 'cycle' : 'branch'} ${index + 1}, ${WORDS[run.attracts] ?? ''}`,
        colour,
        ...(dash ? { dash } : {}),
        x,
        twin: layer.tone === 'grey',
      };
      if (branch.of === 'equilibria') drawn.lines.push({ ...common, width, marker: null, y });
      else
        drawn.bands.push({
          ...common,
          low: Float64Array.from(at, (k) => read(branch.lowest, k)),
          high: y,
          opacity: layer.tone === 'hue' ? 0.16 : layer.tone === 'grey' ? 0.1 : 0,
          edge: { width, opacity: 1 },
        });
    });
  });
  layer.model.points.forEach((point, index) => {
    const y = heightOf(point, layer.model, reader);
    if (Number.isFinite(y))
      drawn.points.push({
        id: `${layer.id}:point:${index}`,
        label: point.kind,
        description: `${layer.name}: ${describePoint(point, parameter)}. ${point.meaning}`,
        x: point.parameter,
        y,
        glyph: point.kind,
        colour,
        size: SIZES[layer.tone],
        named: layer.tone !== 'thin',
        twin: layer.tone === 'grey',
      });
  });
  return drawn;
}

function extentOf({ lines, bands, points }: Drawn): [number, number] {
  let [low, high] = [Infinity, -Infinity];
  const add = (value: number) => {
    if (!Number.isFinite(value)) return;
    low = Math.min(low, value);
    high = Math.max(high, value);
  };
  for (const line of lines) line.y.forEach(add);
  for (const band of bands) {
    band.low.forEach(add);
    band.high.forEach(add);
  }
  for (const point of points) add(point.y);
  return [low, high];
}

/** Classes that the layers can be drawn by. */
export function classChoices(document: PresetDocument): readonly { value: string; label: string }[] {
  return document.populations
    .flatMap((population) => population.classes)
    .map(({ symbol }) => ({
      value: symbol,
      label: nameQuantity(document, classQuantity(symbol)).name,
    }));
}

/**
 * Kept sweeps over one another along the swept parameter, the last on top: branches solid where they attract and
 * dashed where they repel, cycles as bands, special points with their names.
 */
export function keptSweepSpec(
  document: PresetDocument,
  range: SweepRange,
  layers: readonly KeptLayer[],
  symbol: string,
  palette: Palette,
): PlotSpec {
  const parameter = parameterName(document, range.parameter);
  const named = nameQuantity(document, classQuantity(symbol));
  const hue = classColours(document.populations, palette).get(symbol) ?? palette.ink;
  const colours = { hue, grey: palette.twin, thin: palette.ink } as const;
  const colourOf = (layer: KeptLayer) => colours[layer.tone];
  const drawn: Drawn = { lines: [], bands: [], points: [] };
  for (const layer of layers) {
    const one = drawLayer(layer, range.parameter, colourOf(layer), (symbols) =>
      readerOf(document, symbol, symbols),
    );
    drawn.lines.push(...one.lines);
    drawn.bands.push(...one.bands);
    drawn.points.push(...one.points);
  }
  const [low, high] = extentOf(drawn);
  return {
    title: `Sweep over ${parameter.name}`,
    description: `${named.name} at equilibria and on cycles against ${parameter.name}: ${layers
      .map(({ name, model }) => `${name} with ${model.points.length} special points`)
      .join(', ')}`,
    x: { ...parameter, logarithm: false, domain: [range.from, range.to] },
    y: {
      name: named.name,
      unit: named.unit,
      logarithm: false,
      domain: paddedDomain(low, high, { logarithm: false, fromZero: true }),
    },
    ...drawn,
    handles: [],
    flow: null,
    legend: layers.map((layer) => ({
      label: layer.name,
      colour: colourOf(layer),
      marker: null,
      line: 'solid',
    })),
    notes: [],
    empty:
      drawn.lines.length + drawn.bands.length > 0 ? null : 'No branch was found in this range of the sweep.',
  };
}
