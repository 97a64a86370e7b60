'use client';

import { useState, useTransition, type FormEvent } from 'react';
import { useRouter } from 'next/navigation';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import type { Submittable } from '@/components/forms/send';
import { useSubmit } from '@/components/forms/useSubmit';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { AreaField, Field, SelectField } from '@/components/ui/Field';
import { Message } from '@/components/ui/Message';
import { showToast } from '@/components/ui/Toast';

export interface CorrectField {
  /** As in the body. */
  name: string;
  label: string;
  /** As it stands now. */
  value: string;
  area?: boolean;
  /** One of these instead of text. */
  choices?: readonly { value: string; word: string }[];
  hint?: string;
}

interface Props {
  /** `job`, for the sentence about somebody else's change. */
  what: string;
  operation: Submittable;
  id: string;
  /** The version this page shows. */
  version: number;
  fields: readonly CorrectField[];
  /** Sent along, such as the state a job goes into; then every field is sent, else only what changed. */
  fixed?: Readonly<Record<string, unknown>>;
  /** The act and its extent: `Save the title`. */
  act: string;
  /** What is said when it is done. */
  done: string;
  onClose: () => void;
}

/**
 * A change of one record, made on the version that was read. When somebody else was first it says so and loads their
 * version on request; what was typed stays, and each field tells what stands there now.
 */
export function CorrectForm({ what, operation, id, version, fields, fixed, act, done, onClose }: Props) {
  const router = useRouter();
  const { submit, busy, problem, fieldErrors, clear } = useSubmit(operation);
  const [typed, setTyped] = useState(() => Object.fromEntries(fields.map(({ name, value }) => [name, value])));
  const [opened] = useState(typed);
  /** null once the newest version was asked for. */
  const [held, setHeld] = useState<number | null>(version);
  const [loading, startLoading] = useTransition();
  useKey('Escape', onClose);

  const changed = fields.filter(({ name, value }) => fixed || typed[name] !== value);
  async function save(event: FormEvent) {
    event.preventDefault();
    if (!fixed && changed.length === 0) return onClose();
    const body = { ...fixed, ...Object.fromEntries(changed.map(({ name }) => [name, typed[name]])) };
    const answer = await submit(body, { params: { id }, ifMatch: held ?? version });
    if (!answer.ok) return;
    router.refresh();
    showToast({ text: done });
    onClose();
  }
  function loadAgain() {
    clear();
    setHeld(null);
    startLoading(() => router.refresh());
  }

  const stale = problem?.status === 412;
  return (
    <form onSubmit={save} noValidate className="grid max-w-[33rem] gap-3 py-3" aria-label={act}>
      {fields.map(({ name, label, value, area, choices, hint }, at) => {
        const now =
          held === null && !loading && value !== opened[name]
            ? `Now “${value}”; saving puts yours in its place.`
            : undefined;
        const shared = {
          label,
          name,
          autoFocus: at === 0,
          value: typed[name] ?? '',
          error: fieldErrors[name] && `${label} ${fieldErrors[name]}.`,
          hint: now ?? hint,
        };
        const type = (text: string) => setTyped((before) => ({ ...before, [name]: text }));
        if (choices) {
          return (
            <SelectField key={name} {...shared} onChange={(event) => type(event.target.value)}>
              {choices.map((choice) => (
                <option key={choice.value} value={choice.value}>
                  {choice.word}
                </option>
              ))}
            </SelectField>
          );
        }
        return area ? (
          <AreaField key={name} {...shared} onChange={(event) => type(event.target.value)} />
        ) : (
          <Field key={name} {...shared} autoComplete="off" onChange={(event) => type(event.target.value)} />
        );
      })}
      {stale ? (
        <Message tone="inconclusive" lead={`Somebody changed this ${what} since you opened it.`} live="polite">
          Yours is not saved; what you typed is still here.{' '}
          <button type="button" className="text-pen hover:underline" onClick={loadAgain}>
            Load it again
          </button>
        </Message>
      ) : (
        problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />
      )}
      {held === null && !loading && !problem && (
        <Message tone="under" lead="Loaded again." live="polite">
          What stands there now is said under each field that differs. Press {act} to put yours in its place.
        </Message>
      )}
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" type="submit" busy={busy || loading}>
          {act}
        </Button>
        <Button kind="quiet" onClick={onClose}>
          Leave as it is
        </Button>
      </div>
    </form>
  );
}
