'use client';

import { useState, type FormEvent } from 'react';
import { useRouter } from 'next/navigation';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { Field, SelectField } from '@/components/ui/Field';
import { Message } from '@/components/ui/Message';
import { showToast } from '@/components/ui/Toast';
import { formatShortDay } from '@/format/dates';
import type { BookingView } from '@/schemas/booking';
import type { BookingChoices, DayBooking, DayView } from '@/schemas/day';
import { wallOf } from '@/schemas/labTime';
import { instantOf, typedOf, withStart, type TypedSpan } from './typedSpan';
import { WhenFields } from './WhenFields';
import { DAY_WRITES } from './writes';

interface Props {
  view: DayView;
  choices: BookingChoices;
  /** The booking to move; without one a new one is made. */
  booking?: DayBooking;
  onClose: () => void;
  onBooked?: (id: string) => void;
}

const named = (label: string, error: string | undefined) => error && `${label} ${error}.`;

/** Books a position and a person for a sample, or moves a booking. Times are the lab's; the database decides on a clash. */
export function BookingForm({ view, choices, booking, onClose, onBooked }: Props) {
  const router = useRouter();
  const { submit, busy, problem, fieldErrors } = useSubmit<object, BookingView>(
    booking ? DAY_WRITES.changeBooking : DAY_WRITES.createBooking,
  );
  const [positionId, setPosition] = useState(booking?.position.id ?? choices.positions[0]?.id ?? '');
  const [technicianId, setTechnician] = useState(booking?.technician.id ?? choices.people[0]?.id ?? '');
  const [sampleId, setSample] = useState(booking?.sample.id ?? '');
  const [stateId, setState] = useState(booking?.state?.id ?? '');
  const [work, setWork] = useState(booking?.work ?? '');
  const [span, setSpan] = useState<TypedSpan>(() => firstSpan(view, booking));
  useKey('Escape', onClose);

  const states = choices.samples.find(({ id }) => id === sampleId)?.states ?? [];
  const starts = instantOf(span.start, view.zone);
  const ends = instantOf(span.end, view.zone);

  function chooseSample(id: string) {
    setSample(id);
    setState(
      choices.samples.find((sample) => sample.id === id)?.states.find(({ word }) => !word.includes('planned'))?.id ??
        '',
    );
  }

  async function book(event: FormEvent) {
    event.preventDefault();
    if (!starts.instant || !ends.instant) return;
    const body = {
      positionId,
      technicianId,
      stateId: stateId || null,
      work,
      startsAt: starts.instant,
      endsAt: ends.instant,
      ...(!booking && { sampleId }),
    };
    const answer = await submit(body, booking && { params: { id: booking.id }, ifMatch: booking.version });
    if (!answer.ok) return;
    const { reply } = answer;
    const day = wallOf(reply.startsAt, view.zone).day;
    showToast({
      text: `${reply.product.code} is booked at position ${reply.position.code}, ${formatShortDay(day)} ${wallOf(reply.startsAt, view.zone).time}`,
    });
    onBooked?.(reply.id);
    onClose();
    if (day === view.day) router.refresh();
    else router.push(`/day?day=${day}`);
  }

  return (
    <form
      onSubmit={book}
      noValidate
      className="grid max-w-[44rem] gap-3 py-3"
      aria-label={booking ? 'Move the booking' : 'Book a position'}
    >
      <div className="grid gap-3 pad:grid-cols-2">
        <SelectField
          label="Test position"
          autoFocus
          value={positionId}
          onChange={(event) => setPosition(event.target.value)}
          error={named('This', fieldErrors.positionId)}
        >
          {choices.positions.map(({ id, word }) => (
            <option key={id} value={id}>
              {word}
            </option>
          ))}
        </SelectField>
        <SelectField
          label="Technician"
          value={technicianId}
          onChange={(event) => setTechnician(event.target.value)}
          error={named('This person', fieldErrors.technicianId)}
        >
          {choices.people.map(({ id, name }) => (
            <option key={id} value={id}>
              {name}
            </option>
          ))}
        </SelectField>
        {booking ? (
          <Field
            label="Sample"
            value={`${booking.product.code}, ${booking.sample.code}`}
            readOnly
            error={named('This sample', fieldErrors.sampleId)}
          />
        ) : (
          <SelectField
            label="Sample"
            value={sampleId}
            onChange={(event) => chooseSample(event.target.value)}
            hint="Of open jobs"
            error={
              sampleId === ''
                ? named('The sample', fieldErrors.sampleId && 'is needed')
                : named('This sample', fieldErrors.sampleId)
            }
          >
            <option value="">Choose a sample</option>
            {choices.samples.map(({ id, word }) => (
              <option key={id} value={id}>
                {word}
              </option>
            ))}
          </SelectField>
        )}
        <SelectField
          label="State"
          value={stateId}
          onChange={(event) => setState(event.target.value)}
          error={named('This', fieldErrors.stateId)}
        >
          <option value="">whatever it is in by then</option>
          {states.map(({ id, word }) => (
            <option key={id} value={id}>
              {word}
            </option>
          ))}
        </SelectField>
      </div>
      <Field
        label="What is to be done"
        value={work}
        autoComplete="off"
        onChange={(event) => setWork(event.target.value)}
        hint="As in: radiated prescan"
        error={named('This', fieldErrors.work)}
      />
      <WhenFields
        what="Start"
        value={span.start}
        onChange={(start) => setSpan((before) => withStart(before, start))}
        problem={starts.problem ?? named('The start', fieldErrors.startsAt) ?? null}
        twice={starts.twice}
      />
      <WhenFields
        what="End"
        value={span.end}
        onChange={(end) => setSpan((before) => ({ ...before, end }))}
        problem={ends.problem ?? named('The end', fieldErrors.endsAt) ?? null}
        twice={ends.twice}
      />
      {problem?.status === 409 && problem.detail ? (
        <Message tone="over" lead="This time is taken." live="polite">
          {problem.detail}
        </Message>
      ) : (
        problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />
      )}
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" type="submit" busy={busy}>
          {booking ? 'Save the booking' : 'Book it'}
        </Button>
        <Button kind="quiet" onClick={onClose}>
          Leave it
        </Button>
      </div>
    </form>
  );
}

/** A booking's own times; else the next full hour of today, or 9 to 11 of another day. */
function firstSpan(view: DayView, booking: DayBooking | undefined): TypedSpan {
  const typed = (instant: string) => typedOf(instant, view.zone);
  if (booking) return { start: typed(booking.startsAt), end: typed(booking.endsAt) };
  const hour = Number(wallOf(view.now, view.zone).time.slice(0, 2));
  const from = view.day === view.today && hour >= 8 && hour < 21 ? hour + 1 : 9;
  const at = (hours: number) => ({ day: view.day, time: `${String(hours).padStart(2, '0')}:00`, second: false });
  return { start: at(from), end: at(from + 2) };
}
