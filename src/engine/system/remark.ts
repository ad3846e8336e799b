import type { Diagnostic } from './contract';

/** A remark on a place of the document as a whole, without a range within a formula. */
export function remark(
  severity: Diagnostic['severity'],
  path: Diagnostic['path'],
  message: string,
  suggestion: string | null = null,
): Diagnostic {
  return { severity, path, range: null, message, suggestion };
}

/** A number as it is shown in remarks: four figures, without trailing zeros. */
export function figure(value: number): string {
  return String(Number(value.toPrecision(4)));
}
