/** A cell of text that no spreadsheet takes for a formula, quoted as RFC 4180 has it. */
export function csvText(value: string): string {
  const safe = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value;
  return `"${safe.replaceAll('"', '""')}"`;
}

/** A cell with a number, or nothing; a sign in front of a number makes no formula of it. */
export const csvNumber = (value: number | null) => (value === null ? '' : String(value));

export const csvLines = (lines: readonly string[]) => [...lines, ''].join('\r\n');
