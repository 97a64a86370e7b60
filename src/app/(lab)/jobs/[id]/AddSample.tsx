'use client';

import { useState, type FormEvent } from 'react';
import { useRouter } from 'next/navigation';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { AreaField, Field } from '@/components/ui/Field';
import { showToast } from '@/components/ui/Toast';
import type { JobView, SampleView } from '@/schemas/job';
import { InPlace } from '../InPlace';
import { WRITES } from '../writes';

type Job = Pick<JobView, 'id' | 'number' | 'state'>;

/** Takes a sample into the job, in place. A job that is not open takes none, and says what it waits for. */
export function AddSample({ job }: { job: Job }) {
  if (job.state !== 'open') {
    return (
      <Button kind="unavailable" className="mt-3">
        Adding a sample waits for the job to be open
      </Button>
    );
  }
  return (
    <div className="mt-3">
      <InPlace
        acts={[{ id: 'add', word: 'Add a sample', form: (close) => <SampleForm job={job} onClose={close} /> }]}
      />
    </div>
  );
}

const EMPTY = { serial: '', firmware: '', description: '' };

function SampleForm({ job, onClose }: { job: Job; onClose: () => void }) {
  const router = useRouter();
  const { submit, busy, problem, fieldErrors } = useSubmit<typeof EMPTY, SampleView>(WRITES.createSample);
  const [typed, setTyped] = useState(EMPTY);
  useKey('Escape', onClose);
  const set = (name: keyof typeof EMPTY) => (event: { target: { value: string } }) =>
    setTyped((before) => ({ ...before, [name]: event.target.value }));

  async function add(event: FormEvent) {
    event.preventDefault();
    const answer = await submit(typed, { params: { id: job.id } });
    if (!answer.ok) return;
    router.refresh();
    showToast({ text: `${answer.reply.code} is in ${job.number}, state M0` });
    onClose();
  }

  return (
    <form onSubmit={add} noValidate className="grid max-w-[33rem] gap-3 py-3" aria-label="Add a sample">
      <div className="grid gap-3 pad:grid-cols-2">
        <Field
          label="Serial number"
          figure
          autoFocus
          autoComplete="off"
          value={typed.serial}
          onChange={set('serial')}
          error={fieldErrors.serial && `Serial number ${fieldErrors.serial}.`}
        />
        <Field
          label="Firmware, if it has any"
          autoComplete="off"
          value={typed.firmware}
          onChange={set('firmware')}
          error={fieldErrors.firmware && `Firmware ${fieldErrors.firmware}.`}
        />
      </div>
      <AreaField
        label="What came with it"
        value={typed.description}
        onChange={set('description')}
        hint="Leads, loads, supply; anything that belongs to the set-up"
        error={fieldErrors.description && `This ${fieldErrors.description}.`}
      />
      {problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />}
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" type="submit" busy={busy}>
          Add the sample in state M0
        </Button>
        <Button kind="quiet" onClick={onClose}>
          Leave it
        </Button>
      </div>
    </form>
  );
}
