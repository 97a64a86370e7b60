import receiver from '@fixtures/published/receiver.json';
import { rbwChange, receiverNoiseDbuv, THERMAL_NOISE_DBM_PER_HZ } from '@/emc/receiverNoise';

const { noiseFloor } = receiver;

describe('noise of a receiver', () => {
  test('k T at 290 K is -173.9752 dBm in 1 Hz (SI definition, computed)', () => {
    expect(THERMAL_NOISE_DBM_PER_HZ).toBeCloseTo(noiseFloor.constant.kT0dBmPerHz, 4);
  });

  test.each(noiseFloor.rows)('$rbwHz Hz and $noiseFigureDb dB noise figure (computed table)', (row) => {
    expect(receiverNoiseDbuv(row.rbwHz, row.noiseFigureDb)).toBeCloseTo(row.noiseDbUv50ohm, 3);
  });

  test.each(noiseFloor.rbwChangeRows)(
    '$fromHz to $toHz Hz: noise by 10 log, impulses by 20 log (computed table)',
    (row) => {
      expect(rbwChange(row.fromHz, row.toHz).noiseDb).toBeCloseTo(row.noiseDb, 4);
      expect(rbwChange(row.fromHz, row.toHz).impulseDb).toBeCloseTo(row.impulseDb, 4);
    },
  );

  test('what is no RBW is refused', () => {
    expect(() => receiverNoiseDbuv(0, 10)).toThrow(new RangeError('RBW 0 Hz is not above zero.'));
    expect(() => rbwChange(9e3, -1)).toThrow(RangeError);
    expect(() => rbwChange(0, 9e3)).toThrow(RangeError);
  });
});
