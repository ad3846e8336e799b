import { HUES, type Hue } from '@/engine/schema/preset';
import { PALETTES } from '@/graphics/palette';
import { useTheme } from '@/lib/theme';

/** The hue of a population, chosen by name and seen by colour. */
export function HueChoice({
  value,
  name,
  onChange,
}: {
  readonly value: Hue;
  readonly name: string;
  readonly onChange: (hue: Hue) => void;
}) {
  const palette = PALETTES[useTheme((state) => state.theme)];
  return (
    <fieldset>
      <legend className="mb-1 text-sm font-medium">Hue of {name}</legend>
      <div className="flex gap-1.5">
        {HUES.map((hue) => (
          <label
            key={hue}
            className="grid cursor-pointer justify-items-center text-xs text-muted"
            title={hue}
          >
            <input
              type="radio"
              name={`hue-${name}`}
              value={hue}
              aria-label={hue}
              checked={value === hue}
              className="peer sr-only"
              onChange={() => onChange(hue)}
            />
            <span className="flex overflow-hidden rounded-full outline-2 outline-offset-2 outline-transparent peer-checked:outline-ink peer-focus-visible:outline-accent">
              {palette.hues[hue].slice(0, 3).map((colour) => (
                <svg key={colour} width="10" height="22" aria-hidden>
                  <rect width="10" height="22" fill={colour} />
                </svg>
              ))}
            </span>
            {hue}
          </label>
        ))}
      </div>
    </fieldset>
  );
}
