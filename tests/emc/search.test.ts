import fc from 'fast-check';
import { axisSteps, STEP } from '@/emc/axis';
import { JUDGED, type PairPoints } from '@/emc/pair';
import { findCandidates, type Found } from '@/emc/search';
import { decide, severity, type Reach } from '@/emc/verdict';
import { repeatable, runThrough } from './given';

const REACH: Reach = { under: true, over: true, otherwise: 'needs-final' };
const RBW = 9e3;

function pairOf(
  marginDb: number[],
  more: { frequencyHz?: number[]; uncertaintyDb?: number[]; judged?: number[] } = {},
): PairPoints {
  const frequencyHz = Float64Array.from(more.frequencyHz ?? marginDb.map((_, i) => 1e6 + i * 4500));
  const uncertaintyDb = Float64Array.from(more.uncertaintyDb ?? marginDb.map(() => 4));
  return {
    frequencyHz,
    steps: axisSteps(frequencyHz, RBW),
    judged: Uint8Array.from(more.judged ?? marginDb.map(() => JUDGED.yes)),
    marginDb: Float64Array.from(marginDb),
    uncertaintyDb,
    guardDb: uncertaintyDb,
    between: true,
  };
}
const find = (pair: PairPoints, reach = REACH, nearest = 12): Found =>
  runThrough(findCandidates(pair, reach, RBW, nearest));

/** Noise of +-2 dB around a margin, the same every time. */
function noise(points: number, marginDb: number, seed = 1): number[] {
  const random = repeatable(seed);
  return Array.from({ length: points }, () => marginDb + 4 * (random() - 0.5));
}
/** A bell of emission: the margin sinks to `to` at `at`, 3 dB a point away from it. */
function emission(margins: number[], at: number, to: number): number[] {
  return margins.map((margin, i) => Math.min(margin, to + 3 * Math.abs(i - at)));
}

/** The points something listed stands for: those of its floor stretch, and those the margin climbs to from its peak. */
function stoodFor(pair: PairPoints, found: Found): Set<number> {
  const points = new Set<number>(found.peaks);
  for (const { from, to } of found.floors) for (let i = from; i < to; i++) points.add(i);
  for (const peak of found.peaks) {
    for (const direction of [-1, 1] as const) {
      for (let i = peak; ; i += direction) {
        const next = i + direction;
        const joined = pair.steps[direction === 1 ? next : i] === STEP.joined;
        if (next < 0 || next >= pair.marginDb.length || !joined || pair.judged[next] !== JUDGED.yes) break;
        if (pair.marginDb[next]! < pair.marginDb[i]!) break;
        points.add(next);
      }
    }
  }
  return points;
}

describe('candidates are local maxima of the emission not proven under', () => {
  test('one emission within U on a quiet floor is one candidate, at its smallest margin', () => {
    expect(find(pairOf(emission(noise(400, 30), 200, 3)))).toMatchObject({ peaks: [200], floors: [] });
  });

  test('a point exactly U under is not proven; one beyond is', () => {
    expect(find(pairOf([20, 4, 20])).peaks).toEqual([1]);
    expect(find(pairOf([20, 4.000001, 20])).peaks).toEqual([]);
    expect(find(pairOf([20, 4.000001, 20])).others).toEqual([1]);
  });

  test('ends of the axis count, a plateau counts once', () => {
    expect(find(pairOf([1, 9, 2, 2, 2, 9, 3])).peaks).toEqual([0, 2, 6]);
  });

  test('ripple on one emission is listed too: nothing unproven is dropped', () => {
    expect(find(pairOf([9, 3, 2, 2.5, 1, 3, 9])).peaks).toEqual([2, 4]);
  });

  test('a repeated frequency at a joined edge is one place; a new sweep over the same range has its own maxima', () => {
    const joined = pairOf([9, 3, 2, 1, 3, 9], { frequencyHz: [1, 2, 3, 3, 4, 5].map((k) => k * 4500) });
    expect(find(joined).peaks).toEqual([3]);
    const twice = pairOf([9, 1, 9, 9, 2, 9], { frequencyHz: [1, 2, 3, 1, 2, 3].map((k) => k * 4500) });
    expect(find(twice).peaks).toEqual([1, 4]);
  });

  test('a point beside one that could not be judged is an end', () => {
    const pair = pairOf([9, 3, 1, 2, 9], { judged: [JUDGED.yes, JUDGED.yes, JUDGED.noFactor, JUDGED.yes, JUDGED.yes] });
    expect(find(pair).peaks).toEqual([1, 3]);
  });

  test('where U falls from one point to the next, the worse side keeps its own candidate', () => {
    const pair = pairOf([9, 5, 4.9, 4.8, 9], { uncertaintyDb: [6, 6, 6, 2, 2] });
    expect(find(pair).peaks).toEqual([2]);
    expect(find(pair).others).toEqual([3]);
  });

  test('the nearest prominent maxima that are proven fill the list, smallest margin first', () => {
    const margins = noise(2000, 40);
    const spots = Array.from({ length: 20 }, (_, k) => [50 + 100 * k, 30 - k] as const);
    const found = find(pairOf(spots.reduce((all, [at, to]) => emission(all, at, to), margins)));
    expect(found.peaks).toEqual([]);
    expect(found.others).toEqual(
      spots
        .slice(-12)
        .map(([at]) => at)
        .reverse(),
    );
    expect(find(pairOf(margins), REACH, 0).others).toEqual([]);
  });

  test('an ambient run has no candidates of its own, only its nearest maxima', () => {
    const pair = pairOf(emission(noise(400, 30), 200, -3));
    const found = find(pair, { under: false, over: false, otherwise: 'not-covered' });
    expect(found).toMatchObject({ peaks: [], floors: [] });
    expect(found.others[0]).toBe(200);
  });
});

