import { PALETTES, classColours, populationColour } from '@/graphics/palette';
import type { Population } from '@/engine/schema/preset';
import { useTheme } from '@/lib/theme';

/** The colour of a class, or of a population as a whole. */
export function HueDot({ population, of }: { readonly population: Population; readonly of?: string }) {
  const palette = PALETTES[useTheme((state) => state.theme)];
  const colour =
    of === undefined
      ? populationColour(population.hue, palette, population.classes.length)
      : (classColours([population], palette).get(of) ?? palette.ink);
  return (
    <svg width="10" height="10" viewBox="0 0 10 10" aria-hidden className="shrink-0">
      <circle cx="5" cy="5" r="5" fill={colour} />
    </svg>
  );
}
