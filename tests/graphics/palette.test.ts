import { describe, expect, it } from 'vitest';

import { HUES } from '@/engine/schema/preset';
import { contrastRatio } from '@/graphics/contrast';
import { classColours, PALETTES, type ThemeName } from '@/graphics/palette';

const THEMES: readonly ThemeName[] = ['light', 'dark'];

/** Simulation of colour-vision deficiencies in linear RGB after Machado, Oliveira & Fernandes 2009, severity 1 (from memory). */
const DEFICIENCIES = {
  protan: [0.152286, 1.052583, -0.204868, 0.114503, 0.786281, 0.099216, -0.003882, -0.048116, 1.051998],
  deutan: [0.367322, 0.860646, -0.227968, 0.280085, 0.672501, 0.047413, -0.01182, 0.04294, 0.968881],
};

function linear(hex: string): number[] {
  return [1, 3, 5].map((at) => {
    const s = Number.parseInt(hex.slice(at, at + 2), 16) / 255;
    return s <= 0.04045 ? s / 12.92 : ((s + 0.055) / 1.055) ** 2.4;
  });
}

/** OKLab (Ottosson 2020), whose distances are about even to the eye. */
function oklab([r = 0, g = 0, b = 0]: number[]): number[] {
  const l = Math.cbrt(Math.max(0, 0.4122214708 * r + 0.5363325363 * g + 0.0514459929 * b));
  const m = Math.cbrt(Math.max(0, 0.2119034982 * r + 0.6806995451 * g + 0.1073969566 * b));
  const s = Math.cbrt(Math.max(0, 0.0883024619 * r + 0.2817188376 * g + 0.6299787005 * b));
  return [
    0.2104542553 * l + 0.793617785 * m - 0.0040720468 * s,
    1.9779984951 * l - 2.428592205 * m + 0.4505937099 * s,
    0.0259040371 * l + 0.7827717662 * m - 0.808675766 * s,
  ];
}

function seenBy(matrix: readonly number[], hex: string): number[] {
  const rgb = linear(hex);
  const row = (k: number) => rgb.reduce((sum, value, at) => sum + value * (matrix[3 * k + at] ?? 0), 0);
  return oklab([row(0), row(1), row(2)]);
}

describe('palettes', () => {
  it.each(THEMES)('%s: every shade, the twin and muted text stand out from cards', (theme) => {
    const palette = PALETTES[theme];
    for (const hue of HUES) {
      expect(palette.hues[hue].length).toBeGreaterThanOrEqual(3);
      for (const shade of palette.hues[hue])
        expect(contrastRatio(shade, palette.raised), `${hue} ${shade}`).toBeGreaterThanOrEqual(3);
    }
    expect(contrastRatio(palette.twin, palette.raised)).toBeGreaterThanOrEqual(3);
    for (const text of [palette.ink, palette.muted, palette.accent, palette.caution])
      expect(contrastRatio(text, palette.raised)).toBeGreaterThanOrEqual(4.5);
  });

  it.each(THEMES)('%s: a step of the ramp has the same contrast for every hue', (theme) => {
    const palette = PALETTES[theme];
    for (let step = 0; step < 4; step++) {
      const ratios = HUES.map((hue) => contrastRatio(palette.hues[hue][step] ?? '#000000', palette.raised));
      expect(Math.max(...ratios) / Math.min(...ratios)).toBeLessThan(1.06);
    }
  });

  it.each(THEMES)('%s: neighbouring shades differ with red and green deficiencies', (theme) => {
    for (const matrix of Object.values(DEFICIENCIES))
      for (const hue of HUES) {
        const shades = PALETTES[theme].hues[hue].map((shade) => seenBy(matrix, shade));
        for (let k = 1; k < shades.length; k++) {
          const distance = Math.hypot(
            ...(shades[k] ?? []).map((value, at) => value - (shades[k - 1]?.[at] ?? 0)),
          );
          expect(distance).toBeGreaterThan(0.06);
        }
      }
  });

  it('gives the classes of one population different colours, whatever their shades', () => {
    for (const shades of [
      [0, 2],
      [0, 0],
      [2, 0],
      [0, 1, 2],
      [0, 0, 0, 0],
      [5, 1, 2],
    ]) {
      const classes = shades.map((shade, k) => ({ symbol: `c${k}`, name: '', shade, start: 1 }));
      const colours = classColours(
        [{ symbol: 'p', name: '', hue: 'woad', sign: 'nonnegative', classes }],
        PALETTES.light,
      );
      expect(new Set(colours.values()).size).toBe(shades.length);
    }
  });
});
