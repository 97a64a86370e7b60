import uncertainties from '@fixtures/published/uncertainty.json';
import { DETECTORS, LINE_DETECTORS, PURPOSES, VERDICTS, type Detector, type Verdict } from '@/emc/kinds';
import { bandwidthText, readingVerdict, worstVerdict, type ReadingFacts } from '@/emc/verdict';

const AS_ASKED: ReadingFacts = {
  marginDb: 5,
  uncertaintyDb: 3,
  detector: 'quasi-peak',
  rbwHz: 120e3,
  lineDetector: 'quasi-peak',
  requiredBandwidthHz: 120e3,
  purpose: 'final',
};
const verdictOf = (facts: Partial<ReadingFacts>) => readingVerdict({ ...AS_ASKED, ...facts }).verdict;

describe('a final in the detector and bandwidth asked for (guarded by U)', () => {
  test.each(uncertainties.guardedDecision.rows)(
    'reading $reading against $limit with U $expandedUDb: $guardedAcceptance (ILAC-G8:09/2019, w = U)',
    ({ reading, limit, expandedUDb, guardedAcceptance }) => {
      const marginDb = limit - reading;
      const verdict = verdictOf({ marginDb, uncertaintyDb: expandedUDb });
      // The published table accepts a margin of exactly U; here it takes more than U, so such a row is inconclusive.
      const beyond = marginDb > expandedUDb;
      expect(verdict).toBe(beyond ? 'under' : 'inconclusive');
      if (guardedAcceptance !== 'pass') expect(verdict).not.toBe('under');
    },
  );

  test.each<[number, Verdict]>([
    [3.0001, 'under'],
    [3, 'inconclusive'],
    [0, 'inconclusive'],
    [-3, 'inconclusive'],
    [-3.0001, 'over'],
  ])('margin %d with U 3 is %s (under if m > U, over if m < -U)', (marginDb, verdict) => {
    expect(verdictOf({ marginDb })).toBe(verdict);
  });
});

describe('the whole table: detector x line x bandwidth x margin x purpose (the rule written a second time)', () => {
  const ORDER: Partial<Record<Detector, number>> = { average: 1, 'quasi-peak': 2, peak: 3 };
  const BANDWIDTHS = { unknown: null, narrower: 100e3, equal: 120e3, wider: 1e6 } as const;
  const MARGINS = {
    'far under': 10,
    'just under': 3.01,
    'at U': 3,
    'on the limit': 0,
    'at -U': -3,
    'just over': -3.01,
  } as const;

  function expected(
    purpose: string,
    read: Detector,
    asked: Detector,
    width: keyof typeof BANDWIDTHS,
    m: number,
  ): Verdict {
    if (purpose === 'ambient') return 'not-covered';
    const place = ORDER[read];
    const line = ORDER[asked]!;
    if (purpose === 'final' && read === asked && width === 'equal') {
      return m > 3 ? 'under' : m < -3 ? 'over' : 'inconclusive';
    }
    if (place === undefined || width === 'unknown') return 'needs-final';
    if (m > 3 && place >= line && (width === 'equal' || width === 'wider')) return 'under';
    if (m < -3 && place <= line && (width === 'equal' || width === 'narrower')) return 'over';
    return 'needs-final';
  }

  const rows = PURPOSES.flatMap((purpose) =>
    DETECTORS.flatMap((detector) => LINE_DETECTORS.map((lineDetector) => ({ purpose, detector, lineDetector }))),
  );
  test.each(rows)('$purpose in $detector against $lineDetector', ({ purpose, detector, lineDetector }) => {
    for (const width of Object.keys(BANDWIDTHS) as (keyof typeof BANDWIDTHS)[]) {
      for (const [name, marginDb] of Object.entries(MARGINS)) {
        const facts = { ...AS_ASKED, purpose, detector, lineDetector, rbwHz: BANDWIDTHS[width], marginDb };
        const { verdict, because } = readingVerdict(facts);
        const table = expected(purpose, detector, lineDetector, width, marginDb);
        expect([width, name, verdict]).toEqual([width, name, table]);
        if (verdict === 'under' || verdict === 'over') expect(because).toBeNull();
        else expect(because).toMatch(/^[A-Z].*\.$/);
      }
    }
  });
});

