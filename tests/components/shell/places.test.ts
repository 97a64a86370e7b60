import { drawerHeights, reachNear } from '@/components/shell/drawerDrag';
import { roomOf } from '@/components/shell/room';
import { isIn } from '@/components/shell/SectionNav';
import { spectrum, SPECTRUM_HEIGHT, SPECTRUM_WIDTH } from '@/components/shell/spectrum';
import { tiePath } from '@/components/shell/TieLine';

describe('design, section 2: the drawer of a phone', () => {
  const heights = drawerHeights(844);
  test('92 px, 358 px, full to 64 px below the top', () =>
    expect(heights).toEqual({ closed: 92, half: 358, full: 780 }));
  test('a low window never has a half that is higher than full', () =>
    expect(drawerHeights(360)).toEqual({ closed: 92, half: 296, full: 296 }));
  test.each([
    [100, 0, 'closed'],
    [224, 0, 'closed'],
    [226, 0, 'half'],
    [560, 0, 'half'],
    [580, 0, 'full'],
    [300, 2, 'full'],
    [300, -1, 'closed'],
  ] as const)('let go at %d px, moving %d px/ms, it is %s', (height, speed, reach) =>
    expect(reachNear(height, speed, heights)).toBe(reach),
  );
});

describe('design, section 7: the tie line', () => {
  const places = {
    figure: { left: 360, right: 400, top: 580, bottom: 600 },
    row: { left: 24, right: 1014, top: 574, bottom: 606 },
    heading: { left: 1065, right: 1367, top: 22, bottom: 44 },
    pane: { left: 0, right: 1038, top: 0, bottom: 835 },
    column: { left: 1038, right: 1390, top: 0, bottom: 835 },
  };
  test('leaves the figure’s foot, follows the row’s lower rule, climbs inside the margin, ends before the heading', () => {
    expect(tiePath(places)).toEqual({ line: 'M380 605.5H1052.5V33.5H1060', square: [1060, 31] });
  });
  test('of a figure that has scrolled away it starts at the edge of the table', () => {
    const gone = {
      ...places,
      figure: { ...places.figure, top: -80, bottom: -60 },
      row: { ...places.row, bottom: -54 },
    };
    expect(tiePath(gone).line).toBe('M1038 0H1052.5V33.5H1060');
    const below = {
      ...places,
      figure: { ...places.figure, top: 900, bottom: 920 },
      row: { ...places.row, bottom: 926 },
    };
    expect(tiePath(below).line).toBe('M1038 835H1052.5V33.5H1060');
  });
});

test('a section holds its own page and what lies below it, not what begins alike', () => {
  const jobs = { href: '/jobs', also: ['/samples'] };
  expect(isIn(jobs, '/jobs')).toBe(true);
  expect(isIn(jobs, '/jobs/abc')).toBe(true);
  expect(isIn(jobs, '/samples/abc')).toBe(true);
  expect(isIn(jobs, '/jobsheets')).toBe(false);
});

test('the room cookie is a device’s and anything unknown is paper', () => {
  expect([undefined, '', 'DIM', '<script>'].map(roomOf)).toEqual(['paper', 'paper', 'paper', 'paper']);
  expect(roomOf('dim')).toBe('dim');
});

describe('the spectrum of the sign-in page', () => {
  const drawn = spectrum();
  test('is the same on every request, so that server and browser agree', () => expect(spectrum()).toEqual(drawn));
  test('stays inside its box and under the line it hangs from', () => {
    const ys = [...drawn.trace.matchAll(/[ML][\d.]+ (-?[\d.]+)/g)].map((found) => Number(found[1]));
    expect(ys.length).toBeGreaterThan(SPECTRUM_WIDTH / 2);
    expect(Math.min(...ys)).toBeGreaterThan(0);
    expect(Math.max(...ys)).toBeLessThan(SPECTRUM_HEIGHT);
  });
  test('every thread ends on a peak of the trace', () => {
    const points = [...drawn.trace.matchAll(/[ML]([\d.]+) (-?[\d.]+)/g)].map((found) => [+found[1]!, +found[2]!]);
    for (const { x, y } of drawn.hung) {
      const near = points.filter(([px]) => Math.abs(px! - x * SPECTRUM_WIDTH) < 3).map(([, py]) => py!);
      expect(Math.abs(Math.min(...near) - y * SPECTRUM_HEIGHT)).toBeLessThan(4);
    }
  });
});
