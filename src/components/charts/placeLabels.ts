/** A candidate's mark in the chart and the number that belongs to it, in px. */
export interface Mark {
  id: number;
  x: number;
  y: number;
  /** Above the limit the number stands over its square, below it under. */
  side: 'above' | 'below';
  width: number;
  /** A mark in the focus ring has its number beside the ring. */
  ringed: boolean;
}

export interface PlacedLabel {
  id: number;
  /** Middle of the number, and its baseline. */
  x: number;
  y: number;
}

export interface Box {
  left: number;
  right: number;
  top: number;
  bottom: number;
}

/** Height of a figure at 12 px, from baseline to top, and the square with half its side. */
const FIGURE_PX = 9;
const SQUARE_HALF_PX = 4;
const RING_HALF_PX = 9;
const GAP_PX = 2;

export const overlaps = (a: Box, b: Box) =>
  a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;

export function labelBox(label: PlacedLabel, width: number): Box {
  return { left: label.x - width / 2, right: label.x + width / 2, top: label.y - FIGURE_PX, bottom: label.y };
}

export function markBox(mark: Mark): Box {
  const half = mark.ringed ? RING_HALF_PX : SQUARE_HALF_PX;
  return { left: mark.x - half, right: mark.x + half, top: mark.y - half, bottom: mark.y + half };
}

/** Places for a number, the best first: straight, pushed sideways at the same height, beside the square, further out. */
function places(mark: Mark): PlacedLabel[] {
  const { id, x, y, width } = mark;
  const beside = (mark.ringed ? RING_HALF_PX : SQUARE_HALF_PX) + GAP_PX + 2 + width / 2;
  const middle = y + FIGURE_PX / 2;
  if (mark.ringed)
    return [
      { id, x: x - beside, y: middle },
      { id, x: x + beside, y: middle },
      { id, x, y: y - RING_HALF_PX - 3 },
      { id, x, y: y + RING_HALF_PX + 3 + FIGURE_PX },
    ];
  const near = mark.side === 'above' ? y - SQUARE_HALF_PX - 5 : y + SQUARE_HALF_PX + 4 + FIGURE_PX;
  const further = mark.side === 'above' ? near - FIGURE_PX - GAP_PX : near + FIGURE_PX + GAP_PX;
  const push = width / 2 + 1;
  return [
    { id, x, y: near },
    ...[push / 2, push].flatMap((by) => [
      { id, x: x + by, y: near },
      { id, x: x - by, y: near },
    ]),
    { id, x: x + beside, y: middle },
    { id, x: x - beside, y: middle },
    { id, x, y: further },
  ];
}

/**
 * Where each candidate's number goes. Numbers never cover one another, another's square or an obstacle; marks are
 * served in the order given (worst first), a number dodges sideways by a fixed order of places, and one that finds no
 * place is left out: its square stays and the table has it.
 */
export function placeLabels(marks: readonly Mark[], within: Box, obstacles: readonly Box[] = []): PlacedLabel[] {
  const squares = marks.map((mark) => ({ id: mark.id, box: markBox(mark) }));
  const taken: Box[] = [...obstacles];
  const placed: PlacedLabel[] = [];
  const inOrder = [...marks].sort((a, b) => Number(b.ringed) - Number(a.ringed));
  for (const mark of inOrder) {
    const free = places(mark).find((place) => {
      const box = labelBox(place, mark.width + GAP_PX);
      if (box.left < within.left || box.right > within.right || box.top < within.top || box.bottom > within.bottom)
        return false;
      if (taken.some((other) => overlaps(box, other))) return false;
      return squares.every((square) => square.id === mark.id || !overlaps(box, square.box));
    });
    if (!free) continue;
    placed.push(free);
    taken.push(labelBox(free, mark.width + GAP_PX));
  }
  return placed;
}
