'use client';

import { useRouter } from 'next/navigation';
import { useState, type FormEvent } from 'react';
import { TABLE_WRITES } from '@/app/(lab)/equipment/writes';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { Button } from '@/components/ui/Button';
import { CheckField } from '@/components/ui/CheckField';
import { AreaField, Field, SelectField } from '@/components/ui/Field';
import { port as ports, type Port } from '@/schemas/common';
import { PORT_WORDS } from '@/format/words';
import type { LimitSetView } from '@/schemas/bench';
import type { LimitLineSummary } from '@/schemas/tables';
import { lineConditions, lineRange } from '../../limitWords';

interface Props {
  before: LimitSetView | null;
  lines: readonly LimitLineSummary[];
  chosen: readonly string[];
  /** There are older lines than these. */
  more: boolean;
}

const RADIATED = new Set(['dBuV/m', 'dBuA/m', 'dBpW', 'dBuA']);

/** Lines that are measured at a port, at one distance; a set takes its distance from them. */
export function SetForm({ before, lines, chosen, more }: Props) {
  const router = useRouter();
  const { submit, busy, problem, fieldErrors } = useSubmit<unknown, LimitSetView>(TABLE_WRITES.createLimitSet);
  const [name, setName] = useState(before?.name ?? '');
  const [port, setPort] = useState<Port>(before?.port ?? 'enclosure');
  const [lineIds, setLineIds] = useState<readonly string[]>(chosen);
  const [reason, setReason] = useState('');
  const [missing, setMissing] = useState(false);
  const [leaving, setLeaving] = useState(false);
  const first = lines.find(({ id }) => id === lineIds[0]);
  const fits = (line: LimitLineSummary) =>
    (port === 'enclosure' ? RADIATED.has(line.unit) : line.unit !== 'dBuV/m' && line.unit !== 'dBuA/m') &&
    (first === undefined || line.distanceM === first.distanceM);
  const offered = lines.filter((line) => lineIds.includes(line.id) || fits(line));

  async function make(event: FormEvent) {
    event.preventDefault();
    setMissing(true);
    if (lineIds.length === 0 || name.trim() === '' || reason.trim() === '') return;
    const outcome = await submit({ name, port, distanceM: first?.distanceM ?? null, lineIds, revises: before?.id ?? null, reason }); // prettier-ignore
    if (!outcome.ok) return;
    setLeaving(true);
    router.push('/limits#sets');
  }

  const wrong = Object.entries(fieldErrors).find(([field]) => field.startsWith('lineIds'))?.[1];
  return (
    <form onSubmit={make} noValidate className="mt-4 grid max-w-[44rem] gap-4" aria-label="Limit set">
      <Field
        label="Name"
        value={name}
        readOnly={before !== null}
        maxLength={160}
        autoComplete="off"
        hint={before ? undefined : 'As in CISPR 32 class B radiated, 3 m'}
        error={missing && name.trim() === '' ? 'A set needs a name.' : fieldErrors.name && `Name ${fieldErrors.name}.`}
        onChange={(event) => setName(event.target.value)}
      />
      <SelectField
        label="Port"
        value={port}
        onChange={(event) => {
          setPort(event.target.value as Port);
          setLineIds([]);
        }}
      >
        {ports.options.map((one) => (
          <option key={one} value={one}>
            {PORT_WORDS[one]}
          </option>
        ))}
      </SelectField>
      <fieldset>
        <legend className="field-label">Lines</legend>
        {offered.length === 0 && <p className="t-text">No line is measured at this port. Upload one first.</p>}
        {offered.map((line) => (
          <CheckField
            key={line.id}
            label={
              <>
                {line.name}
                <span className="t-detail block">
                  {lineConditions(line)}, {lineRange(line)}, {line.basis}
                </span>
              </>
            }
            checked={lineIds.includes(line.id)}
            onChange={(event) =>
              setLineIds((now) => (event.target.checked ? [...now, line.id] : now.filter((id) => id !== line.id)))
            }
          />
        ))}
        {more && <p className="t-detail">The newest 200 lines are offered.</p>}
        {(wrong || (missing && lineIds.length === 0)) && (
          <p className="field-error">{wrong ? `A line ${wrong}.` : 'Choose at least one line.'}</p>
        )}
      </fieldset>
      <AreaField
        label="Reason"
        value={reason}
        maxLength={300}
        rows={2}
        hint="As in: asked for by a client, or a new edition"
        error={missing && reason.trim() === '' ? 'Say why.' : fieldErrors.reason && `Reason ${fieldErrors.reason}.`}
        onChange={(event) => setReason(event.target.value)}
      />
      <ProblemMessage problem={problem && problem.errors.length === 0 ? problem : null} />
      <div>
        <Button kind="primary" type="submit" busy={busy || leaving}>
          {before ? `Make revision ${before.revision + 1}` : 'Make the set'}
        </Button>
      </div>
    </form>
  );
}
