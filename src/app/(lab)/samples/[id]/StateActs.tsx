'use client';

import { CorrectForm } from '@/app/(lab)/jobs/CorrectForm';
import { InPlace, type InPlaceAct } from '@/app/(lab)/jobs/InPlace';
import { WRITES } from '@/app/(lab)/jobs/writes';
import type { SampleView } from '@/schemas/job';

/** Corrects what a state is called, and says that a planned one is fitted. */
export function StateActs({ state }: { state: SampleView['states'][number] }) {
  const { id, version, label, description, planned } = state;
  const shared = { what: 'state', operation: WRITES.changeState, id, version };
  const correct: InPlaceAct = {
    id: 'correct',
    word: 'Correct the description',
    kind: 'quiet',
    form: (close) => (
      <CorrectForm
        {...shared}
        fields={[{ name: 'description', label: `What ${label} is`, value: description }]}
        act="Save the description"
        done={`${label} has its new description`}
        onClose={close}
      />
    ),
  };
  const fit: InPlaceAct = {
    id: 'fit',
    word: 'Mark as fitted',
    kind: 'quiet',
    form: (close) => (
      <CorrectForm
        {...shared}
        fields={[
          {
            name: 'description',
            label: 'As it was fitted',
            value: description,
            hint: 'Correct it where the build differs from the plan.',
          },
        ]}
        fixed={{ planned: false }}
        act={`Mark ${label} as fitted`}
        done={`${label} is fitted and can be measured`}
        onClose={close}
      />
    ),
  };
  return <InPlace size="table" acts={planned ? [fit, correct] : [correct]} />;
}
