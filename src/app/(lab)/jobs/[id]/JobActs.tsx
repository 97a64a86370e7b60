'use client';

import { RULE_CHOICES } from '@/format/decisionRules';
import type { JobView } from '@/schemas/job';
import { CorrectForm } from '../CorrectForm';
import { InPlace, type InPlaceAct } from '../InPlace';
import { WRITES } from '../writes';

/** What a manager does with a job: rename it, end it with its reason, open it again. */
export function JobActs({ job }: { job: JobView }) {
  const { id, version, number, title, state, decisionRule } = job;
  const shared = { what: 'job', operation: WRITES.changeJob, id, version };
  const rename: InPlaceAct = {
    id: 'rename',
    word: 'Rename',
    form: (close) => (
      <CorrectForm
        {...shared}
        fields={[{ name: 'title', label: 'Title', value: title }]}
        act="Save the title"
        done={`${number} has its new title`}
        onClose={close}
      />
    ),
  };
  const rule: InPlaceAct = {
    id: 'rule',
    word: 'Choose the decision rule',
    form: (close) => (
      <CorrectForm
        {...shared}
        fields={[
          {
            name: 'decisionRule',
            label: 'Decision rule',
            value: decisionRule,
            choices: RULE_CHOICES,
            hint: 'Agreed with the client. Runs judged before keep their rule until they are judged again.',
          },
        ]}
        act="Save the rule"
        done={`${number} has its decision rule`}
        onClose={close}
      />
    ),
  };
  const reopen: InPlaceAct = {
    id: 'reopen',
    word: 'Reopen',
    form: (close) => (
      <CorrectForm
        {...shared}
        fields={[]}
        fixed={{ state: 'open', stateReason: null }}
        act={`Reopen ${number}`}
        done={`${number} is open`}
        onClose={close}
      />
    ),
  };
  const end: InPlaceAct[] = [
    {
      id: 'close',
      word: 'Close the job',
      form: (close) => (
        <CorrectForm
          {...shared}
          fields={[{ name: 'stateReason', label: 'What came of it', value: '', hint: 'As in: reported and accepted' }]}
          fixed={{ state: 'closed' }}
          act={`Close ${number}`}
          done={`${number} is closed`}
          onClose={close}
        />
      ),
    },
    {
      id: 'decline',
      word: 'Decline with a reason',
      form: (close) => (
        <CorrectForm
          {...shared}
          fields={[
            {
              name: 'stateReason',
              label: 'The reason',
              value: '',
              area: true,
              hint: 'The client reads it on this sheet.',
            },
          ]}
          fixed={{ state: 'declined' }}
          act={`Decline ${number}`}
          done={`${number} is declined`}
          onClose={close}
        />
      ),
    },
  ];
  return (
    <div className="mt-2">
      <InPlace acts={[rename, rule, ...(state === 'open' ? end : [reopen])]} />
    </div>
  );
}
