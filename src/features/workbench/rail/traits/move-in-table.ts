import type { KeyboardEvent } from 'react';

type Direction = 'up' | 'down' | 'left' | 'right';

const KEYS: Readonly<Record<string, Direction>> = {
  ArrowUp: 'up',
  ArrowDown: 'down',
  ArrowLeft: 'left',
  ArrowRight: 'right',
};

function positionOf(cell: HTMLElement): readonly [number, number] {
  return [Number(cell.dataset['row']), Number(cell.dataset['column'])];
}

/** The nearest cell in a direction, in the same row or column; gaps are stepped over. */
function neighbour(from: HTMLElement, direction: Direction): HTMLElement | null {
  const table = from.closest('table');
  if (!table) return null;
  const [row, column] = positionOf(from);
  const step = direction === 'up' || direction === 'left' ? -1 : 1;
  const candidates = [...table.querySelectorAll<HTMLElement>('input[data-row]')].flatMap((cell) => {
    const [r, c] = positionOf(cell);
    const inLine = direction === 'up' || direction === 'down' ? c === column : r === row;
    const distance = step * (direction === 'up' || direction === 'down' ? r - row : c - column);
    return inLine && distance > 0 ? [{ cell, distance }] : [];
  });
  candidates.sort((a, b) => a.distance - b.distance);
  return candidates[0]?.cell ?? null;
}

/** Left and right leave a cell only where the caret cannot move further, or all of it is selected. */
function leavesText(input: HTMLInputElement, direction: Direction): boolean {
  if (direction === 'up' || direction === 'down') return true;
  const { selectionStart: start, selectionEnd: end, value } = input;
  if (start === null || end === null) return true;
  if (start === 0 && end === value.length) return true;
  if (start !== end) return false;
  return direction === 'left' ? start === 0 : end === value.length;
}

/** Moves the focus from cell to cell by arrow keys, as in any table of numbers. */
export function moveByKey(event: KeyboardEvent<HTMLInputElement>): void {
  const direction = KEYS[event.key];
  if (!direction || event.altKey || event.ctrlKey || event.metaKey || event.shiftKey) return;
  if (!leavesText(event.currentTarget, direction)) return;
  const target = neighbour(event.currentTarget, direction);
  if (!target) return;
  event.preventDefault();
  target.focus();
}

export function moveDown(from: HTMLElement): void {
  neighbour(from, 'down')?.focus();
}