describe('a stretch whose noise floor is not proven under is one candidate', () => {
  const quiet = noise(300, 30);
  const loud = noise(500, 2, 2);

  test('it spans the stretch, first to last unproven point, with the worst point of the floor', () => {
    const { peaks, floors } = find(pairOf([...quiet, ...loud, ...quiet]));
    expect(peaks).toEqual([]);
    expect(floors).toHaveLength(1);
    expect(floors[0]).toMatchObject({ from: 300, to: 800 });
    expect(floors[0]!.worst).toBe(300 + loud.indexOf(Math.min(...loud)));
  });

  test('an emission 6 dB or more clear of it is a candidate of its own, and not the floor', () => {
    const margins = emission([...quiet, ...loud, ...quiet], 550, -5);
    const { peaks, floors } = find(pairOf(margins));
    expect(peaks).toEqual([550]);
    expect(floors).toHaveLength(1);
    expect(floors[0]!.worst).not.toBe(550);
    expect(margins[floors[0]!.worst]).toBeGreaterThan(-4.5);
  });

  test('each of several emissions clear of it is listed, not only the worst', () => {
    const margins = emission(emission([...quiet, ...loud, ...quiet], 450, -6), 650, -5);
    expect(find(pairOf(margins)).peaks).toEqual([450, 650]);
  });

  test('ripple on the flank of a clear emission is neither listed nor the worst of the floor', () => {
    const margins = emission([...quiet, ...loud, ...quiet], 550, -20);
    margins[552] = margins[551]! + 1;
    margins[553] = margins[552]! - 0.5;
    const { peaks, floors } = find(pairOf(margins));
    expect(peaks).toEqual([550]);
    expect(margins[floors[0]!.worst]).toBeGreaterThan(-4.5);
  });

  test('its worst point is listed even where a worse one beside the stretch takes its prominence', () => {
    const floor = Array.from({ length: 400 }, (_, i) => [4.6, 3.5, 4.6, 6][i % 4]!);
    const { peaks, floors } = find(pairOf([...floor, 4.6, 3.4, 3.6, -1.5, 4.2, -3, 9]));
    expect(peaks).toEqual([403, 405]);
    expect(floors).toEqual([{ from: 1, to: 404, worst: 401 }]);
  });

  test('broad emissions that leave more than half of the window proven are no floor', () => {
    const humps = Array.from({ length: 660 }, (_, i) => 1 + 0.5 * Math.abs((i % 33) - 16));
    const { peaks, floors } = find(pairOf(humps));
    expect(peaks).toEqual(Array.from({ length: 20 }, (_, k) => 16 + 33 * k));
    expect(floors).toEqual([]);
  });

  test('an emission less clear than that belongs to the floor, and is its worst point', () => {
    const { peaks, floors } = find(pairOf(emission([...quiet, ...loud, ...quiet], 550, -2.5)));
    expect(peaks).toEqual([]);
    expect(floors[0]!.worst).toBe(550);
  });

  test('a floor whose median is proven but whose noise is not is one candidate too', () => {
    const { peaks, floors } = find(pairOf([...quiet, ...noise(500, 5, 3), ...quiet]));
    expect(peaks).toEqual([]);
    expect(floors).toHaveLength(1);
  });

  test('a trace that can prove nothing is one floor from end to end, with its emissions', () => {
    const pair = pairOf(emission(noise(400, 30), 200, 10));
    const found = find(pair, { under: false, over: true, otherwise: 'needs-final' });
    expect(found).toMatchObject({ peaks: [200], floors: [{ from: 0, to: 400 }] });
  });

  test('a run of fewer points than the window has no floor: all its maxima are listed', () => {
    const found = find(pairOf(noise(100, 2, 2)));
    expect(found.floors).toEqual([]);
    expect(found.peaks.length).toBeGreaterThan(20);
  });

  test('an emission finely swept is not taken for a floor: the window is at least 20 bandwidths', () => {
    const finely = Array.from({ length: 4000 }, (_, i) => Math.min(30, 1 + ((i - 2000) / 100) ** 2));
    const pair = pairOf(finely, { frequencyHz: finely.map((_, i) => 1e6 + i * 90) });
    expect(find(pair)).toMatchObject({ peaks: [2000], floors: [] });
  });

  test('noise read without averaging scatters, and does not break into candidates', () => {
    const random = repeatable(5);
    const exponential = Array.from({ length: 5000 }, () => 2 - 10 * Math.log10(-Math.log(1 - random())));
    const found = find(pairOf(exponential));
    expect(found.floors).toHaveLength(1);
    // Some 1500 of the 5000 points are local maxima.
    expect(found.peaks.length).toBeLessThan(10);
  });
});

