/** Colours of figures in both themes: the page's tokens, and a ramp of shades for each population's hue. */
import type { Hue, PresetDocument } from '@/engine/schema/preset';

export type ThemeName = 'light' | 'dark';

export interface Palette {
  readonly paper: string;
  readonly panel: string;
  readonly raised: string;
  readonly ink: string;
  readonly muted: string;
  readonly hairline: string;
  readonly accent: string;
  readonly accentInk: string;
  readonly caution: string;
  readonly twin: string;
  /** Four shades a hue; the contrast with `raised` of a step is the same for every hue. */
  readonly hues: Readonly<Record<Hue, readonly string[]>>;
}

const LIGHT: Palette = {
  paper: '#fbfaf6',
  panel: '#f4f1e9',
  raised: '#ffffff',
  ink: '#1e2a2d',
  muted: '#5c696b',
  hairline: '#ddd7c9',
  accent: '#1f5f4e',
  accentInk: '#ffffff',
  caution: '#9c4a2b',
  twin: '#8f897b',
  hues: {
    weld: ['#c0802c', '#a26501', '#7a4b04', '#543202'],
    woad: ['#5990d5', '#3e74b7', '#205697', '#11396a'],
    madder: ['#d96b78', '#ba505e', '#983142', '#6a1d2a'],
    lichen: ['#729946', '#587d29', '#3d6002', '#284102'],
    sloe: ['#9f7ece', '#8363b0', '#664690', '#462d65'],
    slate: ['#7493a0', '#587683', '#3c5966', '#263d46'],
  },
};

const DARK: Palette = {
  paper: '#14191b',
  panel: '#1b2225',
  raised: '#222b2f',
  ink: '#e8ebe6',
  muted: '#98a5a6',
  hairline: '#2f3a3e',
  accent: '#7fc4a5',
  accentInk: '#14191b',
  caution: '#d98b6a',
  twin: '#87969a',
  hues: {
    weld: ['#ffc88d', '#e9a657', '#ca8837', '#ac6d0f'],
    woad: ['#b6d5fe', '#7eb6ff', '#6298df', '#477cc1'],
    madder: ['#fec5c8', '#ff959e', '#e37481', '#c45866'],
    lichen: ['#bcdd9a', '#97bf6c', '#7ba350', '#608632'],
    sloe: ['#ddcafe', '#c5a5f7', '#a887d8', '#8c6cb9'],
    slate: ['#bcd7e2', '#98b8c6', '#7c9ca9', '#61808c'],
  },
};

export const PALETTES: Readonly<Record<ThemeName, Palette>> = { light: LIGHT, dark: DARK };

type Populations = PresetDocument['populations'];

const STEPS = 4;

/** Steps of the ramp for the classes of one population: one alone takes the second, two lie far apart. */
function rampSteps(shades: readonly number[]): readonly number[] {
  const [first = 0, second = 0] = shades;
  if (shades.length === 1) return [1];
  if (shades.length === 2) return first > second ? [2, 0] : [0, 2];
  const wrapped = shades.map((shade) => shade % STEPS);
  return new Set(wrapped).size === Math.min(shades.length, STEPS)
    ? wrapped
    : shades.map((_shade, index) => index % STEPS);
}

/** Colour of each class, by symbol. */
export function classColours(populations: Populations, palette: Palette): ReadonlyMap<string, string> {
  const colours = new Map<string, string>();
  for (const population of populations) {
    const steps = rampSteps(population.classes.map((one) => one.shade));
    population.classes.forEach((one, index) => {
      colours.set(one.symbol, palette.hues[population.hue][steps[index] ?? 0] ?? palette.ink);
    });
  }
  return colours;
}

/** Colour of a population as a whole: the third step, so that its total is told from its classes. */
export function populationColour(hue: Hue, palette: Palette, classes: number): string {
  return palette.hues[hue][classes === 1 ? 1 : 3] ?? palette.ink;
}