describe('what is missing is not covered', () => {
  test('no margin, no uncertainty and an ambient run each say so', () => {
    expect(readingVerdict({ ...AS_ASKED, marginDb: null }).verdict).toBe('not-covered');
    expect(readingVerdict({ ...AS_ASKED, uncertaintyDb: null }).verdict).toBe('not-covered');
    expect(readingVerdict({ ...AS_ASKED, purpose: 'ambient', marginDb: -20 })).toEqual({
      verdict: 'not-covered',
      because: 'An ambient run does not judge the sample.',
    });
  });

  test('a margin or an uncertainty that is no figure is refused', () => {
    expect(() => verdictOf({ marginDb: NaN })).toThrow(RangeError);
    expect(() => verdictOf({ uncertaintyDb: -1 })).toThrow(RangeError);
    expect(() => verdictOf({ uncertaintyDb: Infinity })).toThrow(RangeError);
  });
});

describe('why a reading cannot decide', () => {
  const because = (facts: Partial<ReadingFacts>) =>
    readingVerdict({ ...AS_ASKED, purpose: 'prescan', ...facts }).because;
  test.each<[string, Partial<ReadingFacts>, RegExp]>([
    ['the detector is below the line', { detector: 'average' }, /average can lie below quasi-peak/],
    ['the detector is above the line', { detector: 'peak', marginDb: -9 }, /peak can lie above quasi-peak/],
    ['the bandwidth is narrower', { rbwHz: 100e3 }, /RBW 100 kHz is narrower than the 120 kHz required/],
    ['the bandwidth is wider', { rbwHz: 1e6, marginDb: -9 }, /RBW 1 MHz is wider than the 120 kHz required/],
    [
      'the video bandwidth is narrower',
      { detector: 'peak', vbwHz: 100 },
      /^VBW 100 Hz is narrower than RBW 120 kHz, so the reading is a video average\.$/,
    ],
    [
      'the filter is stated at 3 dB',
      { rbwShape: '3 dB', marginDb: -9 },
      /^RBW 120 kHz at 3 dB is wider than the 120 kHz required/,
    ],
    ['the bandwidth is no round figure', { rbwHz: 100e3 / 3 }, /RBW 33\.33 kHz is narrower than the 120 kHz/],
    ['the bandwidth is not known', { rbwHz: null }, /RBW is not known; the limit asks for 120 kHz/],
    ['the detector is not known', { detector: 'unknown' }, /detector is not known/],
    ['the detector proves nothing', { detector: 'log-average' }, /log-average shows neither under nor over/],
    ['the margin is within U', { marginDb: 1 }, /within the expanded uncertainty; a final in quasi-peak at 120 kHz/],
    ['a final is within U', { marginDb: 1, purpose: 'final' }, /another reading would not settle it/],
  ])('%s', (_, facts, sentence) => {
    expect(because(facts)).toMatch(sentence);
  });

  test('a final behind a 3 dB filter, or a narrow VBW, needs another one', () => {
    expect(verdictOf({ rbwShape: '3 dB', marginDb: -9 })).toBe('needs-final');
    expect(verdictOf({ rbwShape: '3 dB', marginDb: 1 })).toBe('needs-final');
    expect(verdictOf({ rbwShape: '3 dB', marginDb: 9 })).toBe('under');
    expect(verdictOf({ vbwHz: 10e3, marginDb: 9 })).toBe('needs-final');
  });

  test.each<[number, string]>([
    [200, '200 Hz'],
    [9e3, '9 kHz'],
    [120e3, '120 kHz'],
    [1e6, '1 MHz'],
    [120e3 * 1.1 - 1e-7, '132 kHz'],
    [999.99, '1 kHz'],
    [999_999, '1 MHz'],
    [1 / 3, '0.3333 Hz'],
  ])('%d Hz is written as %s', (hz, text) => {
    expect(bandwidthText(hz)).toBe(text);
  });

  test('no sentence says pass or fail', () => {
    for (const detector of DETECTORS) {
      for (const marginDb of [-9, 0, 9]) {
        for (const rbwHz of [null, 9e3, 120e3, 1e6]) {
          expect(because({ detector, marginDb, rbwHz }) ?? '').not.toMatch(/pass|fail/i);
        }
      }
    }
  });
});

test('the worst of verdicts is over, needs a final, inconclusive, not covered, under, in this order', () => {
  expect([...VERDICTS]).toEqual(['over', 'needs-final', 'inconclusive', 'not-covered', 'under']);
  VERDICTS.forEach((worse, i) => {
    for (const better of VERDICTS.slice(i)) {
      expect(worstVerdict([better, worse])).toBe(worse);
      expect(worstVerdict([worse, better])).toBe(worse);
    }
  });
  expect(worstVerdict([])).toBeNull();
});
