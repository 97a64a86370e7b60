import fc from 'fast-check';
import { hangTrace, judgeSegment } from '@/emc/segment';
import { publishedLine, tableOf, termOf, traceOf } from './given';

const QP = publishedLine('cispr32-b-ce-qp');
const AV = publishedLine('cispr32-b-ce-av');
const terms = [
  termOf(
    tableOf('loss', [
      [0.2, 0.5],
      [20, 1.5],
    ]),
  ),
];

describe('points of a trace with their margins', () => {
  test('margin is limit - level: under is positive, over is negative', () => {
    const trace = traceOf([50, 56, 62], { frequencyHz: [1e6, 2e6, 3e6] });
    const { level, marginDb } = judgeSegment(hangTrace(trace, [], [QP]), trace.frequencyHz, trace.reading);
    expect(Array.from(level)).toEqual([50, 56, 62]);
    expect(Array.from(marginDb)).toEqual([6, 0, -6]);
  });

  test('quasi-peak hangs from the quasi-peak line, average from the average line, on the same point', () => {
    const margin = (detector: 'quasi-peak' | 'average') => {
      const trace = traceOf([40], { frequencyHz: [1e6], detector });
      return judgeSegment(hangTrace(trace, [], [AV, QP]), trace.frequencyHz, trace.reading).marginDb[0];
    };
    expect(margin('quasi-peak')).toBe(16);
    expect(margin('average')).toBe(6);
  });

  test('a trace over 1 GHz hangs from the peak line where it has a limit and from quasi-peak below', () => {
    const lines = ['cispr32-b-re-1g-pk', 'cispr32-b-re-3m'].map(publishedLine);
    const trace = traceOf([40, 40, 40], { frequencyHz: [999e6, 1e9, 2e9], detector: 'peak', unit: 'dBuV/m' });
    const { marginDb } = judgeSegment(hangTrace(trace, [], lines), trace.frequencyHz, trace.reading);
    expect(Array.from(marginDb)).toEqual([7, 30, 30]);
  });

  test('a piece of a trace gives the same bits as the whole: a window needs only its own points (property)', () => {
    const points = fc.array(fc.tuple(fc.integer({ min: 1, max: 310 }), fc.float({ min: -50, max: 90, noNaN: true })), {
      minLength: 1,
      maxLength: 60,
    });
    fc.assert(
      fc.property(points, fc.nat(), fc.constantFrom('dBuV', 'dBm'), (rows, cut, unit) => {
        const trace = traceOf(
          rows.map(([, db]) => db),
          { frequencyHz: rows.map(([k]) => k * 1e5), unit: unit as 'dBuV' },
        );
        const hung = hangTrace(trace, terms, [QP, AV]);
        const whole = judgeSegment(hung, trace.frequencyHz, trace.reading);
        const from = cut % rows.length;
        const piece = judgeSegment(hung, trace.frequencyHz.subarray(from), trace.reading.subarray(from));
        expect(piece.state).toEqual(whole.state.subarray(from));
        expect(piece.hasMargin).toEqual(whole.hasMargin.subarray(from));
        expect(piece.level).toEqual(whole.level.subarray(from));
        expect(piece.marginDb).toEqual(whole.marginDb.subarray(from));
      }),
    );
  });
});
