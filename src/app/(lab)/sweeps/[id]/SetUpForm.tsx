'use client';

import { useState, useTransition, type FormEvent } from 'react';
import { useRouter } from 'next/navigation';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useDraft } from '@/components/forms/useDraft';
import { useSubmit } from '@/components/forms/useSubmit';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { AreaField, Field, SelectField } from '@/components/ui/Field';
import { Message } from '@/components/ui/Message';
import { showToast } from '@/components/ui/Toast';
import type { SetupView } from '@/schemas/setup';
import type { SweepView } from '@/schemas/sweep';
import { bodyOf, draftOf, sameAs, type NumberField, type SetUpDraft } from './setUpDraft';
import { SETUP_WRITES } from './setUpWrites';

interface Props {
  sweep: SweepView;
  setup: SetupView;
  onClose: () => void;
}

/** Nothing in it is needed; a correction says why. What is typed survives a reload. */
export function SetUpForm({ sweep, setup, onClose }: Props) {
  const router = useRouter();
  const { record, last } = setup;
  const corrects = record?.revision ?? null;
  const key = `set-up ${sweep.id} ${corrects ?? 0}`;
  const [draft, setDraft, forget] = useDraft(key, () => draftOf(record, sweep.operatingMode));
  const { submit, busy, problem, fieldErrors, clear } = useSubmit(SETUP_WRITES.writeSetup);
  const [wrong, setWrong] = useState<readonly NumberField[]>([]);
  const [loading, startLoading] = useTransition();
  useKey('Escape', leave);

  const set = (more: Partial<SetUpDraft>) => setDraft({ ...draft, ...more });
  const text = (name: keyof SetUpDraft, label: string) => ({
    label,
    name,
    value: draft[name],
    error: fieldErrors[name] && `${label} ${fieldErrors[name]}.`,
    onChange: (event: { target: { value: string } }) => set({ [name]: event.target.value }),
  });
  const figure = (name: NumberField, label: string, unit: string) => ({
    ...text(name, label),
    unit,
    inputMode: 'decimal' as const,
    autoComplete: 'off',
    ...(wrong.includes(name) && { error: `${label} is a figure, such as 21.5.` }),
  });

  function leave() {
    forget();
    onClose();
  }
  async function save(event: FormEvent) {
    event.preventDefault();
    const made = bodyOf(draft, corrects);
    setWrong('wrong' in made ? made.wrong : []);
    if ('wrong' in made) return;
    const answer = await submit(made.body, { params: { id: sweep.id } });
    if (!answer.ok) return;
    router.refresh();
    showToast({
      text: corrects === null ? `Set-up of ${sweep.number} recorded` : `Set-up of ${sweep.number} corrected`,
    });
    leave();
  }
  const stale = problem?.status === 412;

  return (
    <form onSubmit={save} noValidate className="setup-form" aria-label="Set-up">
      {last && (
        <Button size="table" onClick={() => setDraft(sameAs(last.record, draft))}>
          Same as {last.run.number}
        </Button>
      )}
      <Field {...text('operatingMode', 'Operating mode')} autoFocus maxLength={300} autoComplete="off" />
      <div className="setup-row">
        <SelectField
          label="Supply"
          value={draft.supplyKind}
          onChange={(event) => set({ supplyKind: event.target.value as SetUpDraft['supplyKind'] })}
        >
          <option value="">not said</option>
          <option value="ac">AC</option>
          <option value="dc">DC</option>
        </SelectField>
        <Field {...figure('supplyV', 'Voltage', 'V')} />
        {draft.supplyKind !== 'dc' && <Field {...figure('supplyFrequencyHz', 'Frequency', 'Hz')} />}
      </div>
      <Field {...text('supplySource', 'Supplied from')} maxLength={120} autoComplete="off" />
      <AreaField {...text('cableLayout', 'Cable layout')} maxLength={1000} rows={2} />
      <AreaField {...text('ancillary', 'Ancillary equipment')} maxLength={1000} rows={2} />
      <div className="setup-row">
        <Field {...figure('temperatureC', 'Temperature', '°C')} />
        <Field {...figure('humidityPct', 'Relative humidity', '%')} />
      </div>
      <AreaField
        {...text('deviations', 'Deviations from the plan')}
        maxLength={1000}
        rows={2}
        hint="Write none when there were none."
      />
      <SelectField
        label="Did the EUT stay in its mode?"
        value={draft.eutStayed}
        error={fieldErrors.eutStayed}
        onChange={(event) => set({ eutStayed: event.target.value as SetUpDraft['eutStayed'] })}
      >
        <option value="">not said</option>
        <option value="yes">It stayed</option>
        <option value="no">It did not stay</option>
        <option value="not-watched">It was not watched</option>
      </SelectField>
      {draft.eutStayed === 'no' && (
        <Field
          {...text('whatHappened', 'What it did')}
          maxLength={500}
          autoComplete="off"
          hint="It stands in the finding of this run; the verdict stays."
        />
      )}
      {corrects !== null && <Field {...text('reason', 'Why it is corrected')} maxLength={300} autoComplete="off" />}
      {stale ? (
        <Message tone="inconclusive" lead="Somebody recorded this set-up since you opened it." live="polite">
          Yours is not saved; what you typed is still here.{' '}
          <button
            type="button"
            className="text-pen hover:underline"
            onClick={() => {
              clear();
              startLoading(() => router.refresh());
            }}
          >
            Load theirs
          </button>{' '}
          beside it.
        </Message>
      ) : (
        problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />
      )}
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" size="table" type="submit" busy={busy || loading}>
          {corrects === null ? 'Record the set-up' : `Record revision ${corrects + 1}`}
        </Button>
        <Button kind="quiet" size="table" onClick={leave}>
          Leave it
        </Button>
      </div>
    </form>
  );
}
