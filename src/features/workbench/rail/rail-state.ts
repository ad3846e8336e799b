import { create } from 'zustand';

export const RAIL_SECTIONS = [
  'problems',
  'populations',
  'traits',
  'spread',
  'equations',
  'parameters',
  'intermediates',
  'processes',
  'more',
] as const;
export type RailSectionName = (typeof RAIL_SECTIONS)[number];

interface RailState {
  readonly closed: ReadonlySet<RailSectionName>;
  toggle(section: RailSectionName, open: boolean): void;
}

/** Which sections of the rail are folded; kept while the page lives. */
export const useRailState = create<RailState>()((set) => ({
  closed: new Set<RailSectionName>(['more']),
  toggle: (section, open) =>
    set((state) => {
      const closed = new Set(state.closed);
      if (open) closed.delete(section);
      else closed.add(section);
      return { closed };
    }),
}));

const SECTION_OF: Readonly<Record<string, RailSectionName>> = {
  populations: 'populations',
  traits: 'traits',
  spread: 'spread',
  parameters: 'parameters',
  intermediates: 'intermediates',
  processes: 'processes',
};

export function pathKey(path: readonly (string | number)[]): string {
  return path.join('.');
}

/** The field of a path: the one of the path itself, else the nearest above it, else one beneath it. */
function findField(path: readonly (string | number)[]): HTMLElement | null {
  for (let length = path.length; length > 0; length -= 1) {
    const key = pathKey(path.slice(0, length));
    const exact = document.querySelector<HTMLElement>(`[data-path="${CSS.escape(key)}"]`);
    if (exact) return exact;
    const beneath = document.querySelector<HTMLElement>(`[data-path^="${CSS.escape(`${key}.`)}"]`);
    if (beneath) return beneath;
  }
  return null;
}

/** Unfolds the section that holds a field of the document and puts the focus there. */
export function jumpToField(path: readonly (string | number)[]): void {
  const section = SECTION_OF[String(path[0])] ?? 'more';
  useRailState.getState().toggle(section, true);
  window.setTimeout(() => {
    const field = findField(path);
    field?.scrollIntoView({ block: 'center' });
    field?.focus();
  }, 30);
}
