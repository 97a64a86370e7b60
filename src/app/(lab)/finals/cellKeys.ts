import type { KeyboardEvent } from 'react';

/** The cells of all rows as they stand. */
const cellsIn = (root: ParentNode) => [...root.querySelectorAll<HTMLInputElement>('input[data-cell]')];

/** ↑ and ↓ go to the same cell of the next row, Enter to the next cell that is empty by nature. */
export function moveBetweenCells(event: KeyboardEvent<HTMLElement>): void {
  const { target, key } = event;
  const isMove = key === 'ArrowUp' || key === 'ArrowDown' || key === 'Enter';
  if (!(target instanceof HTMLInputElement) || !target.dataset.cell || !isMove) return;
  if (event.nativeEvent.isComposing || event.ctrlKey || event.altKey || event.metaKey || event.shiftKey) return;
  event.preventDefault();
  const all = cellsIn(event.currentTarget);
  if (key === 'Enter') {
    // The frequency is filled in already; who tunes elsewhere goes there on purpose.
    all
      .slice(all.indexOf(target) + 1)
      .find(({ dataset }) => dataset.cell !== 'frequency')
      ?.focus();
    return;
  }
  const column = all.filter(({ dataset }) => dataset.cell === target.dataset.cell);
  column[column.indexOf(target) + (key === 'ArrowDown' ? 1 : -1)]?.focus();
}

/** Puts the cursor into the first reading. */
export function startTyping(root: ParentNode | null): boolean | void {
  const first = root && cellsIn(root).find(({ dataset }) => dataset.cell !== 'frequency');
  if (!first) return false;
  first.focus();
}
