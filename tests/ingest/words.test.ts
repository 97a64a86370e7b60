import { averageKind, detectorIn, detectorInHeading, modeHidesDetector } from '@/ingest/detectors';
import { frequencyUnitIn, levelUnitIn, proposeFrequencyUnit } from '@/ingest/units';

describe('detector words (common practice)', () => {
  test.each([
    [
      'peak',
      [
        'Peak',
        'MAXPEAK',
        'MAX PEAK',
        'Max peak',
        '+Peak',
        'CISPRPk',
        'CISPR peak',
        'PK+',
        'Pos Peak',
        'POSITIVE',
        'Pk',
      ],
    ],
    ['quasi-peak', ['QP', 'Quasi-Peak', 'QUASIPEAK', 'quasi peak', 'QPK', 'QPeak', 'CISPR QP', 'CisprQP']],
    [
      'average',
      ['Average', 'AVG', 'AV', 'AVER', 'CAV', 'CISPR average', 'CISPR-AV', 'Voltage average', 'Linear average'],
    ],
    ['log-average', ['Log average', 'Video average', 'Log-Pwr average', 'LOG AVG']],
    ['rms-average', ['RMS', 'RMS average', 'CISPR-RMS', 'Power average', 'RMS-AV']],
    ['sample', ['Sample', 'SAMP']],
    ['negative-peak', ['Neg peak', '-Peak', 'NEGATIVE', 'MIN PEAK', 'MINPEAK']],
    ['unknown', ['Normal', 'Auto peak', 'AUTOPEAK', 'Rosenfell', 'Auto']],
    [null, ['', '42', 'Frequency', 'On']],
  ] as const)('%s', (detector, words) => {
    expect(words.map((word) => [word, detectorIn(word)])).toEqual(words.map((word) => [word, detector]));
  });

  it('headings name a detector only in clear words', () => {
    expect(['Level A', 'Minimum', 'Normal', 'Port1', 'Peak (dBuV)', 'AVG', 'QP [dBµV]'].map(detectorInHeading)).toEqual(
      [null, null, null, null, 'peak', 'average', 'quasi-peak'],
    );
  });

  it('an average type decides between linear, logarithmic and power', () => {
    expect(['Voltage', 'Log-Pwr (Video)', 'Power (RMS)', 'Auto'].map(averageKind)).toEqual([
      'average',
      'log-average',
      'rms-average',
      null,
    ]);
    expect(['Average', 'VideoAvg', 'Min hold', 'MaxHold', 'CLR/WRITE', 'View'].map(modeHidesDetector)).toEqual([
      true,
      true,
      true,
      false,
      false,
      false,
    ]);
  });
});

describe('unit words', () => {
  test.each([
    ['dBuV', ['dBuV', 'dBµV', 'dBμV', 'dB(µV)', 'dB uV', 'DBUV', 'Level [dBµV]', 'Level_dBuV', 'dBÂµV', 'Unit: dBuV']],
    ['dBuV/m', ['dBuV/m', 'dB(µV/m)', 'dBµV / m', 'dBuVPerMeter', 'dB(uV)/m', 'dBuV per metre']],
    ['dBm', ['dBm', 'Amplitude (dBm)', 'DBM']],
    ['dBuA', ['dBuA', 'dB(µA)']],
    ['dBuA/m', ['dBµA/m']],
    ['dBpW', ['dBpW']],
    ['dB', ['dB', 'Diff (dB)', 'Correction [dB]']],
    ['dB/m', ['dB/m', 'AF [dB/m]', 'dB(1/m)']],
    ['V', ['Level (V)', '[V]']],
    ['uV', ['[µV]', '(uV)']],
    ['mW', ['(mW)']],
  ] as const)('%s', (unit, words) => {
    expect(words.map((word) => [word, levelUnitIn(word)?.unit])).toEqual(words.map((word) => [word, unit]));
  });

  it('what Stillfield does not hold is named but has no unit', () => {
    expect(['dBmV', 'dBV', 'dBm/Hz', 'dBc/Hz'].map((word) => levelUnitIn(word)?.unit)).toEqual([
      null,
      null,
      null,
      null,
    ]);
  });

  it('other words state no unit', () => {
    expect(
      ['feedback', 'V', 'Level V', 'Level A', 'Port1', 'vertical', 'dbase'].map((word) => levelUnitIn(word)),
    ).toEqual(Array(7).fill(null));
  });

  it('frequency units', () => {
    const words = ['Hz', 'KHz', 'Freq_MHz', 'Frequency / GHz', 'f [kHz]', 'FreqMHz', 'dBm/Hz', 'mHz', 'hertz', 'Level'];
    expect(words.map(frequencyUnitIn)).toEqual(['Hz', 'kHz', 'MHz', 'GHz', 'kHz', 'MHz', null, null, null, null]);
  });

  it('proposals for bare frequencies: band ends first, then size', () => {
    expect([
      proposeFrequencyUnit(30, 1000),
      proposeFrequencyUnit(0.15, 30),
      proposeFrequencyUnit(150, 30_000),
      proposeFrequencyUnit(1, 6),
      proposeFrequencyUnit(9, 150),
      proposeFrequencyUnit(30e6, 1e9),
      proposeFrequencyUnit(1388.8, 1411),
      proposeFrequencyUnit(1000, 1e6),
    ]).toEqual(['MHz', 'MHz', 'kHz', 'GHz', 'kHz', 'Hz', 'MHz', 'Hz']);
  });
});
