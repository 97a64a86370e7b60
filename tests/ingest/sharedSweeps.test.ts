import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { readFactorTable } from '@/ingest/factorTable';
import { readSweep } from '@/ingest/read';
import { recognise } from '@/ingest/recognise';
import type { Answers, Recognition } from '@/ingest/types';

/*
 * Files that others wrote, each with the result a script written for it alone came to (expected.json beside them).
 * They are not part of this repository; without the folder the suite says that it was left out.
 */
const folder = join(__dirname, '../../../shared/sweeps');
const present = existsSync(join(folder, 'expected.json'));

interface ExpectedTrace {
  name: string;
  points: number;
  first: number;
  last: number;
  min: number;
  min_at_hz: number;
  max: number;
  max_at_hz: number;
  detector?: string;
  trace_mode?: string;
  blank?: boolean;
  first_hz?: number;
  last_hz?: number;
}
interface Expected {
  verdict: 'import' | 'import_after_asking';
  ask?: string[];
  delimiter: string;
  decimal_mark: '.' | ',';
  encoding: string;
  line_ends: string;
  preamble_lines?: number;
  comment_lines?: number;
  header_row?: number | null;
  points: number;
  first_hz: number | null;
  last_hz: number | null;
  ascending: boolean;
  duplicate_frequencies: number;
  frequency_unit_in_file: string | null;
  frequency_unit_resolved?: string;
  frequency_is_offset_from_centre?: boolean;
  level_unit?: string | null;
  level_is_linear?: boolean;
  sweeps?: number;
  metadata?: Record<string, unknown>;
  traces: ExpectedTrace[];
}

const expected: Record<string, Expected> = present
  ? (JSON.parse(readFileSync(join(folder, 'expected.json'), 'utf8')) as { files: Record<string, Expected> }).files
  : {};
const names = Object.keys(expected);
const sweeps = names.filter((name) => !name.startsWith('factor-'));
const bytesOf = (name: string) => readFileSync(join(folder, name));

/** Within the conventions of expected.json: frequencies 1e-9 relative and 1 mHz, levels 1e-6. */
const sameHz = (a: number, b: number) => expect(Math.abs(a - b)).toBeLessThanOrEqual(1e-9 * Math.abs(b) + 1e-3);
const sameLevel = (a: number, b: number) => expect(Math.abs(a - b)).toBeLessThanOrEqual(1e-6);

/** What has to be answered before a sweep can be read; detector and bandwidth only decide what it proves. */
const NEEDED = ['frequencyUnit', 'levelUnit', 'centreHz', 'sweepIndex'];

function neededFor(file: Expected): string[] {
  const keys = new Set<string>();
  if (file.frequency_unit_in_file === null) keys.add('frequencyUnit');
  if (file.level_unit === null) keys.add('levelUnit');
  if (file.frequency_is_offset_from_centre) keys.add('centreHz');
  if ((file.sweeps ?? 1) > 1) keys.add('sweepIndex');
  return [...keys].sort();
}

function answersFor(file: Expected, recognition: Recognition, sweepIndex: number): Answers {
  return {
    sweepIndex,
    centreHz: 0,
    frequencyUnit: file.frequency_unit_resolved as Answers['frequencyUnit'],
    traces: recognition.traces.map(({ index, unit }) => ({ index, use: true, unit: unit ?? 'dBuV' })),
  };
}

function checkValues(frequencyHz: ArrayLike<number>, values: ArrayLike<number>, trace: ExpectedTrace) {
  expect(values.length).toBe(trace.points);
  sameLevel(values[0]!, trace.first);
  sameLevel(values[values.length - 1]!, trace.last);
  const list = Array.from(values);
  const [min, max] = [Math.min(...list), Math.max(...list)];
  sameLevel(min, trace.min);
  sameLevel(max, trace.max);
  sameHz(frequencyHz[list.indexOf(min)]!, trace.min_at_hz);
  sameHz(frequencyHz[list.indexOf(max)]!, trace.max_at_hz);
}

