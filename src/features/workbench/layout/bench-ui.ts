import { create } from 'zustand';

export const DIALOGS = [
  'palette',
  'shortcuts',
  'save',
  'save-copy',
  'share',
  'history',
  'export',
  'import',
  'equations',
  'picture',
  'hand-in',
] as const;
export type DialogName = (typeof DIALOGS)[number];

interface BenchUi {
  readonly railOpen: boolean;
  readonly findingsOpen: boolean;
  /** Which rail stands as a sheet over the panes, where there is no room beside them. */
  readonly sheet: 'model' | 'findings' | null;
  readonly dialog: DialogName | null;
  /** A few words on what just happened; told to screen readers too. */
  readonly notice: string | null;
  set(patch: Partial<Omit<BenchUi, 'set'>>): void;
}

/** What is open on the bench besides the document. */
export const useBenchUi = create<BenchUi>()((set) => ({
  railOpen: true,
  findingsOpen: true,
  sheet: null,
  dialog: null,
  notice: null,
  set: (patch) => set(patch),
}));
