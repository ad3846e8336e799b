import type { ParameterValues } from '@/workers/protocol';

export const DRIVER_DEFAULTS = {
  /** Points of a trajectory: more than the pixels of a pane's width at the usual sizes. */
  samples: 900,
  /** Rest after which equilibria are sought anew instead of followed. */
  idleMilliseconds: 150,
  /** Waiting that is worth showing. */
  staleMilliseconds: 200,
  /** A sweep that is as quick as this with its cycles is run again by itself when the numbers rest. */
  quickMilliseconds: 2_500,
} as const;

export function explain(error: unknown): string {
  const reason = error instanceof Error && error.message ? ` It said: ${error.message}` : '';
  return `The engine could not answer.${reason} Undo the last edit, or reload the page.`;
}

export function sameValues(a: ParameterValues, b: ParameterValues, except?: string): boolean {
  const keys = Object.keys(a);
  return keys.length === Object.keys(b).length && keys.every((key) => key === except || a[key] === b[key]);
}