if (!present) {
  describe('shared sweep files', () => {
    it.skip('left out: the folder ../shared/sweeps is not there', () => undefined);
  });
} else {
  describe.each(sweeps)('%s against expected.json', (name) => {
    const file = expected[name]!;
    const recognition = recognise(bytesOf(name), name);

    it('has the shape that was expected', () => {
      expect(recognition).toMatchObject({ kind: 'sweep', refusal: null, encoding: file.encoding });
      expect(recognition.lineEnds).toBe(file.line_ends);
      expect(recognition.delimiter).toBe(file.delimiter === 'single space' ? 'space' : file.delimiter.trim());
      expect(recognition.decimalMark).toBe(file.decimal_mark);
      expect(recognition.preambleLines).toBe(file.preamble_lines);
      expect(recognition.headerLine).toBe(file.header_row);
    });

    it('has the frequency axis that was expected', () => {
      const { frequency } = recognition;
      expect(frequency.unit).toBe(file.frequency_unit_in_file === null ? null : (file.frequency_unit_resolved ?? 'Hz'));
      expect(frequency.proposedUnit).toBe(file.frequency_unit_resolved ?? 'Hz');
      expect(frequency.points).toBe(file.points);
      sameHz(frequency.firstHz, file.first_hz!);
      sameHz(frequency.lastHz, file.last_hz!);
      expect(frequency.ascending).toBe(file.ascending);
      expect(frequency.duplicates).toBe(file.duplicate_frequencies);
      expect(frequency.offset).toBe(file.frequency_is_offset_from_centre ?? false);
      expect(recognition.sweeps).toHaveLength(file.sweeps ?? 1);
    });

    it('asks what the file does not say, and only that', () => {
      const asked = new Set(
        recognition.questions.map(({ key }) => key as string).filter((key) => NEEDED.includes(key)),
      );
      expect([...asked].sort()).toEqual(neededFor(file));
      const proposed = recognition.questions.find(({ key }) => key === 'frequencyUnit')?.proposal;
      if (proposed !== undefined) expect(proposed).toBe(file.frequency_unit_resolved);
      // The list in expected.json is held too, word for word where it names a thing to ask.
      for (const ask of file.ask ?? []) {
        if (ask.startsWith('frequency unit')) expect(asked).toContain('frequencyUnit');
        if (ask.startsWith('level unit')) expect(asked).toContain('levelUnit');
        if (ask.startsWith('centre frequency')) expect(asked).toContain('centreHz');
      }
    });

    it('has the traces that were expected', () => {
      const several = (file.sweeps ?? 1) > 1;
      const traces = several ? file.traces.slice(0, 1) : file.traces;
      expect(recognition.traces.map((trace) => trace.name)).toEqual(traces.map((trace) => trace.name));
      for (const [i, trace] of traces.entries()) {
        const found = recognition.traces[i]!;
        expect(found.unit).toBe(file.level_unit);
        expect(found.blank).toBe(trace.blank ?? false);
        expect(found.linear).toBe(file.level_is_linear ?? false);
        if (trace.detector) expect(found.detectorAsWritten).toBe(trace.detector);
        if (trace.trace_mode) expect(found.mode).toBe(trace.trace_mode);
        sameLevel(found.first, trace.first);
        sameLevel(found.last, trace.last);
        sameLevel(found.min, trace.min);
        sameLevel(found.max, trace.max);
        sameHz(found.minAtHz, trace.min_at_hz);
        sameHz(found.maxAtHz, trace.max_at_hz);
      }
    });

    it('has the settings that were expected', () => {
      const { settings } = recognition;
      const said = file.metadata ?? {};
      const hold = (key: string, value: unknown) => {
        if (key in said) expect(value).toBe(said[key]);
      };
      hold('declared_points', settings.declaredPoints);
      hold('declared_start_hz', settings.startHz);
      hold('declared_stop_hz', settings.stopHz);
      hold('rbw_hz', settings.rbwHz);
      hold('vbw_hz', settings.vbwHz);
      hold('vbw_enabled', settings.vbwEnabled);
      hold('sweep_time_s', settings.sweepTimeS);
      hold('reference_level', settings.referenceLevel);
      hold('attenuation_db', settings.attenuationDb);
      hold('detector', recognition.traces[0]!.detectorAsWritten);
      hold('trace_mode', recognition.traces[0]!.mode);
      if (said.rbw_shape === 'CISPR' || said.rbw_filter_bw === '6dB') expect(settings.rbwShape).toBe('6 dB');
      if (said.preamp === 'OFF') expect(settings.preamplifier).toBe('off');
    });

    it('reads every point of every sweep', () => {
      const several = (file.sweeps ?? 1) > 1;
      for (const [i, trace] of file.traces.entries()) {
        const read = readSweep(bytesOf(name), recognition, answersFor(file, recognition, several ? i : 0));
        const own = several ? read.traces[0]! : read.traces[i]!;
        expect(own.name).toBe(trace.name);
        expect(read.frequencyHz).toHaveLength(file.points);
        checkValues(read.frequencyHz, own.values, trace);
      }
    });
  });

  describe('factor-cable-attenuation-negative-db.csv against expected.json', () => {
    const name = 'factor-cable-attenuation-negative-db.csv';
    const recognition = recognise(bytesOf(name), name);

    it('is a loss: the negative difference turned over; the phase column is no factor', () => {
      expect(recognition).toMatchObject({ kind: 'factor-table', questions: [] });
      expect(recognition.columns.map(({ role }) => role)).toEqual(['frequency', 'level', 'phase']);
      const tables = readFactorTable(bytesOf(name), recognition);
      const [trace] = expected[name]!.traces;
      expect(tables).toMatchObject([{ name: trace!.name, quantity: 'loss', unit: 'dB', unitStated: true }]);
      checkValues(
        tables[0]!.frequencyHz,
        tables[0]!.valueDb.map((value) => -value),
        trace!,
      );
    });
  });

  describe('factor-two-port-attenuator-hz-db.s2p against expected.json', () => {
    const name = 'factor-two-port-attenuator-hz-db.s2p';
    const recognition = recognise(bytesOf(name), name);

    it('holds the four parameters; the loss is minus S21', () => {
      expect(recognition).toMatchObject({ kind: 'factor-table', delimiter: 'space', questions: [] });
      expect(recognition.frequency).toMatchObject({ unit: 'Hz', points: 1601, firstHz: 50e6, lastHz: 7e9 });
      for (const trace of expected[name]!.traces) {
        const found = recognition.traces.find((one) => trace.name.startsWith(one.name))!;
        sameLevel(found.first, trace.first);
        sameLevel(found.min, trace.min);
        sameHz(found.minAtHz, trace.min_at_hz);
        sameLevel(found.max, trace.max);
        sameHz(found.maxAtHz, trace.max_at_hz);
      }
      const [table] = readFactorTable(bytesOf(name), recognition);
      expect(table).toMatchObject({ quantity: 'loss', unit: 'dB' });
      checkValues(
        table!.frequencyHz,
        table!.valueDb.map((value) => -value),
        expected[name]!.traces[0]!,
      );
    });
  });

  describe('factor-three-stacked-tables-ragged.csv against expected.json', () => {
    const name = 'factor-three-stacked-tables-ragged.csv';
    const recognition = recognise(bytesOf(name), name);

    it('is three tables that are not merged, and asks which, the frequency unit, and loss or gain', () => {
      expect(recognition).toMatchObject({ kind: 'factor-table', headerLine: 1 });
      expect(recognition.questions.map(({ key }) => key)).toEqual(['sweepIndex', 'frequencyUnit', 'lossOrGain']);
      expect(recognition.frequency.proposedUnit).toBe('Hz');
      const tables = readFactorTable(bytesOf(name), recognition, { frequencyUnit: 'Hz', lossOrGain: 'gain' });
      expect(tables.map((table) => table.name)).toEqual(expected[name]!.traces.map((trace) => trace.name));
      for (const [i, trace] of expected[name]!.traces.entries()) {
        checkValues(tables[i]!.frequencyHz, tables[i]!.valueDb, trace);
        sameHz(tables[i]!.frequencyHz[0]!, trace.first_hz!);
        sameHz(tables[i]!.frequencyHz.at(-1)!, trace.last_hz!);
      }
    });
  });
}
