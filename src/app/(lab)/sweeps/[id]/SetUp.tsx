'use client';

import type { ReactNode } from 'react';
import { InPlace } from '@/app/(lab)/jobs/InPlace';
import { Message } from '@/components/ui/Message';
import { formatDayTime } from '@/format/dates';
import { climateText, STAYED_WORDS, supplyText, unsaidText } from '@/format/setup';
import type { SetupRecordView } from '@/schemas/setup';
import { MainsCaution } from './MainsCaution';
import { PhotoStrip } from './PhotoStrip';
import { SetUpForm } from './SetUpForm';
import { SetUpRevisions } from './SetUpRevisions';
import type { SetUpProps } from './setUpSection';
import './setup.css';

/** How a run was set up: what is said of it and by whom, what nobody has said, and its photographs. */
export function SetUp({ sweep, setup, photos, zone, lab }: SetUpProps) {
  const { record, brief } = setup;
  const unsaid = unsaidText(brief.unsaid);
  return (
    <>
      {brief.whatHappened !== null && (
        <Message tone="inconclusive" lead="The EUT did not stay in its mode:" className="mb-[22px]">
          {brief.whatHappened}
        </Message>
      )}
      {record && <SetUpFacts record={record} />}
      {unsaid && <p className="column-quiet">{unsaid}</p>}
      {record && (
        <p className="column-quiet">
          {record.by.name}, {formatDayTime(record.at, zone)}
          {record.reason && `; revision ${record.revision}: ${record.reason}`}
        </p>
      )}
      {record && record.revision > 1 && <SetUpRevisions runId={sweep.id} before={record.revision} zone={zone} />}
      {sweep.port === 'ac-mains' && <MainsCaution />}
      {lab && (
        <InPlace
          size="table"
          acts={[
            {
              id: 'record',
              word: record ? 'Correct the set-up' : 'Record the set-up',
              form: (close) => <SetUpForm sweep={sweep} setup={setup} onClose={close} />,
            },
          ]}
        />
      )}
      <PhotoStrip sweepId={sweep.id} first={photos} zone={zone} lab={lab} />
    </>
  );
}

/** What is said, and nothing of what is not. */
export function SetUpFacts({ record }: { record: SetupRecordView }) {
  const facts: [string, ReactNode][] = [
    ['Mode', record.operatingMode],
    ['Supply', supplyText(record)],
    ['Cables', record.cableLayout],
    ['Ancillary', record.ancillary],
    ['Climate', climateText(record)],
    ['Deviations', record.deviations],
    ['EUT', record.eutStayed && (record.whatHappened ?? STAYED_WORDS[record.eutStayed])],
  ];
  return (
    <dl className="column-pair">
      {facts
        .filter(([, said]) => said)
        .map(([name, said]) => (
          <Fact key={name} name={name}>
            {said}
          </Fact>
        ))}
    </dl>
  );
}

function Fact({ name, children }: { name: string; children: ReactNode }) {
  return (
    <>
      <dt>{name}</dt>
      <dd className="min-w-0 whitespace-pre-line [overflow-wrap:anywhere]">{children}</dd>
    </>
  );
}
