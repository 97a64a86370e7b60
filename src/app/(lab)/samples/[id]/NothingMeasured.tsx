'use client';

import { useId, useState } from 'react';
import { SweepChart } from '@/components/charts/SweepChart';
import type { ChartSubject } from '@/components/charts/chartSubject';
import type { ChartMode } from '@/components/charts/marginSeries';
import { SelectField } from '@/components/ui/Field';
import { Switch } from '@/components/ui/Switch';
import { HeadCell, Table, TableHead } from '@/components/ui/Table';
import { PORT_WORDS } from '@/format/words';
import type { Port } from '@/schemas/common';
import type { LimitSetView } from '@/schemas/bench';

interface Props {
  sets: readonly LimitSetView[];
  /** The prescan uncertainty of the lab's path for a port, for the guard band; none where no path is entered. */
  uncertainty: Partial<Record<Port, ChartSubject['uncertainty']>>;
  /** Whether the reader may upload. */
  upload: boolean;
}

/** The sheet of a sample before its first run: the line is here, and nothing hangs from it. */
export function NothingMeasured({ sets, uncertainty, upload }: Props) {
  const tableId = useId();
  const [mode, setMode] = useState<ChartMode>('margin');
  const [chosen, setChosen] = useState(sets[0]?.id ?? '');
  const set = sets.find(({ id }) => id === chosen);
  if (!set) return null;
  const subject = subjectOf(set, uncertainty[set.port] ?? []);
  return (
    <div className="mt-5">
      <div className="mb-3 flex flex-wrap items-end justify-between gap-3">
        <Switch
          legend="What the chart shows"
          choices={[
            { value: 'margin', word: 'Margin' },
            { value: 'level', word: 'Level' },
          ]}
          value={mode}
          onChange={(value) => setMode(value as ChartMode)}
        />
        <SelectField
          label="Limit set"
          className="w-full max-w-[22rem]"
          value={chosen}
          onChange={(event) => setChosen(event.target.value)}
        >
          {sets.map(({ id, name, port }) => (
            <option key={id} value={id}>
              {name}, {PORT_WORDS[port]}
            </option>
          ))}
        </SelectField>
      </div>
      <SweepChart
        key={set.id}
        subject={subject}
        window={null}
        candidates={[]}
        mode={mode}
        onMode={setMode}
        tableId={tableId}
      >
        <p className="t-section">{upload ? 'Drop a sweep file anywhere on this sheet' : 'Nothing is measured yet'}</p>
        <p className="t-text">
          {upload
            ? 'Text or CSV from any receiver, several at once. The original is kept as sent.'
            : 'The first run of this sample hangs from the line here.'}
        </p>
      </SweepChart>
      <div id={tableId} className="mt-3">
        <Table caption="Candidates">
          <TableHead>
            <HeadCell figure unit="MHz">
              Frequency
            </HeadCell>
            <HeadCell>Detector</HeadCell>
            <HeadCell figure unit={set.lines[0]?.unit.replace('dBu', 'dBµ')}>
              Level
            </HeadCell>
            <HeadCell figure>Limit</HeadCell>
            <HeadCell figure unit="dB">
              Margin
            </HeadCell>
            <HeadCell>Verdict</HeadCell>
          </TableHead>
        </Table>
        <p className="t-detail border-b border-rule py-2">
          Candidates appear here: what is over, within the uncertainty or in need of a final, and the worst that are
          under.
        </p>
      </div>
    </div>
  );
}

function subjectOf(set: LimitSetView, uncertainty: ChartSubject['uncertainty']): ChartSubject {
  const parts = set.lines.flatMap(({ segments }) => segments);
  return {
    firstHz: Math.min(...parts.map(({ startHz }) => startHz)),
    lastHz: Math.max(...parts.map(({ stopHz }) => stopHz)),
    stepHz: null,
    limitName: set.name,
    lines: set.lines,
    traces: [],
    uncertainty,
    gaps: [],
    orientation: '',
  };
}
