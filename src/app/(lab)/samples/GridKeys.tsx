'use client';

import { useKey } from '@/components/shell/keys';

/** Arrow keys go from chart to chart: left and right through the states, up and down through the ports. */
export function GridKeys() {
  useKey('ArrowRight', () => move(1, 0), { says: 'next state', weak: true });
  useKey('ArrowLeft', () => move(-1, 0), { says: 'state before', weak: true });
  useKey('ArrowDown', () => move(0, 1), { says: 'next port', weak: true });
  useKey('ArrowUp', () => move(0, -1), { says: 'port before', weak: true });
  return null;
}

/** Answers false, so that the key keeps its own use, when no chart lies that way. */
function move(right: number, down: number): boolean | void {
  const cells = [...document.querySelectorAll<HTMLElement>('[data-state-grid] [data-cell]')];
  const here = cells.find((cell) => cell === document.activeElement);
  if (!here) {
    if (document.activeElement !== document.body && !document.activeElement?.matches('[data-state-grid]')) return false;
    return focus(cells[0]);
  }
  const at = here.getBoundingClientRect();
  const beyond = cells.filter((cell) => {
    const box = cell.getBoundingClientRect();
    const [dx, dy] = [box.left - at.left, box.top - at.top];
    return right
      ? Math.sign(Math.round(dx)) === right && Math.abs(dy) < at.height / 2
      : Math.sign(Math.round(dy)) === down && Math.abs(dy) > at.height / 2;
  });
  const far = (cell: HTMLElement) => {
    const box = cell.getBoundingClientRect();
    return Math.hypot(box.left - at.left, box.top - at.top);
  };
  return focus(beyond.sort((a, b) => far(a) - far(b))[0]);
}

function focus(cell: HTMLElement | undefined): boolean | void {
  if (!cell) return false;
  cell.focus();
}
