import { bandParts } from '@/emc/cisprBands';
import { frequencyCount, scanSeconds } from '@/emc/scanTime';
import { readsLowDb, sweepPoints } from '@/emc/stepCheck';
import { scanTimeFinding } from '@/emc/timeCheck';
import {
  answer,
  count,
  hertz,
  level,
  ratio,
  resultOf,
  say,
  seconds,
  setting,
  start,
  times,
  type Answer,
  type Given,
  type Pane,
  type PaneField,
  type Term,
  type Working,
} from '../pane';
import { benchFields, benchNeeds, benchWorking } from './bench';

const SHAPES = [
  { value: '6', word: '6 dB down' },
  { value: '3', word: '3 dB down' },
] as const;
const MOST_STEPS = 1e8;

/** Step, points, scan time and bench time of one range. */
export const scan: Pane = {
  id: 'scan',
  title: 'Scan and bench time',
  about: 'Step, points and time of a scan, and of all its lines and positions at the bench.',
  fields: (choice) => [
    { kind: 'frequency', name: 'start', label: 'From', unit: 'MHz' },
    { kind: 'frequency', name: 'stop', label: 'To', unit: 'MHz' },
    { kind: 'frequency', name: 'rbw', label: 'RBW', unit: 'kHz', picks: ['0.2', '9', '120'] },
    { kind: 'choice', name: 'shape', label: 'RBW is measured', called: 'where the RBW is measured', choices: SHAPES },
    {
      kind: 'choice',
      name: 'by',
      label: 'Step is',
      called: 'step',
      choices: [
        { value: 'half', word: 'half the RBW' },
        { value: 'typed', word: 'typed' },
      ],
    },
    ...(choice('by') === 'typed' ? [{ kind: 'frequency', name: 'step', label: 'Step', unit: 'kHz' } as PaneField] : []),
    { kind: 'figure', name: 'dwell', label: 'Dwell at each frequency', unit: 'ms', range: 'above-zero' },
    {
      kind: 'choice',
      name: 'detector',
      label: 'Detector',
      called: 'detector',
      choices: [
        { value: 'peak', word: 'peak' },
        { value: 'quasi-peak', word: 'quasi-peak' },
      ],
    },
    ...benchFields(),
  ],
  compute: (given) => {
    const wrong = contradictions(given);
    const refused = Object.keys(wrong).length > 0;
    const one = (
      id: string,
      name: string,
      needs: string[],
      work: (...figures: number[]) => Working | string,
    ): Answer =>
      refused
        ? { id, name, working: null, because: 'waits for a range and a step' }
        : answer(id, name, given, needs, work);
    const half = given.choice('by') === 'half';
    const range = ['start', 'stop'];
    const stepNeeds = half ? ['by', 'rbw'] : given.choice('by') === 'typed' ? ['step'] : ['by'];
    const step = (): Term => start(setting(stepOf(given)!), 'step', half ? 'half the RBW' : 'as typed here');
    const span = (): Term[] => [
      start(hertz(given.figure('start')!), 'from'),
      start(hertz(given.figure('stop')!), 'to'),
    ];
    const points = () => frequencyCount(given.figure('start')!, given.figure('stop')!, stepOf(given)!);
    const scanS = () =>
      scanSeconds({
        startHz: given.figure('start')!,
        stopHz: given.figure('stop')!,
        bandwidthHz: given.figure('rbw')!,
        step: half ? 'half the bandwidth' : { stepHz: stepOf(given)! },
        time: { dwellS: given.figure('dwell')! / 1e3 },
      });
    const timed = [...range, 'rbw', ...stepNeeds, 'dwell'];
    const answers = [
      one('points', 'Frequencies', [...range, ...stepNeeds], () => ({
        formula: '(to − from) / step, rounded up, and one more',
        given: [...span(), step()],
        terms: [],
        result: count(points()),
        resultName: 'frequencies, both ends included',
        source: 'counting',
      })),
      one('sweep', 'Points of a sweep', [...range, 'rbw'], (startHz, stopHz, rbwHz) => ({
        formula: '2 (to − from) / RBW, up to the next odd number',
        given: [...span(), start(setting(rbwHz!), 'RBW')],
        terms: [],
        result: count(sweepPoints(startHz!, stopHz!, rbwHz!)),
        resultName: 'points at half the RBW',
        source: 'band presets as published; half the RBW is usual practice',
      })),
      one('low', 'A carrier in between reads low by up to', ['rbw', 'shape', ...stepNeeds], (rbwHz) => ({
        formula: given.choice('shape') === '6' ? '6.02 dB × (step / RBW)²' : '3.01 dB × (step / RBW)²',
        given: [step(), start(setting(rbwHz!), 'RBW'), start(ratio(stepOf(given)! / rbwHz!), 'step / RBW', null)],
        terms: [],
        result: level(readsLowDb(stepOf(given)!, rbwHz!, given.choice('shape') === '6' ? '6 dB' : '3 dB')),
        resultName: 'of a steady carrier midway between two frequencies',
        source: 'Gaussian filter; step of at most half the RBW is usual practice',
      })),
      one('time', 'One scan', timed, () => ({
        formula: null,
        given: [],
        terms: [
          start(count(points()), 'frequencies', 'worked out above'),
          times(seconds(given.figure('dwell')! / 1e3), 'dwell at each'),
        ],
        result: seconds(scanS()),
        resultName: 'one scan',
        source: 'dwells alone; the receiver’s own time between them is not known here',
      })),
      one('least', 'Least scan time', [...range, 'detector'], (startHz, stopHz) => leastTime(given, startHz!, stopHz!)),
      one('bench', 'At the bench', [...timed, ...benchNeeds(given)], () => benchWorking(given, scanS())),
    ];
    const [found, time, bench] = [resultOf(answers, 'points'), resultOf(answers, 'time'), resultOf(answers, 'bench')];
    const [least, stepHz, rbw] = [resultOf(answers, 'least'), stepOf(given), given.figure('rbw')];
    return {
      answers,
      says: !found
        ? null
        : bench
          ? say`${found} frequencies take ${time!}; at the bench it is ${bench} in all.`
          : time
            ? say`${found} frequencies take ${time}.`
            : say`The range has ${found} frequencies.`,
      cautions: [
        ...(stepHz !== null && rbw !== null && stepHz > (rbw / 2) * 1.01
          ? ['The step is wider than half the RBW, which usual practice asks for.']
          : []),
        ...(least && time && time.value < least.value
          ? ['One scan is shorter than the least scan time of its bands.']
          : []),
      ],
      wrong,
    };
  },
  holds: [
    'Half the RBW as the widest step is usual practice; how low a carrier may read is of a Gaussian filter.',
    'Least scan times: tables of CISPR 16-2-1 and 16-2-3, from memory; they have none above 1 GHz and none for other detectors.',
    'Every line, polarisation, height and azimuth is scanned with every other, going back and forth. Finals are not counted.',
    'Moving masts and turntables: the chamber’s own rules and its door interlock go before any time saved.',
  ],
};

