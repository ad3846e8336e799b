import type { PresetSummary } from '@/contract/presets';
import { HUES, type Hue } from '@/engine/schema/preset';
import { plural } from '@/lib/format';

const DOTS: Readonly<Record<Hue, string>> = {
  weld: 'bg-[#a96a09] dark:bg-[#e0a13c]',
  woad: 'bg-[#1d4f8c] dark:bg-[#6fa5e6]',
  madder: 'bg-[#a23a4a] dark:bg-[#e07f8c]',
  lichen: 'bg-[#5b7f2f] dark:bg-[#9cc26a]',
  sloe: 'bg-[#6a4c93] dark:bg-[#b195dc]',
  slate: 'bg-[#46606b] dark:bg-[#93b0bc]',
};

function dotOf(hue: string): string {
  return DOTS[HUES.find((known) => known === hue) ?? 'slate'];
}

/** The populations of a preset at a glance. */
export function PopulationDots({ populations }: { readonly populations: PresetSummary['populations'] }) {
  return (
    <ul aria-label="Populations" className="flex flex-wrap gap-x-3 gap-y-0.5 text-sm">
      {populations.map((population) => (
        <li key={population.name} className="flex items-center gap-1.5">
          <span aria-hidden className={`size-2.5 rounded-full ${dotOf(population.hue)}`} />
          {population.name}
          {population.classes > 1 ? (
            <span className="text-muted">{plural(population.classes, 'class', 'classes')}</span>
          ) : null}
        </li>
      ))}
    </ul>
  );
}
