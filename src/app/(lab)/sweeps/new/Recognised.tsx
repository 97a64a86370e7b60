import type { ReactNode } from 'react';
import type { RecognitionView } from '@/schemas/sweepFile';
import { formatBandwidth, formatFrequency } from '@/format/frequencies';
import { formatCount, formatFigure, unitLabel } from '@/format/quantities';
import { DETECTOR_WORDS } from '@/format/words';

const LAYOUTS: Record<RecognitionView['layout'], string> = {
  pairs: 'a row per frequency',
  'hop-rows': 'a row per hop',
  'time-rows': 'a row per sweep',
};

/** What was recognised in a file, with the evidence for each. */
export function Recognised({ recognition }: { recognition: RecognitionView }) {
  const { frequency, settings, traces, columns } = recognition;
  const stated: [string, ReactNode][] = [
    [
      'RBW',
      settings.rbwHz === null
        ? null
        : `${formatBandwidth(settings.rbwHz)}${settings.rbwShape ? `, ${settings.rbwShape}` : ''}`,
    ],
    [
      'VBW',
      settings.vbwHz === null
        ? null
        : `${formatBandwidth(settings.vbwHz)}${settings.vbwEnabled === false ? ', off' : ''}`,
    ],
    ['Sweep time', settings.sweepTimeS === null ? null : `${formatFigure(settings.sweepTimeS, 3)} s`],
    ['Attenuation', settings.attenuationDb === null ? null : `${formatFigure(settings.attenuationDb, 0)} dB`],
    ['Preamplifier', settings.preamplifier],
    ['Declared', settings.declaredPoints === null ? null : `${formatCount(settings.declaredPoints)} points`],
  ];
  return (
    <dl className="column-pair">
      <Pair name="Encoding">
        {recognition.encoding}
        <Quiet>line ends {recognition.lineEnds}</Quiet>
      </Pair>
      <Pair name="Delimiter">
        {recognition.delimiter === ',' ? 'comma' : recognition.delimiter === ';' ? 'semicolon' : recognition.delimiter}
        <Quiet>{LAYOUTS[recognition.layout]}</Quiet>
      </Pair>
      <Pair name="Decimal">
        {recognition.decimalMark === ',' ? 'comma' : 'point'}
        <Quiet>{recognition.thousandsMark === null ? 'no thousands mark seen' : 'thousands mark seen'}</Quiet>
      </Pair>
      {recognition.partial && recognition.refusal && (
        <Pair name="Found">
          {formatCount(recognition.partial.points)} points
          <Quiet>
            {settings.declaredPoints !== null && settings.declaredPoints > recognition.partial.points
              ? `${formatCount(settings.declaredPoints - recognition.partial.points)} short, `
              : ''}
            broken at line {formatCount(recognition.partial.line)}
          </Quiet>
        </Pair>
      )}
      {columns.slice(0, 8).map((column) => (
        <Pair key={column.index} name={`Column ${column.index + 1}`}>
          {column.role}
          <Quiet>{column.evidence}</Quiet>
        </Pair>
      ))}
      {recognition.kind !== 'refused' && (
        <>
          <Pair name="Range">
            {formatFrequency(frequency.firstHz)} to {formatFrequency(frequency.lastHz)}
            <Quiet>{frequency.unit === null ? 'unit not stated' : (frequency.unitEvidence ?? frequency.unit)}</Quiet>
          </Pair>
          <Pair name="Step">
            {formatBandwidth(frequency.stepHz)}
            <Quiet>
              {frequency.evenStep ? 'even' : 'uneven'}
              {frequency.duplicates > 0 ? `, ${formatCount(frequency.duplicates)} frequencies stand twice` : ''}
            </Quiet>
          </Pair>
        </>
      )}
      {traces.map((trace) => (
        <Pair key={trace.index} name={trace.name}>
          {formatFigure(trace.min, trace.linear ? 6 : 1)} to {formatFigure(trace.max, trace.linear ? 6 : 1)}
          {trace.unit ? ` ${unitLabel(trace.unit)}` : ''}
          <Quiet>
            {trace.blank ? 'unused, left out' : trace.detector ? DETECTOR_WORDS[trace.detector] : 'detector not stated'}
            {trace.detectorAsWritten ? `, written ${trace.detectorAsWritten}` : ''}
          </Quiet>
        </Pair>
      ))}
      {stated.map(([name, value]) =>
        value === null ? null : (
          <Pair key={name} name={name}>
            {value}
          </Pair>
        ),
      )}
    </dl>
  );
}

function Pair({ name, children }: { name: string; children: ReactNode }) {
  return (
    <>
      <dt className="truncate">{name}</dt>
      <dd className="min-w-0 [overflow-wrap:anywhere]">{children}</dd>
    </>
  );
}

function Quiet({ children }: { children: ReactNode }) {
  return <span className="column-quiet block">{children}</span>;
}
