import { benchTime, type BenchPart, type Positions, type ScanPlan } from '@/emc/benchTime';
import { formatCount } from '@/format/quantities';
import { seconds, type Given, type PaneField, type Term, type Working } from '../pane';

const POSITIONS = [
  { name: 'lines', label: 'Lines', one: 'line' },
  { name: 'polarisations', label: 'Polarisations', one: 'polarisation' },
  { name: 'heights', label: 'Heights', one: 'height' },
  { name: 'azimuths', label: 'Azimuths', one: 'azimuth' },
] as const;

/** Stands above the fields of the bench. */
const GROUP = 'At the bench';

/** Counts of positions, the time each change takes, and the set-up. */
export function benchFields(): PaneField[] {
  return [
    ...POSITIONS.flatMap(({ name, label, one }): PaneField[] => [
      { kind: 'figure', name, group: GROUP, label, unit: 'in all', range: 'count' },
      {
        kind: 'figure',
        name: `${name}-s`,
        group: GROUP,
        label: `Each change of ${one}`,
        unit: 's',
        range: 'not-negative',
      },
    ]),
    {
      kind: 'figure',
      name: 'setup',
      group: GROUP,
      label: 'Set-up before the first scan',
      unit: 'min',
      range: 'not-negative',
    },
  ];
}

/** A change needs its time only where there is something to change to. */
export function benchNeeds(given: Given): string[] {
  return [
    ...POSITIONS.flatMap(({ name }) => [name, (given.figure(name) ?? 1) > 1 ? `${name}-s` : `${name}-s?`]),
    'setup',
  ];
}

/** One of them, and several. */
const PART_WORDS: Partial<Record<BenchPart, readonly [string, string]>> = {
  'set-up': ['set-up', 'set-ups'],
  scan: ['scan', 'scans'],
  'line change': ['change of line', 'changes of line'],
  'polarisation change': ['change of polarisation', 'changes of polarisation'],
  'height change': ['change of height', 'changes of height'],
  'azimuth change': ['change of azimuth', 'changes of azimuth'],
};

function partName(part: BenchPart, times: number): string {
  const [one, several] = PART_WORDS[part] ?? [part, part];
  return times === 1 ? one : `${formatCount(times)} ${several}`;
}

/** The time at the bench as lines that add up. `scanS` is one scan. */
export function benchWorking(given: Given, scanS: number): Working {
  const positions = (name: string): Positions => ({
    count: given.figure(name)!,
    changeS: given.figure(`${name}-s`) ?? 0,
  });
  const plan: ScanPlan = {
    name: 'scan',
    startHz: given.figure('start')!,
    stopHz: given.figure('stop')!,
    bandwidthHz: given.figure('rbw')!,
    step: 'half the bandwidth',
    time: { scanS },
    setUpS: 0,
    lines: positions('lines'),
    polarisations: positions('polarisations'),
    heights: positions('heights'),
    azimuths: positions('azimuths'),
  };
  const { lines, totalS } = benchTime({ setUpS: given.figure('setup')! * 60, scans: [plan], finals: [] });
  return {
    formula: null,
    given: [],
    terms: lines.map((line, at): Term => ({
      sign: at === 0 ? '' : '+',
      quantity: seconds(line.seconds),
      name: partName(line.part, line.count),
      source: line.part === 'scan' ? 'one scan worked out above' : 'as typed here',
    })),
    result: seconds(totalS),
    resultName: 'at the bench, without finals',
    source: 'every line, polarisation, height and azimuth with every other',
  };
}
