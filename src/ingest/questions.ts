import type { AxisUnit } from './frequency';
import type { Table } from './table';
import { referenceUnit } from './traces';
import type { Question, Recognition, RecognisedTrace } from './types';
import { moved } from './numbers';
import { frequencyUnitIn, TO_HZ } from './units';

function proposedLevelUnit(table: Table, trace: RecognisedTrace): string {
  const reference = referenceUnit(table);
  if (reference && !trace.linear) return reference;
  if (trace.linear) return 'V';
  // Rows of hops hold decibels relative to full scale, by common practice.
  if (table.layout === 'hop-rows') return 'dB';
  return trace.min < -30 ? 'dBm' : 'dBuV';
}

/** CISPR 16-1-1 bandwidth of the band that holds the whole sweep; null when it spans several. */
export function bandwidthFor(firstHz: number, lastHz: number): number | null {
  const [low, high] = [Math.min(firstHz, lastHz), Math.max(firstHz, lastHz)];
  const bands: [number, number, number][] = [
    [9e3, 150e3, 200],
    [150e3, 30e6, 9e3],
    [30e6, 1e9, 120e3],
    [1e9, Infinity, 1e6],
  ];
  return bands.find(([from, to]) => low >= from * (1 - 1e-9) && high <= to * (1 + 1e-9))?.[2] ?? null;
}

/** What a person has to say before the sweep can be read or judged, each with a proposal where one can be made. */
export function questionsFor(
  table: Table,
  axis: AxisUnit,
  raw: Float64Array,
  recognition: Pick<Recognition, 'frequency' | 'traces' | 'sweeps' | 'settings' | 'correctedFor'>,
): Question[] {
  const { frequency, traces, sweeps, settings, correctedFor } = recognition;
  const questions: Question[] = [];
  const ask = (key: Question['key'], text: string, proposal: string | null, traceIndex: number | null = null) =>
    questions.push({ key, text, proposal, traceIndex });

  if (sweeps.length > 1) ask('sweepIndex', `The file holds ${sweeps.length} sweeps. Which one is this run?`, '0');
  if (axis.unit === null) {
    const range = `${raw[0]} to ${raw[raw.length - 1]}`;
    ask('frequencyUnit', `No line settles the unit of the frequencies, ${range}. Which is it?`, axis.proposed);
  }
  if (frequency.offset) {
    const { centre } = table.declared;
    const unit = centre?.unit ? frequencyUnitIn(centre.unit) : null;
    const proposal = centre && unit ? String(moved(centre.value, TO_HZ[unit])) : null;
    ask(
      'centreHz',
      'The frequencies run through zero: they are offsets from a centre. What is the centre frequency, in Hz?',
      proposal,
    );
  }
  for (const trace of traces.filter(({ blank }) => !blank)) {
    if (trace.unit === null) {
      const linear = trace.linear ? ' All values are between 0 and 1: a linear quantity, not decibels.' : '';
      const text = `No line states the unit of “${trace.name}”, ${trace.min} to ${trace.max}.${linear} Which is it?`;
      ask('levelUnit', text, proposedLevelUnit(table, trace), trace.index);
    }
    if (trace.detector === null || trace.detector === 'unknown') {
      const said =
        trace.detectorAsWritten === null
          ? `No line states the detector of “${trace.name}”.`
          : `“${trace.name}” is written as ${trace.detectorAsWritten}${trace.mode ? `, ${trace.mode}` : ''}, which is no single detector.`;
      ask('detector', `${said} An unknown detector proves nothing. Which was it?`, 'unknown', trace.index);
    }
  }
  if (settings.rbwHz === null) {
    const proposal = frequency.offset ? null : bandwidthFor(frequency.firstHz, frequency.lastHz);
    const differs = table.declared.settings.rbwHz !== null;
    ask(
      'rbwHz',
      differs
        ? 'The sweeps of this file state different resolution bandwidths. What was it for this one, in Hz?'
        : 'No line states the resolution bandwidth. What was it, in Hz?',
      proposal === null ? null : String(proposal),
    );
  }
  if (correctedFor.length > 0) {
    const list = correctedFor.map(({ what, line }) => `${what} (line ${line})`).join(', ');
    const things = correctedFor.map(({ what }) => what).join(', ');
    ask(
      'alreadyCorrected',
      `The file says its values hold this already: ${list}. It will not be added again. Is that right?`,
      things,
    );
  }
  return questions;
}