function stepOf(given: Given): number | null {
  const rbw = given.figure('rbw');
  if (given.choice('by') === 'half') return rbw === null ? null : rbw / 2;
  return given.choice('by') === 'typed' ? given.figure('step') : null;
}

function contradictions(given: Given): Record<string, string> {
  const [from, to, step] = [given.figure('start'), given.figure('stop'), stepOf(given)];
  if (from === null || to === null) return {};
  if (to <= from) return { stop: 'This is not above where the range starts.' };
  if (step === null || (to - from) / step <= MOST_STEPS) return {};
  return { [given.choice('by') === 'half' ? 'rbw' : 'step']: 'More than 100 million steps would lie in this range.' };
}

/** The least times of the bands that a range runs through, added up. */
function leastTime(given: Given, startHz: number, stopHz: number): Working | string {
  const detector = given.choice('detector') === 'peak' ? 'peak' : 'quasi-peak';
  const parts = bandParts(startHz, stopHz).map((part) => ({ part, found: scanTimeFinding(part, detector, null) }));
  if (parts.some(({ found }) => found.figures.leastS === null)) {
    return 'the table of least scan times has no rate for part of this range';
  }
  const terms = parts.map(({ part, found }, at): Term => ({
    sign: at === 0 ? '' : '+',
    quantity: seconds(found.figures.leastS!),
    name: `band ${part.band!.band}, ${detector}`,
    source: `${found.source}, from memory`,
  }));
  return {
    formula: null,
    given: [start(hertz(startHz), 'from'), start(hertz(stopHz), 'to')],
    terms,
    result: seconds(terms.reduce((sum, { quantity }) => sum + quantity!.value, 0)),
    resultName: `least time of a scan in ${detector}`,
    source: 'CISPR 16-2-1 and 16-2-3, from memory',
  };
}
