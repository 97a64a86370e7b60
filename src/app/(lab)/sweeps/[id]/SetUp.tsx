'use client';

import { InPlace } from '@/app/(lab)/jobs/InPlace';
import { Message } from '@/components/ui/Message';
import { formatDayTime } from '@/format/dates';
import { unsaidText } from '@/format/setup';
import type { PhotoView, SetupView } from '@/schemas/setup';
import type { SweepView } from '@/schemas/sweep';
import { MainsCaution } from './MainsCaution';
import { PhotoStrip } from './PhotoStrip';
import { SetUpFacts } from './SetUpFacts';
import { SetUpForm } from './SetUpForm';
import { SetUpRevisions } from './SetUpRevisions';
import './setup.css';

export interface SetUpProps {
  sweep: SweepView;
  setup: SetupView;
  photos: { items: PhotoView[]; next: string | null };
  zone: string;
  /** Whether the reader is one of the lab's people. */
  lab: boolean;
}

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