describe('whatever the margins (property)', () => {
  const anyPair = fc
    .record({
      kind: fc.constantFrom('steps', 'noise', 'both'),
      points: fc.integer({ min: 1, max: 700 }),
      seed: fc.integer(),
      level: fc.integer({ min: -6, max: 14 }),
      breaks: fc.array(fc.nat({ max: 700 }), { maxLength: 4 }),
    })
    .map(({ kind, points, seed, level, breaks }) => {
      const random = repeatable(seed);
      let walk = level;
      const margins = Array.from({ length: points }, () => {
        walk += Math.round((random() - 0.5) * 3);
        if (Math.abs(walk - level) > 10) walk = level;
        if (kind === 'steps') return walk;
        return (kind === 'noise' ? level : walk) + 6 * (random() - 0.5);
      });
      let hz = 1e6;
      const frequencyHz = margins.map((_, i) => {
        if (breaks[0] === i) hz = 5e5;
        return (hz += random() < 0.02 ? 0 : random() < 0.01 ? 100e3 : 4500);
      });
      const judged = margins.map((_, i) => (breaks[1] === i ? JUDGED.noFactor : JUDGED.yes));
      const uncertaintyDb = margins.map((_, i) => (i >= (breaks[2] ?? 0) && i < (breaks[3] ?? 0) ? 6 : 4));
      return pairOf(margins, { frequencyHz, judged, uncertaintyDb });
    });
  const anyReach = fc.record<Reach>({
    under: fc.boolean(),
    over: fc.boolean(),
    otherwise: fc.constantFrom('inconclusive', 'needs-final'),
  });
  const verdictOf = (pair: PairPoints, reach: Reach, i: number) =>
    decide(reach, pair.marginDb[i]!, { db: pair.guardDb[i]!, between: true });
  const judgedPoints = (pair: PairPoints) =>
    Array.from(pair.judged).flatMap((state, i) => (state === JUDGED.yes ? [i] : []));

  test('every point not proven under lies in a floor stretch or falls to a listed candidate', () => {
    fc.assert(
      fc.property(anyPair, anyReach, (pair, reach) => {
        const found = find(pair, reach);
        const stood = stoodFor(pair, found);
        const open = judgedPoints(pair).filter((i) => verdictOf(pair, reach, i) !== 'under');
        expect(open.filter((i) => !stood.has(i))).toEqual([]);
      }),
      { numRuns: 300 },
    );
  });

  test('nothing listed as open is proven under, and nothing listed as other is open', () => {
    fc.assert(
      fc.property(anyPair, anyReach, (pair, reach) => {
        const { peaks, floors, others } = find(pair, reach);
        for (const i of [...peaks, ...floors.map((floor) => floor.worst)])
          expect(verdictOf(pair, reach, i)).not.toBe('under');
        for (const i of others) expect(verdictOf(pair, reach, i)).toBe('under');
        expect(new Set(peaks).size).toBe(peaks.length);
      }),
      { numRuns: 200 },
    );
  });

  test('the worst verdict of any point is the verdict of something listed', () => {
    fc.assert(
      fc.property(anyPair, anyReach, (pair, reach) => {
        const { peaks, floors, others } = find(pair, reach);
        const listed = [...peaks, ...others, ...floors.map((floor) => floor.worst)];
        const worst = (points: number[]) => Math.min(...points.map((i) => severity(verdictOf(pair, reach, i))));
        expect(worst(listed)).toBe(worst(judgedPoints(pair)));
      }),
      { numRuns: 300 },
    );
  });
});
