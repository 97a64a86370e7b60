import { renderToString } from 'react-dom/server';
import type { CandidateView, WindowView } from '@/schemas/sweep';
import { ChartLegend } from '@/components/charts/ChartLegend';
import type { ChartSubject } from '@/components/charts/chartSubject';
import { FactorSlip } from '@/components/charts/FactorSlip';
import { SignalPath } from '@/components/charts/SignalPath';
import { SmallMultiple } from '@/components/charts/SmallMultiple';
import { SweepChart } from '@/components/charts/SweepChart';
import { publishedLine } from './lines';

const line = publishedLine('cispr32-b-re-3m');
const subject: ChartSubject = {
  firstHz: 30e6,
  lastHz: 999.975e6,
  stepHz: 75e3,
  limitName: 'class B, 3 m',
  lines: [line],
  traces: [{ index: 0, name: 'A', detector: 'peak', unit: 'dBuV', rbwHz: 120e3, lineId: line.id }],
  uncertainty: [{ startHz: 30e6, stopHz: 1e9, expandedDb: 4.9 }],
  gaps: [],
  orientation: 'V',
};
const candidate: CandidateView = {
  rank: 1,
  kind: 'peak',
  traceIndex: 0,
  lineId: line.id,
  detector: 'peak',
  frequencyHz: 144.018e6,
  fromHz: 144.018e6,
  toHz: 144.018e6,
  reading: 61.1,
  level: 46.2,
  limit: 40,
  marginDb: -6.2,
  uncertaintyDb: 4.9,
  verdict: 'over',
  because: null,
};
const window: WindowView = {
  fromHz: 30e6,
  toHz: 999.975e6,
  columns: 2,
  traces: [
    {
      index: 0,
      frequencyHz: [30e6, 144.018e6],
      levelMin: [10, 12],
      levelMax: [12, 46.2],
      marginMin: [28, -6.2],
      marginMax: [30, 28],
    },
  ],
};
const ignore = () => {};

const drawn = {
  'the margin chart': (
    <SweepChart
      subject={subject}
      window={window}
      candidates={[candidate]}
      mode="margin"
      selectedRank={1}
      clockHz={12e6}
    />
  ),
  'the level chart': <SweepChart subject={subject} window={window} candidates={[candidate]} mode="level" />,
  'an empty chart': (
    <SweepChart subject={subject} window={null} candidates={[]} mode="margin">
      <b>Drop a sweep file</b>
    </SweepChart>
  ),
  'a preview': <SweepChart preview subject={subject} window={window} candidates={[]} mode="margin" />,
  'a chart without any limit': (
    <SweepChart subject={{ ...subject, lines: [], uncertainty: [] }} window={window} candidates={[]} mode="level" />
  ),
  'its legend': <ChartLegend mode="margin" onMode={ignore} traces={subject.traces} clockHz={null} onClock={ignore} />,
  'a factor slip': (
    <FactorSlip
      table={{ name: 'ANT-02 V', lowerHz: 35e6, lowerDb: 14.6, upperHz: 40e6, upperDb: 13.1 }}
      frequencyHz={36.006e6}
      factorDb={14.28}
    />
  ),
  'a signal path': (
    <SignalPath
      today="2026-11-17"
      distanceM={3}
      sample={{ name: 'TP-9' }}
      items={[
        {
          role: 'antenna',
          identifier: 'ANT-02',
          description: 'hybrid',
          calibratedOn: '2025-11-26',
          dueOn: '2026-11-26',
          due: 'due-soon',
        },
      ]}
    />
  ),
  'a small multiple': <SmallMultiple name="M2, enclosure" window={window} worst={candidate} />,
};

test.each(Object.entries(drawn))(
  '%s is drawn on the server without inline styles, which the CSP refuses',
  (_, element) => {
    const html = renderToString(element);
    expect(html).toContain('<svg');
    expect(html).not.toMatch(/\sstyle=/);
    expect(html).not.toContain('NaN');
    expect(html).not.toContain('Infinity');
  },
);

test('the chart says in one sentence what it shows, and each mark what it is', () => {
  const html = renderToString(drawn['the margin chart']);
  expect(html).toContain(
    'Margin against class B, 3 m, 30–1000 MHz: one candidate, the worst at 144.018 MHz, 6.2 over, over.',
  );
  expect(html).toContain('aria-label="Candidate 1, 144.018 MHz, peak, 46.2 dBµV/m, 6.2 over, over"');
});

test('the slip of a factor names both rows and the point between them', () => {
  expect(renderToString(drawn['a factor slip'])).toContain(
    'ANT-02 V: 14.28 dB at 36.006 MHz, between 14.6 dB at 35 MHz and 13.1 dB at 40 MHz, straight over log f',
  );
});

test('a planned state says what it needs in place of a figure', () => {
  const html = renderToString(<SmallMultiple name="M3, enclosure" window={null} worst={null} needs="needs 11.1 dB" />);
  expect(html).toContain('aria-label="M3, enclosure: needs 11.1 dB"');
  expect(html).toContain('stroke-dasharray');
});
