import { GLYPHS, type GlyphName } from '@/graphics/glyphs';
import type { LegendItem } from '@/graphics/plot-spec';

export function GlyphSign({
  glyph,
  colour,
  size = 12,
}: {
  readonly glyph: GlyphName;
  readonly colour: string;
  readonly size?: number;
}) {
  return (
    <svg width={size} height={size} viewBox="-1.2 -1.2 2.4 2.4" aria-hidden className="shrink-0">
      {GLYPHS[glyph].map(({ d, fill, stroke }) => (
        <path
          key={d}
          d={d}
          fill={fill === 'none' ? 'none' : fill === 'ground' ? 'var(--raised)' : colour}
          stroke={stroke ? colour : 'none'}
          strokeWidth={0.3}
        />
      ))}
    </svg>
  );
}

function LineSign({ item }: { readonly item: LegendItem }) {
  if (item.line === 'none') return null;
  if (item.line === 'band')
    return (
      <span aria-hidden className="h-2.5 w-5 rounded-sm opacity-30" style={{ background: item.colour }} />
    );
  return (
    <svg width="20" height="10" viewBox="0 0 20 10" aria-hidden className="shrink-0">
      <path
        d="M0,5H20"
        stroke={item.colour}
        strokeWidth={item.line === 'solid' ? 2.6 : 1.5}
        strokeDasharray={item.line === 'dashed' ? '5 3' : undefined}
      />
    </svg>
  );
}

export function PlotLegend({ items }: { readonly items: readonly LegendItem[] }) {
  return (
    <ul className="flex flex-wrap gap-x-4 gap-y-0.5 text-sm" aria-label="Legend">
      {items.map((item) => (
        <li key={item.label} className="flex items-center gap-1.5">
          <span className="relative inline-flex items-center">
            <LineSign item={item} />
            {item.marker ? (
              <span className={item.line === 'none' ? '' : 'absolute left-1/2 -translate-x-1/2'}>
                <GlyphSign glyph={item.marker} colour={item.colour} size={11} />
              </span>
            ) : null}
          </span>
          {item.label}
        </li>
      ))}
    </ul>
  );
}
