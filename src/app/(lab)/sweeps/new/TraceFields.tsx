'use client';

import { detector as detectors, levelUnit, type Detector, type LevelUnit } from '@/schemas/common';
import { CheckField } from '@/components/ui/CheckField';
import { Field, SelectField } from '@/components/ui/Field';
import { formatFigure, unitLabel } from '@/format/quantities';
import { DETECTOR_WORDS } from '@/format/words';
import type { SweepFileView } from '@/schemas/sweepFile';
import type { TraceDraft } from './draftTypes';

interface Props {
  file: SweepFileView;
  traces: TraceDraft[];
  /** Messages by field, `traces/0/unit`, where 0 counts the used traces. */
  errors: Readonly<Record<string, string>>;
  onChange: (index: number, change: Partial<TraceDraft>) => void;
}

const UNIT_WORDS: Partial<Record<LevelUnit, string>> = {
  V: 'V, linear',
  mV: 'mV, linear',
  uV: 'µV, linear',
  W: 'W, linear',
  mW: 'mW, linear',
  dB: 'dB, relative',
};

/** Each trace of the file: whether it is used, and its unit, detector and bandwidth; what is not stated is asked. */
export function TraceFields({ file, traces, errors, onChange }: Props) {
  const { recognition } = file;
  let used = -1;
  return (
    <div className="grid gap-3">
      {traces.map((trace) => {
        const stated = recognition.traces.find(({ index }) => index === trace.index)!;
        if (trace.use) used++;
        const at = used;
        const proposal = (key: 'levelUnit' | 'detector' | 'rbwHz') =>
          recognition.questions.find((q) => q.key === key && (q.traceIndex === trace.index || q.traceIndex === null))
            ?.proposal ?? null;
        const its = file.asBefore?.traces.find(({ index }) => index === trace.index);
        const as = `not stated; as in ${file.asBefore?.run.number}`;
        const unitProposal = proposal('levelUnit') as LevelUnit | null;
        const rbwProposal = proposal('rbwHz');
        return (
          <fieldset key={trace.index} className="border-t border-rule pt-2">
            <legend className="sr-only">{trace.name}</legend>
            <CheckField
              label={
                <>
                  {trace.name}{' '}
                  <span className="t-figure text-ink2">
                    {formatFigure(stated.min, stated.linear ? 6 : 1)} to{' '}
                    {formatFigure(stated.max, stated.linear ? 6 : 1)}
                  </span>
                  {stated.blank ? ' unused' : ''}
                </>
              }
              checked={trace.use}
              onChange={(event) => onChange(trace.index, { use: event.target.checked })}
            />
            {trace.use && (
              <div className="mt-1 grid grid-cols-3 gap-2.5 max-pad:grid-cols-1">
                <SelectField
                  label="Level in"
                  value={trace.unit}
                  required
                  error={errors[`traces/${at}/unit`]}
                  hint={
                    trace.unit === '' && unitProposal
                      ? `not stated; ${unitLabel(unitProposal)} is likely`
                      : stated.unit === null && its?.unit === trace.unit
                        ? as
                        : undefined
                  }
                  onChange={(event) => onChange(trace.index, { unit: event.target.value as LevelUnit })}
                >
                  {trace.unit === '' && <option value="">say which</option>}
                  {levelUnit.options.map((unit) => (
                    <option key={unit} value={unit}>
                      {UNIT_WORDS[unit] ?? unitLabel(unit)}
                    </option>
                  ))}
                </SelectField>
                <SelectField
                  label="Detector"
                  value={trace.detector}
                  required
                  error={errors[`traces/${at}/detector`]}
                  hint={
                    trace.detector === 'unknown'
                      ? 'proves nothing'
                      : trace.detector === ''
                        ? 'not stated'
                        : stated.detector === null && its?.detector === trace.detector
                          ? as
                          : undefined
                  }
                  onChange={(event) => onChange(trace.index, { detector: event.target.value as Detector })}
                >
                  {trace.detector === '' && <option value="">say which</option>}
                  {detectors.options.map((detector) => (
                    <option key={detector} value={detector}>
                      {detector === 'average'
                        ? 'average (linear, CISPR)'
                        : detector === 'unknown'
                          ? 'not known'
                          : DETECTOR_WORDS[detector]}
                    </option>
                  ))}
                </SelectField>
                <Field
                  label="RBW"
                  unit="kHz"
                  inputMode="decimal"
                  value={trace.rbwKhz}
                  error={errors[`traces/${at}/rbwHz`]}
                  hint={
                    trace.rbwKhz === ''
                      ? rbwProposal
                        ? `not stated; ${Number(rbwProposal) / 1e3} kHz is usual`
                        : 'unknown proves nothing'
                      : recognition.settings.rbwHz === null && its?.rbwHz === Number(trace.rbwKhz) * 1e3
                        ? as
                        : undefined
                  }
                  onChange={(event) => onChange(trace.index, { rbwKhz: event.target.value })}
                />
              </div>
            )}
          </fieldset>
        );
      })}
    </div>
  );
}
