import {
  bandsIn,
  levelRange,
  marginRange,
  plotScale,
  SHEET_INSETS,
  valueTicks,
  wholeSpan,
} from '@/components/charts/scale';
import { frequencyTicks, rulerTicks } from '@/components/charts/frequencyTicks';
import { figureWidthPx } from '@/components/charts/textWidth';

const RADIATED = { fromHz: 30e6, toHz: 1e9 };
const MAINS = { fromHz: 150e3, toHz: 30e6 };

describe('the axes of a frame (DESIGN section 8: 990 × 316, insets 46, 10, 30, 46)', () => {
  const frame = { width: 990, height: 316, ...SHEET_INSETS };
  const scale = plotScale(frame, RADIATED, { top: 12, bottom: -38 });

  test('the plot is 934 × 240 px and 50 dB stand on 240 px', () => {
    expect([scale.left, scale.right, scale.top, scale.bottom]).toEqual([46, 980, 30, 270]);
    expect(scale.y(0)).toBeCloseTo(30 + 12 * 4.8, 9);
    expect(scale.y(-10) - scale.y(0)).toBeCloseTo(48, 9);
  });

  test('x is linear in log f: equal ratios are equally wide, and both ways agree', () => {
    expect(scale.x(60e6) - scale.x(30e6)).toBeCloseTo(scale.x(600e6) - scale.x(300e6), 9);
    for (const hz of [30e6, 36.006e6, 144.018e6, 1e9]) expect(scale.hz(scale.x(hz)) / hz).toBeCloseTo(1, 12);
    expect(scale.value(scale.y(-2.6))).toBeCloseTo(-2.6, 9);
  });
});

describe('CISPR bands (CISPR 16-1-1: A 9–150 kHz, B 0.15–30 MHz, C 30–300 MHz, D 300–1000 MHz, E above)', () => {
  test.each([
    ['a radiated sweep', RADIATED, 'C D'],
    ['a mains sweep', MAINS, 'B'],
    ['9 kHz to 30 MHz', { fromHz: 9e3, toHz: 30e6 }, 'A B'],
    ['above 1 GHz', { fromHz: 1e9, toHz: 6e9 }, 'E'],
  ])('%s', (_, span, names) => {
    expect(
      bandsIn(span)
        .map((band) => band.name)
        .join(' '),
    ).toBe(names);
  });

  test('a run that ends one step before a band edge is drawn up to it; one that does not is left alone', () => {
    expect(wholeSpan(30e6, 999.975e6)).toEqual(RADIATED);
    expect(wholeSpan(150e3, 29.9985e6)).toEqual(MAINS);
    expect(wholeSpan(88e6, 108e6)).toEqual({ fromHz: 88e6, toHz: 108e6 });
  });

  test('a run of one point still has a width', () => {
    const { fromHz, toHz } = wholeSpan(100e6, 100e6);
    expect(toHz).toBeGreaterThan(fromHz);
  });
});

describe('the dB axis', () => {
  test('+12 to −38, growing by 10 to fit (DESIGN section 8)', () => {
    expect(marginRange(null, null)).toEqual({ top: 12, bottom: -38 });
    expect(marginRange(6.2, -31)).toEqual({ top: 12, bottom: -38 });
    expect(marginRange(11.4, -44)).toEqual({ top: 22, bottom: -48 });
    expect(marginRange(35, -38)).toEqual({ top: 42, bottom: -38 });
  });

  test('a stray reading far below does not crush the chart', () => {
    expect(marginRange(0, -240).bottom).toBe(-98);
  });

  test('the level axis ends on tens and keeps the limit off its edge', () => {
    expect(levelRange(47, 8)).toEqual({ top: 60, bottom: 2 });
    expect(levelRange(66, 5).top).toBe(80);
  });

  test('numbers are multiples of ten, of twenty when they would stand too close', () => {
    expect(valueTicks({ top: 12, bottom: -38 }, 240)).toEqual([-30, -20, -10, 0, 10]);
    expect(valueTicks({ top: 12, bottom: -98 }, 120)).toEqual([-80, -60, -40, -20, 0]);
  });
});

describe('frequency numbers', () => {
  const text = (span: typeof RADIATED, width: number) => frequencyTicks(span, width).labels.map((label) => label.text);

  test('30 to 1000 MHz on the sheet: as in the picture of the design', () => {
    expect(text(RADIATED, 934).join(' ')).toBe('30 40 50 60 80 100 150 200 300 400 500 600 1000 MHz');
  });

  test('30 to 1000 MHz on a phone', () => {
    expect(text(RADIATED, 334).join(' ')).toBe('30 50 100 200 300 1000 MHz');
  });

  test('the unit follows the span', () => {
    expect(text(MAINS, 934).at(-1)).toBe('30 MHz');
    expect(text({ fromHz: 9e3, toHz: 150e3 }, 934).at(-1)).toBe('150 kHz');
    expect(text({ fromHz: 1e9, toHz: 6e9 }, 934).at(-1)).toBe('6 GHz');
  });

  test.each([934, 700, 480, 334])(
    'no two numbers come closer than 12 px at %d px, however far it is zoomed',
    (width) => {
      for (const span of [RADIATED, MAINS, { fromHz: 143e6, toHz: 146e6 }, { fromHz: 143.9e6, toHz: 144.1e6 }]) {
        const { labels } = frequencyTicks(span, width);
        const scale = plotScale({ width, height: 1, left: 0, right: 0, top: 0, bottom: 0 }, span, {
          top: 1,
          bottom: 0,
        });
        const boxes = labels.map(({ hz, text: shown, anchor }) => {
          const wide = figureWidthPx(shown, 12);
          const left = scale.x(hz) - (anchor === 'start' ? 0 : anchor === 'end' ? wide : wide / 2);
          return [left, left + wide] as const;
        });
        for (let i = 1; i < boxes.length; i++) expect(boxes[i]![0] - boxes[i - 1]![1]).toBeGreaterThanOrEqual(11.9);
        expect(new Set(labels.map((label) => label.text)).size).toBe(labels.length);
      }
    },
  );

  test('ruler ticks stay apart, and whole multiples of a decade are tall', () => {
    const ticks = rulerTicks(RADIATED, 934);
    const x = (hz: number) => (Math.log(hz / 30e6) / Math.log(1000 / 30)) * 934;
    for (let i = 1; i < ticks.length; i++) expect(x(ticks[i]!.hz) - x(ticks[i - 1]!.hz)).toBeGreaterThan(3);
    const tall = ticks.filter((tick) => tick.tall).map((tick) => tick.hz / 1e6);
    expect(tall).toEqual([30, 40, 50, 60, 70, 80, 90, 100, 200, 300, 400, 500, 600, 700, 800, 900, 1000]);
  });
});
