'use client';

import Link from 'next/link';
import { CorrectForm } from '@/app/(lab)/jobs/CorrectForm';
import { MoveSample } from '@/app/(lab)/custody/MoveSample';
import { InPlace, type InPlaceAct } from '@/app/(lab)/jobs/InPlace';
import { ButtonLink } from '@/components/ui/Button';
import { Figure } from '@/components/ui/Figure';
import { Id, IdentityLine } from '@/components/ui/IdentityLine';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { Message } from '@/components/ui/Message';
import { StateTag } from '@/components/ui/StateTag';
import { formatDayTime } from '@/format/dates';
import { formatCount } from '@/format/quantities';
import { capitalised } from '@/format/words';
import type { BookingChoices, DayBooking, DayView } from '@/schemas/day';
import { BookingForm } from './BookingForm';
import { spanWords, untilWords, type Standing } from './dayWords';
import { DAY_WRITES } from './writes';

interface Props {
  booking: DayBooking;
  standing: Standing;
  view: DayView;
  nowMs: number;
  /** null for who may not change bookings. */
  choices: BookingChoices | null;
  upload: boolean;
  /** Whether the reader may say where the sample goes. */
  move: boolean;
}

const TITLES: Record<Standing, string> = {
  done: 'Done',
  now: 'At the bench now',
  next: 'Next at the bench',
  later: 'To come',
};

/** The chosen booking with what is needed at the bench: sample, state, product, client, and the way to its upload. */
export function ChosenBooking({ booking, standing, view, nowMs, choices, upload, move }: Props) {
  const { product, state, sample, organisation, job, position, technician, own, work, openRetests, clashes, place } =
    booking;
  const lengthMs = Date.parse(booking.endsAt) - Date.parse(booking.startsAt);
  const fitted = state !== null && !state.planned;
  const custody: InPlaceAct = {
    id: 'custody',
    word: `Move ${sample.code}`,
    keyName: 'C',
    form: (close) => (
      <MoveSample sample={sample} places={[`position ${position.code}, ${position.name}`]} onClose={close} />
    ),
  };
  const changes = (offered: BookingChoices): InPlaceAct[] => [
    {
      id: 'move',
      word: 'Move or change',
      form: (close) => <BookingForm view={view} choices={offered} booking={booking} onClose={close} />,
    },
    {
      id: 'cancel',
      word: 'Cancel with a reason',
      form: (close) => (
        <CorrectForm
          what="booking"
          operation={DAY_WRITES.cancelBooking}
          id={booking.id}
          version={booking.version}
          fields={[{ name: 'reason', label: 'The reason', value: '', hint: 'It stands in the record of the job.' }]}
          fixed={{}}
          act={`Cancel the booking of ${product.code}`}
          done={`${product.code} at position ${position.code} is cancelled`}
          onClose={close}
        />
      ),
    },
  ];
  return (
    <section aria-label={`Booking of ${product.code}`}>
      <SectionHeading
        className="mt-6"
        remark={
          <>
            <Figure value={spanWords(booking, view.day, view.zone)} strong />
            {standing === 'next' && ` in ${untilWords(Date.parse(booking.startsAt) - nowMs)}`}
            {standing === 'now' && `, ${untilWords(Date.parse(booking.endsAt) - nowMs)} left`}, {untilWords(lengthMs)}{' '}
            booked
          </>
        }
      >
        {TITLES[standing]}
      </SectionHeading>
      <div className="mt-1 flex flex-wrap items-start justify-between gap-x-6 gap-y-2">
        <div className="min-w-0 flex-1 basis-72">
          <h3 className="t-section flex flex-wrap items-center gap-2">
            <Link prefetch={false} href={`/products/${product.id}`} className="text-ink hover:underline">
              {product.name} {product.code}
            </Link>
            {state && <StateTag label={state.label} planned={state.planned} />}
          </h3>
          <IdentityLine>
            <span>{organisation.name}</span>
            <span>
              job{' '}
              <Link prefetch={false} href={`/jobs/${job.id}`} className="t-id text-pen">
                {job.number}
              </Link>
            </span>
            <span>
              sample{' '}
              <Link prefetch={false} href={`/samples/${sample.id}`} className="t-id text-pen">
                {sample.code}
              </Link>
            </span>
            <span>
              serial <Id>{sample.serial}</Id>
            </span>
          </IdentityLine>
          <p className="t-detail mt-1">
            {capitalised(work)} at position {position.code}, {position.name}, {own ? 'by you' : `by ${technician.name}`}
            . {state && `${state.label}: ${state.description}${state.planned ? ', planned and not fitted yet' : ''}. `}
            {openRetests > 0 &&
              `${formatCount(openRetests)} ${openRetests === 1 ? 'retest is' : 'retests are'} open for it. `}
            {place
              ? `${sample.code} is at ${place.place} since ${formatDayTime(place.at, view.zone)}.`
              : `Nobody has said where ${sample.code} is.`}
          </p>
        </div>
        {upload && (
          <ButtonLink
            kind={choices ? 'plain' : 'primary'}
            keyName={fitted ? 'S' : 'U'}
            href={fitted ? `/sweeps/new?state=${state.id}` : '/sweeps/new'}
          >
            {fitted ? `Start a run of ${product.code} ${state.label}` : 'Upload sweep files'}
          </ButtonLink>
        )}
      </div>
      {clashes.length > 0 && (
        <Message tone="over" lead={clashes.join(' ')}>
          {choices
            ? 'Move it, give it to somebody else, or cancel it with a reason.'
            : 'A manager moves or cancels it.'}
        </Message>
      )}
      <div className="mt-3">
        <InPlace size="table" acts={[...(move ? [custody] : []), ...(choices ? changes(choices) : [])]} />
      </div>
    </section>
  );
}
