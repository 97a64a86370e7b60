'use client';

import { useState, type FormEvent } from 'react';
import { useRouter } from 'next/navigation';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { showToast } from '@/components/ui/Toast';
import { VERDICT_WORDS } from '@/format/words';
import type { EvaluationItem } from '@/schemas/runActs';
import { RUN_WRITES } from './runActWrites';

interface Props {
  id: string;
  number: string;
  newer: readonly string[];
  onClose: () => void;
}

/** Judges the kept points again; what was judged before stays in the history. */
export function EvaluateForm({ id, number, newer, onClose }: Props) {
  const router = useRouter();
  const { submit, busy, problem, fieldErrors } = useSubmit<{ reason: string }, { evaluation: EvaluationItem }>(
    RUN_WRITES.evaluateSweep,
  );
  const [reason, setReason] = useState(newer.join(' '));
  useKey('Escape', onClose);

  async function judge(event: FormEvent) {
    event.preventDefault();
    const answer = await submit({ reason }, { params: { id } });
    if (!answer.ok) return;
    const { repeats, verdict } = answer.reply.evaluation;
    router.refresh();
    showToast({
      text: repeats
        ? `${number} is judged again: the same figures, bit for bit`
        : `${number} is judged again: ${VERDICT_WORDS[verdict]}`,
    });
    onClose();
  }

  return (
    <form onSubmit={judge} noValidate className="grid max-w-[33rem] gap-3 py-3" aria-label={`Re-evaluate ${number}`}>
      <p>
        {newer.length > 0
          ? newer.join(' ')
          : 'Nothing is newer than what it was judged with, so the same figures come out.'}{' '}
        The evaluation before stays in the history.
      </p>
      <Field
        label="Reason"
        name="reason"
        autoFocus
        autoComplete="off"
        value={reason}
        onChange={(event) => setReason(event.target.value)}
        error={fieldErrors.reason && `Reason ${fieldErrors.reason}.`}
      />
      {problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />}
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" type="submit" busy={busy}>
          Re-evaluate {number}
        </Button>
        <Button kind="quiet" onClick={onClose}>
          Leave as it is
        </Button>
      </div>
    </form>
  );
}
