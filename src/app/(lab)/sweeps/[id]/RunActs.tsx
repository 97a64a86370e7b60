'use client';

import { CorrectForm } from '@/app/(lab)/jobs/CorrectForm';
import { InPlace, type InPlaceAct } from '@/app/(lab)/jobs/InPlace';
import type { SweepView } from '@/schemas/sweep';
import { EvaluateForm } from './EvaluateForm';
import { RefileForm } from './RefileForm';
import { RUN_WRITES } from './runActWrites';

interface Props {
  sweep: SweepView;
  /** What is newer than the revisions it was judged with. */
  newer: readonly string[];
}

/** What the lab may do with a kept run: each with its reason, and nothing is deleted. */
export function RunActs({ sweep, newer }: Props) {
  const { id, version, number, state } = sweep;
  const reason = (hint: string) => [{ name: 'reason', label: 'Reason', value: '', hint }];
  const shared = { what: 'run', id, version, fixed: {} };
  const acts: InPlaceAct[] = sweep.voided
    ? [
        {
          id: 'restore',
          word: 'Restore this run',
          form: (close) => (
            <CorrectForm
              {...shared}
              operation={RUN_WRITES.restoreSweep}
              fields={reason('Why it counts after all; it stands in the history.')}
              act={`Restore ${number}`}
              done={`${number} speaks for ${state.label} again`}
              onClose={close}
            />
          ),
        },
      ]
    : [
        {
          id: 'evaluate',
          word: 'Re-evaluate',
          form: (close) => <EvaluateForm id={id} number={number} newer={newer} onClose={close} />,
        },
        {
          id: 'refile',
          word: 'Re-file',
          form: (close) => <RefileForm sweep={sweep} onClose={close} />,
        },
        {
          id: 'void',
          word: 'Void',
          form: (close) => (
            <CorrectForm
              {...shared}
              operation={RUN_WRITES.voidSweep}
              fields={reason('The client reads it on this sheet. As in: the mast stood still')}
              act={`Void ${number}`}
              done={`${number} is voided and speaks for nothing`}
              onClose={close}
            />
          ),
        },
      ];
  return (
    <div className="mt-2 print:hidden">
      <InPlace acts={acts} />
    </div>
  );
}
