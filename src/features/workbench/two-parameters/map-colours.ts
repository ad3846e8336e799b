import { interpolateRgb } from 'd3-interpolate';

import type { MapResult } from '@/engine/maps/contract';
import { formatNumber } from '@/graphics/numbers';
import type { Palette } from '@/graphics/palette';
import type { LegendItem, PlotCells } from '@/graphics/plot-spec';

/** Shades of one colour: few, so that neighbours of like value are drawn as one. */
const SHADES = 12;
/** Least share of colour, so that the sign is seen next to zero too. */
const FAINTEST = 0.16;
const STRONGEST = 0.78;

/** Colours, words and numbers of a map's cells. */
export function mapCells(result: MapResult, palette: Palette, unit: string): PlotCells {
  const { x, y, values } = result;
  const colour = colourOf(result, palette);
  const describe = describerOf(result, unit);
  return {
    x: { from: x.from, to: x.to, count: x.cells },
    y: { from: y.from, to: y.to, count: y.cells },
    label: MAP_NAMES[result.quantity],
    colour: (cell) => (result.state[cell] === 0 ? null : colour(values[cell] ?? NaN)),
    describe: (cell) => (result.state[cell] === 0 ? null : describe(values[cell] ?? NaN)),
    value: (cell) => values[cell] ?? NaN,
  };
}

export const MAP_NAMES: Readonly<Record<MapResult['quantity'], string>> = {
  margin: 'stability margin',
  attractor: 'kind of attractor',
  lowest: 'lowest density',
  exponent: 'largest Lyapunov exponent',
  basin: 'basin',
};

function colourOf(result: MapResult, palette: Palette): (value: number) => string | null {
  if (result.quantity === 'attractor' || result.quantity === 'basin') {
    const colours = kindColours(palette);
    return (kind) => (Number.isNaN(kind) ? null : (colours[kind % colours.length] ?? null));
  }
  if (result.quantity === 'lowest') {
    const logs = [...result.values].filter((value) => value > 0).map(Math.log10);
    const [low, high] = [Math.min(...logs), Math.max(...logs)];
    const shade = interpolateRgb(palette.caution, palette.raised);
    return (value) => {
      if (Number.isNaN(value)) return null;
      if (!(value > 0)) return shade(0);
      const share = high > low ? (Math.log10(value) - low) / (high - low) : 1;
      return shade(0.15 + 0.8 * quantised(share));
    };
  }
  const finite = [...result.values]
    .filter(Number.isFinite)
    .map(Math.abs)
    .sort((a, b) => a - b);
  // A few extreme cells must not make all others pale.
  const largest = finite[Math.floor(0.95 * (finite.length - 1))] || 1;
  const grows = interpolateRgb(palette.raised, palette.caution);
  const decays = interpolateRgb(palette.raised, palette.accent);
  const positive = result.quantity === 'margin' ? decays : grows;
  const negative = result.quantity === 'margin' ? grows : decays;
  return (value) => {
    if (Number.isNaN(value)) return null;
    const share = quantised(Math.min(1, Math.abs(value) / largest));
    return (value >= 0 ? positive : negative)(FAINTEST + (STRONGEST - FAINTEST) * share);
  };
}

const quantised = (share: number): number => Math.round(share * SHADES) / SHADES;

/** Far apart in hue and lightness, so that neighbouring kinds are told apart. */
function kindColours({ hues }: Palette): readonly string[] {
  const { lichen, woad, weld, madder, sloe, slate } = hues;
  return [lichen[0], woad[2], weld[0], madder[1], sloe[0], slate[3], woad[0], lichen[3]].map(
    (one) => one ?? '',
  );
}

function describerOf(result: MapResult, unit: string): (value: number) => string {
  const suffix = unit ? ` ${unit}` : '';
  switch (result.quantity) {
    case 'attractor':
    case 'basin':
      return (kind) => result.kinds[kind]?.label ?? 'no answer';
    case 'lowest':
      return (value) => (Number.isNaN(value) ? 'no answer' : `lowest density ${formatNumber(value)}`);
    case 'exponent':
      return (value) =>
        Number.isNaN(value) ? 'no answer' : `largest exponent ${formatNumber(value)}${suffix}`;
    case 'margin':
      return (value) =>
        Number.isNaN(value)
          ? 'no coexistence equilibrium found'
          : `margin ${formatNumber(value)}${suffix}, coexistence ${value > 0 ? 'attracts' : 'repels'}`;
  }
}

export function mapLegend(result: MapResult, palette: Palette): readonly LegendItem[] {
  const item = (label: string, colour: string): LegendItem => ({ label, colour, marker: null, line: 'band' });
  if (result.quantity === 'attractor' || result.quantity === 'basin') {
    const colours = kindColours(palette);
    const present = new Set(result.values);
    return result.kinds.flatMap(({ label }, kind) =>
      present.has(kind) ? [item(label, colours[kind % colours.length] ?? '')] : [],
    );
  }
  if (result.quantity === 'lowest') return [item('low densities', palette.caution)];
  return result.quantity === 'margin'
    ? [item('coexistence attracts', palette.accent), item('coexistence repels', palette.caution)]
    : [item('exponent below 0', palette.accent), item('exponent above 0: chaos', palette.caution)];
}
