import fc from 'fast-check';
import { labelBox, markBox, overlaps, placeLabels, type Mark } from '@/components/charts/placeLabels';

const PLOT = { left: 46, right: 988, top: 31, bottom: 270 };

function mark(id: number, x: number, y: number, ringed = false): Mark {
  return { id, x, y, side: y < 88 ? 'above' : 'below', width: String(id).length * 7.25, ringed };
}

function expectClear(marks: Mark[], obstacles: Parameters<typeof placeLabels>[2] = []) {
  const placed = placeLabels(marks, PLOT, obstacles);
  const widths = new Map(marks.map(({ id, width }) => [id, width]));
  const boxes = placed.map((label) => ({ id: label.id, box: labelBox(label, widths.get(label.id)!) }));
  const faults: string[] = [];
  for (const [i, a] of boxes.entries()) {
    for (const b of boxes.slice(i + 1)) if (overlaps(a.box, b.box)) faults.push(`${a.id} covers ${b.id}`);
    for (const other of marks)
      if (other.id !== a.id && overlaps(a.box, markBox(other))) faults.push(`${a.id} covers the square of ${other.id}`);
    for (const obstacle of obstacles) if (overlaps(a.box, obstacle)) faults.push(`${a.id} covers a text`);
    if (a.box.left < PLOT.left || a.box.right > PLOT.right) faults.push(`${a.id} leaves the plot`);
  }
  expect(faults).toEqual([]);
  return placed;
}

describe('numbers of the candidates', () => {
  test('alone: over its square above the line, under it below', () => {
    const [above] = expectClear([mark(1, 500, 60)]);
    const [below] = expectClear([mark(2, 500, 150)]);
    expect(above).toMatchObject({ x: 500 });
    expect(above!.y).toBeLessThan(60);
    expect(below!.y).toBeGreaterThan(150);
  });

  test('the one in the focus ring has its number beside the ring, on the right where the left is the axis', () => {
    const [inside] = placeLabels([mark(3, 300, 100, true)], PLOT);
    expect(inside!.x).toBeLessThan(300 - 9);
    const [atEdge] = placeLabels([mark(3, 56, 100, true)], PLOT);
    expect(atEdge!.x).toBeGreaterThan(56 + 9);
  });

  test('two that would touch dodge sideways, and the worse keeps the straight place', () => {
    const placed = expectClear([mark(5, 500, 150), mark(6, 506, 150)]);
    expect(placed).toHaveLength(2);
    expect(placed.find(({ id }) => id === 5)!.x).toBe(500);
    expect(placed.find(({ id }) => id === 6)!.x).toBeGreaterThan(506);
  });

  test('crowded: 84 harmonics of one clock across the whole sweep', () => {
    const marks = Array.from({ length: 84 }, (_, i) =>
      mark(i + 1, 46 + (Math.log((i + 3) / 2.5) / Math.log(1000 / 30)) * 934, 95 + ((i * 37) % 60)),
    );
    const placed = expectClear(marks.filter(({ x }) => x < PLOT.right));
    expect(placed.length).toBeGreaterThan(40);
    expect(placed[0]!.id).toBe(1);
  });

  test('crowded: 200 candidates within 30 px leave most numbers out, never the worst', () => {
    const marks = Array.from({ length: 200 }, (_, i) => mark(i + 1, 400 + (i % 30), 100 + Math.floor(i / 30) * 3));
    const placed = expectClear(marks);
    expect(placed.length).toBeLessThan(30);
  });

  test('property: nothing ever overlaps, wherever the squares are and whatever text stands on the line', () => {
    const anywhere = fc.array(fc.tuple(fc.integer({ min: 46, max: 980 }), fc.integer({ min: 35, max: 265 })), {
      maxLength: 60,
    });
    fc.assert(
      fc.property(anywhere, fc.boolean(), (places, ringed) => {
        const marks = places.map(([x, y], i) => mark(i + 1, x, y, ringed && i === 2));
        expectClear(marks, [{ left: 54, right: 170, top: 70, bottom: 82 }]);
      }),
      { numRuns: 150 },
    );
  });

  test('the same marks always give the same places', () => {
    const marks = Array.from({ length: 40 }, (_, i) => mark(i + 1, 60 + ((i * 97) % 900), 95 + ((i * 53) % 150)));
    expect(placeLabels(marks, PLOT)).toEqual(placeLabels(marks, PLOT));
  });
});
