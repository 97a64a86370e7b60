'use client';

import { useState, type FormEvent } from 'react';
import { useRouter } from 'next/navigation';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { Field, SelectField } from '@/components/ui/Field';
import { showToast } from '@/components/ui/Toast';
import type { SweepView } from '@/schemas/sweep';
import { RUN_WRITES } from './runActWrites';
import { useOpenStates } from './useOpenStates';

interface Body {
  stateId: string;
  reason: string;
}

/** Moves a run to another state. Where that is another client's, a dialog says first who will see it. */
export function RefileForm({ sweep, onClose }: { sweep: SweepView; onClose: () => void }) {
  const { id, version, number, organisation, state, file } = sweep;
  const router = useRouter();
  const { submit, busy, problem, fieldErrors } = useSubmit<Body, SweepView>(RUN_WRITES.refileSweep);
  const { states, settled } = useOpenStates();
  const [stateId, setStateId] = useState('');
  const [reason, setReason] = useState('');
  const [asking, setAsking] = useState(false);
  useKey('Escape', onClose, { when: !asking });

  const others = states.filter((one) => one.id !== state.id);
  const target = others.find((one) => one.id === stateId);
  const stranger = target && target.organisation.id !== organisation.id ? target.organisation.name : null;
  const clients = [...new Map(others.map((one) => [one.organisation.id, one.organisation.name]))];

  async function move() {
    setAsking(false);
    const answer = await submit({ stateId, reason }, { params: { id }, ifMatch: version });
    if (!answer.ok) return;
    const { state: now, sample } = answer.reply;
    router.refresh();
    showToast({ text: `${number} stands under ${now.label} of ${sample.code}` });
    onClose();
  }
  function ask(event: FormEvent) {
    event.preventDefault();
    if (stranger && reason.trim() !== '') setAsking(true);
    else void move();
  }

  return (
    <form onSubmit={ask} noValidate className="grid max-w-[33rem] gap-3 py-3" aria-label={`Re-file ${number}`}>
      <SelectField
        label="It was measured on"
        name="stateId"
        autoFocus
        value={stateId}
        onChange={(event) => setStateId(event.target.value)}
        error={
          fieldErrors.stateId && (stateId ? `This ${fieldErrors.stateId}.` : 'Choose the state it was measured in.')
        }
        hint={settled === 'reading' ? 'Reading the samples of open jobs.' : 'Fitted states of samples in open jobs.'}
      >
        <option value="">{settled === 'unreachable' ? 'The samples could not be read.' : 'Choose a state'}</option>
        {clients.map(([client, name]) => (
          <optgroup key={client} label={name}>
            {others
              .filter((one) => one.organisation.id === client)
              .map((one) => (
                <option key={one.id} value={one.id}>
                  {one.words}
                </option>
              ))}
          </optgroup>
        ))}
      </SelectField>
      {stranger && (
        <p className="text-madder" role="status">
          {stranger} will see this run, and {organisation.name} will see it no more.
        </p>
      )}
      <Field
        label="Reason"
        name="reason"
        autoComplete="off"
        value={reason}
        onChange={(event) => setReason(event.target.value)}
        hint="As in: dropped on the wrong sample"
        error={fieldErrors.reason && `Reason ${fieldErrors.reason}.`}
      />
      {problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />}
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" type="submit" busy={busy}>
          Re-file {number}
        </Button>
        <Button kind="quiet" onClick={onClose}>
          Leave it here
        </Button>
      </div>
      <Dialog
        open={asking}
        title={`${stranger ?? 'Another client'} will see ${number}`}
        onClose={() => setAsking(false)}
        act={
          <Button kind="primary" onClick={() => void move()}>
            Move {number} to {stranger ?? 'them'}
          </Button>
        }
      >
        <p>
          It was kept for {organisation.name}. Under {target?.words.split(',', 2).join(',')} everything of it is open to{' '}
          {stranger}: the file {file.name} as it was sent, its figures, operating mode, set-up record and photographs.
          What {stranger} has read cannot be taken back.
        </p>
        <p className="mt-2">{organisation.name} finds it no more. Notes written for them stay with them.</p>
      </Dialog>
    </form>
  );
}
