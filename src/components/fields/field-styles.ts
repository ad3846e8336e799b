/** Shared looks of the compact fields in rails and tables. */
export const COMPACT_INPUT =
  'min-w-0 rounded-md border border-hairline bg-raised px-2 text-ink placeholder:text-muted hover:border-muted aria-invalid:border-caution disabled:cursor-not-allowed disabled:opacity-60';

export const COMPACT_HEIGHT = 'h-8';
