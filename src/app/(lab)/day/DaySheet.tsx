'use client';

import { useEffect, useState } from 'react';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { useKey } from '@/components/shell/keys';
import { Button, ButtonLink } from '@/components/ui/Button';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatShortDay, formatWeekday } from '@/format/dates';
import { formatCount } from '@/format/quantities';
import type { BookingChoices, DayView } from '@/schemas/day';
import { BookingForm } from './BookingForm';
import { ChosenBooking } from './ChosenBooking';
import { beforeSection, positionsSection } from './daySections';
import { DayTable } from './DayTable';
import { dayFinding, opensWith, standings } from './dayWords';
import { Lanes } from './Lanes';

interface Props {
  view: DayView;
  /** null for who may not book. */
  choices: BookingChoices | null;
  upload: boolean;
}

const TICK_MS = 30_000;

/** The lab's day: its finding, a lane per position, the chosen booking, and the same as a table. */
export function DaySheet({ view, choices, upload }: Props) {
  const nowMs = useNow(view.now);
  const [asked, setAsked] = useState<string | null>(null);
  const [booking, setBooking] = useState(false);
  const stands = standings(view.bookings, nowMs, view.day === view.today);
  const chosen = view.bookings.find(({ id }) => id === asked) ?? opensWith(view.bookings, stands);
  const step = (by: 1 | -1) => {
    const at = view.bookings.findIndex(({ id }) => id === chosen?.id);
    const next = view.bookings[at + by];
    if (next) setAsked(next.id);
  };
  useKey('ArrowDown', () => step(1), { says: 'next booking', weak: true });
  useKey('ArrowUp', () => step(-1), { says: 'booking before', weak: true });
  const clashing = view.bookings.filter(({ clashes }) => clashes.length > 0);
  const nextClash = () => {
    const at = clashing.findIndex(({ id }) => id === chosen?.id);
    setAsked(clashing[(at + 1) % clashing.length]!.id);
  };
  useKey('!', nextClash, { says: 'next clash', when: clashing.length > 0 });
  const position = view.positions.find(({ id }) => id === chosen?.position.id) ?? null;
  const count = view.bookings.length;

  return (
    <Sheet
      header={
        <SheetHeader
          title={formatWeekday(view.day)}
          finding={dayFinding(view, nowMs, stands)}
          actions={
            choices &&
            choices.positions.length > 0 && (
              <Button kind="primary" keyName="B" aria-expanded={booking} onClick={() => setBooking(!booking)}>
                Book a position
              </Button>
            )
          }
        />
      }
      margin={[beforeSection(position), positionsSection(view.positions)]}
      marginLine={position ? `${position.code}, ${position.name}` : 'Positions'}
      keys={[
        { keys: ['ArrowLeft', 'ArrowRight'], does: 'days' },
        { keys: ['ArrowUp', 'ArrowDown'], does: 'bookings' },
        ...(clashing.length > 0 ? [{ keys: ['!'], does: 'next clash' }] : []),
        ...(choices ? [{ keys: ['B'], does: 'book' }] : []),
        { keys: ['?'], does: 'all keys' },
      ]}
    >
      {booking && choices && (
        <BookingForm view={view} choices={choices} onClose={() => setBooking(false)} onBooked={setAsked} />
      )}
      <DayNav view={view} />
      <Lanes view={view} nowMs={nowMs} stands={stands} chosen={chosen?.id ?? null} onChoose={setAsked} />
      {view.positions.length === 0 && (
        <EmptyLine lead="Enter the first test position." className="mt-3">
          On the lab’s server: npm run stillfield -- position-add A &quot;3 m chamber&quot;
        </EmptyLine>
      )}
      {chosen && (
        <ChosenBooking
          key={chosen.id}
          booking={chosen}
          standing={stands.get(chosen.id)!}
          view={view}
          nowMs={nowMs}
          choices={choices}
          upload={upload}
          move={upload}
        />
      )}
      <SectionHeading className="mt-6" remark={`${formatCount(count)} ${count === 1 ? 'booking' : 'bookings'}`}>
        Bookings
      </SectionHeading>
      <DayTable view={view} stands={stands} chosen={chosen?.id ?? null} onChoose={setAsked} />
      {count === 0 && (
        <EmptyLine lead={choices ? 'Book a position to fill this day.' : 'Nothing is booked on this day.'}>
          {choices
            ? 'A booking holds a position and a person for a sample, in quarters of an hour.'
            : 'A manager books positions; what is booked for you is marked.'}
        </EmptyLine>
      )}
    </Sheet>
  );
}

function DayNav({ view }: { view: DayView }) {
  return (
    <nav className="mt-1 flex flex-wrap items-center gap-x-3" aria-label="Days">
      <ButtonLink kind="quiet" size="table" keyName="ArrowLeft" href={`/day?day=${view.before}`}>
        <DayWords day={view.before} />
      </ButtonLink>
      {view.day !== view.today && (
        <ButtonLink kind="quiet" size="table" href="/day">
          Today
        </ButtonLink>
      )}
      <ButtonLink kind="quiet" size="table" keyName="ArrowRight" href={`/day?day=${view.after}`} className="ml-auto">
        <DayWords day={view.after} />
      </ButtonLink>
    </nav>
  );
}

/** In full at a desk, short where a phone has both on one line. */
function DayWords({ day }: { day: string }) {
  return (
    <>
      <span className="max-pad:hidden">{formatWeekday(day)}</span>
      <span className="pad:hidden">
        {formatWeekday(day).slice(0, 3)} {formatShortDay(day)}
      </span>
    </>
  );
}

/** The server's clock, carried on by the browser's own without trusting what it says of the hour. */
function useNow(serverNow: string): number {
  const [passedMs, setPassed] = useState(0);
  useEffect(() => {
    const started = performance.now();
    const tick = () => setPassed(performance.now() - started);
    tick();
    const timer = setInterval(tick, TICK_MS);
    return () => clearInterval(timer);
  }, [serverNow]);
  return Date.parse(serverNow) + passedMs;
}
