import Papa from 'papaparse';

import type { InvitationRow } from '@/contract/labs';

/** A file of more than this holds something else than addresses. */
export const LARGEST_FILE = 200_000;

const MARKS = [',', ';', '\t'] as const;
const ADDRESS_HEADING = /^(e-?mail|e-?mail address|mail|address)$/i;
const ROLE_HEADING = /^role$/i;

const occurrences = (text: string, mark: string) => text.split(mark).length - 1;

/** The mark between cells is the one that occurs most. */
function separatorOf(text: string): string {
  return MARKS.reduce<string>(
    (best, mark) => (occurrences(text, mark) > occurrences(text, best) ? mark : best),
    ',',
  );
}

/** `Ada Fen <ada@example.org>` is the address in it. */
const addressIn = (cell: string) => /<([^<>]*)>\s*$/.exec(cell)?.[1]?.trim() ?? cell;

/** Several addresses in one cell, where every part is one. */
function addressesIn(cell: string): string[] {
  const parts = cell.split(/[\s,;]+/).filter(Boolean);
  return parts.length > 1 && parts.every((part) => part.includes('@')) ? parts : [addressIn(cell)];
}

/** Cells of a row without headings: addresses, each with a role behind it or not. What is neither stands as a bad row. */
function readCells(cells: readonly string[], line: number): InvitationRow[] {
  const rows: InvitationRow[] = [];
  let takesRole = false;
  for (const cell of cells) {
    const last = rows.at(-1);
    if (!cell.includes('@') && takesRole && last) {
      rows[rows.length - 1] = { ...last, role: cell };
      takesRole = false;
      continue;
    }
    rows.push(...addressesIn(cell).map((email) => ({ line, email, role: '' })));
    takesRole = cell.includes('@');
  }
  return rows;
}

/** Rows of pasted text or of a CSV file, with or without headings. Nothing is left out but blank lines. */
export function readInvitationRows(text: string): InvitationRow[] {
  const { data } = Papa.parse<string[]>(text, { delimiter: separatorOf(text), skipEmptyLines: false });
  const lines = data
    .map((cells, index) => ({ line: index + 1, cells: cells.map((cell) => cell.trim()) }))
    .filter(({ cells }) => cells.some(Boolean));
  const [head, ...rest] = lines;
  const addressColumn = head?.cells.findIndex((cell) => ADDRESS_HEADING.test(cell)) ?? -1;
  if (head === undefined || addressColumn < 0)
    return lines.flatMap(({ line, cells }) => readCells(cells.filter(Boolean), line));
  const roleColumn = head.cells.findIndex((cell) => ROLE_HEADING.test(cell));
  return rest.map(({ line, cells }) => ({
    line,
    email: addressIn(cells[addressColumn] ?? ''),
    role: cells[roleColumn] ?? '',
  }));
}

/** Text of a file as spreadsheets write it: UTF-8, UTF-16 with its mark, or the older Western code page. */
export function decodeText(bytes: Uint8Array): string {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return new TextDecoder('utf-16le').decode(bytes);
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    return new TextDecoder('windows-1252').decode(bytes);
  }
}
