'use client';

import { useState, type FormEvent } from 'react';
import { useRouter } from 'next/navigation';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { showToast } from '@/components/ui/Toast';
import type { CustodyView } from '@/schemas/custody';
import { CUSTODY_WRITES } from './writes';

interface Props {
  sample: { id: string; code: string };
  /** Proposed, such as the position that is booked; the person says it. */
  places: readonly string[];
  onClose: () => void;
}

/** Says where a sample is taken. */
export function MoveSample({ sample, places, onClose }: Props) {
  const router = useRouter();
  const { submit, busy, problem, fieldErrors } = useSubmit<{ place: string; note: string }, CustodyView>(
    CUSTODY_WRITES.moveSample,
  );
  const [place, setPlace] = useState('');
  const [note, setNote] = useState('');
  useKey('Escape', onClose);

  async function move(event: FormEvent) {
    event.preventDefault();
    const answer = await submit({ place, note }, { params: { id: sample.id } });
    if (!answer.ok) return;
    router.refresh();
    showToast({ text: `${sample.code} is at ${answer.reply.place}` });
    onClose();
  }

  return (
    <form onSubmit={move} noValidate className="grid max-w-[33rem] gap-3 py-3" aria-label={`Move ${sample.code}`}>
      <Field
        label="It goes to"
        autoFocus
        autoComplete="off"
        list={`places-${sample.id}`}
        value={place}
        onChange={(event) => setPlace(event.target.value)}
        hint="A shelf, a test position, a carrier, its client"
        error={fieldErrors.place && `The place ${fieldErrors.place}.`}
      />
      <datalist id={`places-${sample.id}`}>
        {places.map((one) => (
          <option key={one} value={one} />
        ))}
      </datalist>
      <Field
        label="Remark"
        autoComplete="off"
        value={note}
        onChange={(event) => setNote(event.target.value)}
        hint="As in: with its supply, lid off"
        error={fieldErrors.note && `The remark ${fieldErrors.note}.`}
      />
      {problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />}
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" type="submit" busy={busy}>
          Move {sample.code}
        </Button>
        <Button kind="quiet" onClick={onClose}>
          Leave it where it is
        </Button>
      </div>
    </form>
  );
}
