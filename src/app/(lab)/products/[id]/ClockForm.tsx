'use client';

import { useState, type FormEvent } from 'react';
import { useRouter } from 'next/navigation';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Message } from '@/components/ui/Message';
import { Switch } from '@/components/ui/Switch';
import { showToast } from '@/components/ui/Toast';
import type { ClockView } from '@/schemas/clock';
import { clockBody, draftOf, NEW_CLOCK, type ClockDraft, type ClockErrors } from './clockDraft';
import { CLOCK_WRITES } from './clockWrites';

/** Declares a clock, or corrects one on the version that was read. */
export function ClockForm({
  productId,
  clock,
  onClose,
}: {
  productId: string;
  clock?: ClockView;
  onClose: () => void;
}) {
  const router = useRouter();
  const { submit, busy, problem, fieldErrors, clear } = useSubmit<object, ClockView>(
    clock ? CLOCK_WRITES.changeProductClock : CLOCK_WRITES.addProductClock,
  );
  const [draft, setDraft] = useState<ClockDraft>(clock ? draftOf(clock) : NEW_CLOCK);
  const [errors, setErrors] = useState<ClockErrors>({});
  useKey('Escape', onClose);

  async function save(event: FormEvent) {
    event.preventDefault();
    const made = clockBody(draft);
    setErrors(made.errors ?? {});
    if (!made.body) return;
    const answer = await submit(
      made.body,
      clock ? { params: { id: clock.id }, ifMatch: clock.version } : { params: { id: productId } },
    );
    if (!answer.ok) return;
    router.refresh();
    showToast({ text: clock ? `${draft.name} is corrected` : `${draft.name} is declared` });
    onClose();
  }
  const type = (change: Partial<ClockDraft>) => setDraft((before) => ({ ...before, ...change }));
  const wrong = (own: string | undefined, field: string, label: string) =>
    own ?? (fieldErrors[field] && `${label} ${fieldErrors[field]}.`);
  const act = clock ? 'Save the correction' : 'Declare it';

  return (
    <form onSubmit={save} noValidate className="grid max-w-[33rem] gap-3 py-3" aria-label={act}>
      <Field
        label="Name"
        autoFocus
        autoComplete="off"
        value={draft.name}
        onChange={(event) => type({ name: event.target.value })}
        error={wrong(undefined, 'name', 'The name')}
        hint="As the circuit diagram has it: controller clock, converter"
      />
      <Switch
        legend="Kind"
        shown
        choices={[
          { value: 'clock', word: 'clock' },
          { value: 'converter', word: 'switching converter' },
        ]}
        value={draft.kind}
        onChange={(kind) => type({ kind })}
        hint="A converter’s harmonics are looked for, and its sidebands beside stronger emissions."
      />
      <Field
        label="Frequency"
        figure
        autoComplete="off"
        inputMode="decimal"
        placeholder="12 MHz"
        value={draft.frequency}
        onChange={(event) => type({ frequency: event.target.value })}
        error={wrong(errors.frequency, 'frequencyHz', 'The frequency')}
        hint="MHz unless another unit is given"
      />
      <Field
        label="Tolerance, to either side"
        unit="ppm"
        autoComplete="off"
        inputMode="decimal"
        value={draft.tolerancePpm}
        onChange={(event) => type({ tolerancePpm: event.target.value })}
        error={wrong(errors.tolerancePpm, 'tolerancePpm', 'The tolerance')}
        hint="A crystal holds about 100 ppm; 1 % is 10 000 ppm."
      />
      <div className="grid gap-3 pad:grid-cols-2">
        <Field
          label="Spread, whole width"
          unit="%"
          autoComplete="off"
          inputMode="decimal"
          value={draft.spreadPct}
          onChange={(event) => type({ spreadPct: event.target.value })}
          error={wrong(errors.spreadPct, 'spread/pct', 'The spread')}
          hint="Empty where it is not spread"
        />
        <Switch
          legend="Spread goes"
          shown
          choices={[
            { value: 'down', word: 'down' },
            { value: 'centre', word: 'both ways' },
          ]}
          value={draft.spreadKind}
          onChange={(spreadKind) => type({ spreadKind })}
        />
      </div>
      <Field
        label="Note"
        autoComplete="off"
        value={draft.note}
        onChange={(event) => type({ note: event.target.value })}
        error={wrong(undefined, 'note', 'The note')}
      />
      {problem?.status === 412 ? (
        <Message tone="inconclusive" lead="Somebody changed this clock since you opened it." live="polite">
          Yours is not saved; what you typed is still here.{' '}
          <button
            type="button"
            className="text-pen hover:underline"
            onClick={() => {
              clear();
              router.refresh();
            }}
          >
            Load it again, and save to put yours in its place
          </button>
        </Message>
      ) : (
        problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />
      )}
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" type="submit" busy={busy}>
          {act}
        </Button>
        <Button kind="quiet" onClick={onClose}>
          Leave it
        </Button>
      </div>
    </form>
  );
}
