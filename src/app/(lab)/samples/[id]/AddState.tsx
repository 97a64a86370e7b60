'use client';

import { useState, type FormEvent } from 'react';
import { useRouter } from 'next/navigation';
import { InPlace } from '@/app/(lab)/jobs/InPlace';
import { WRITES } from '@/app/(lab)/jobs/writes';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Switch } from '@/components/ui/Switch';
import { showToast } from '@/components/ui/Toast';
import type { SampleView } from '@/schemas/job';

interface Props {
  sampleId: string;
  /** The label it will most likely take; the lab numbers it when it is added. */
  next: string;
}

export function AddState({ sampleId, next }: Props) {
  return (
    <div className="mt-5">
      <InPlace
        acts={[
          { id: 'add', word: `Add state ${next}`, form: (close) => <StateForm sampleId={sampleId} onClose={close} /> },
        ]}
      />
    </div>
  );
}

function StateForm({ sampleId, onClose }: { sampleId: string; onClose: () => void }) {
  const router = useRouter();
  const { submit, busy, problem, fieldErrors } = useSubmit<{ description: string; planned: boolean }, SampleView>(
    WRITES.createState,
  );
  const [description, setDescription] = useState('');
  const [standing, setStanding] = useState<'fitted' | 'planned'>('fitted');
  useKey('Escape', onClose);

  async function add(event: FormEvent) {
    event.preventDefault();
    const answer = await submit({ description, planned: standing === 'planned' }, { params: { id: sampleId } });
    if (!answer.ok) return;
    router.refresh();
    showToast({ text: `${answer.reply.states.at(-1)?.label ?? 'The state'} is added` });
    onClose();
  }

  return (
    <form onSubmit={add} noValidate className="grid max-w-[33rem] gap-3 py-3" aria-label="Add a state">
      <Field
        label="What is changed against the state before"
        autoFocus
        autoComplete="off"
        value={description}
        onChange={(event) => setDescription(event.target.value)}
        hint="As in: ferrite on the LED lead, two turns, at the driver"
        error={fieldErrors.description && `The description ${fieldErrors.description}.`}
      />
      <Switch
        legend="It is"
        shown
        value={standing}
        onChange={setStanding}
        choices={[
          { value: 'fitted', word: 'Fitted' },
          { value: 'planned', word: 'Planned' },
        ]}
      />
      {problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />}
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" type="submit" busy={busy}>
          Add the state
        </Button>
        <Button kind="quiet" onClick={onClose}>
          Leave it
        </Button>
      </div>
    </form>
  );
}
