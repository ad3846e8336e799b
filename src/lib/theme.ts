import { create } from 'zustand';

export type ThemeChoice = 'system' | 'light' | 'dark';
const STORAGE_KEY = 'moiety.theme';

const systemDark = typeof window !== 'undefined' ? window.matchMedia('(prefers-color-scheme: dark)') : null;

function storedChoice(): ThemeChoice {
  try {
    const stored = localStorage.getItem(STORAGE_KEY);
    return stored === 'light' || stored === 'dark' ? stored : 'system';
  } catch {
    return 'system';
  }
}

function resolve(choice: ThemeChoice): 'light' | 'dark' {
  if (choice !== 'system') return choice;
  return systemDark?.matches ? 'dark' : 'light';
}

interface ThemeState {
  readonly choice: ThemeChoice;
  readonly theme: 'light' | 'dark';
  choose(choice: ThemeChoice): void;
}

/** Light or dark, by choice or by the system; written to `data-theme` on the root element. */
export const useTheme = create<ThemeState>()((set) => ({
  choice: storedChoice(),
  theme: resolve(storedChoice()),
  choose: (choice) => {
    try {
      if (choice === 'system') localStorage.removeItem(STORAGE_KEY);
      else localStorage.setItem(STORAGE_KEY, choice);
    } catch {
      // Storage may be closed to us; the choice then lasts for this page only.
    }
    set({ choice, theme: resolve(choice) });
  },
}));

/** Keeps the root element and the store in step with the choice and the system. */
export function startTheme(): void {
  const apply = () => {
    document.documentElement.dataset.theme = useTheme.getState().theme;
  };
  apply();
  useTheme.subscribe(apply);
  systemDark?.addEventListener('change', () => {
    const { choice } = useTheme.getState();
    useTheme.setState({ theme: resolve(choice) });
  });
}
