import Link from 'next/link';
import { StateTag } from '@/components/ui/StateTag';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatCount } from '@/format/quantities';
import type { DayBooking, DayView } from '@/schemas/day';
import { spanWords, type Standing } from './dayWords';

const WIDE = 'max-pad:hidden';
const STANDING_WORDS: Record<Standing, string> = { done: 'done', now: 'running', next: 'next', later: 'to come' };

/** The same bookings as the lanes, in the order they begin: what a screen reader, a printer and a phone read. */
export function DayTable({
  view,
  stands,
  chosen,
  onChoose,
}: {
  view: DayView;
  stands: Map<string, Standing>;
  chosen: string | null;
  onChoose: (id: string) => void;
}) {
  return (
    <Table caption="Bookings of this day" className="max-pad:[&_td]:align-top max-pad:[&_th]:align-top">
      <TableHead>
        <HeadCell>Time</HeadCell>
        <HeadCell className={WIDE}>Position</HeadCell>
        <HeadCell>Sample</HeadCell>
        <HeadCell className={WIDE}>Work</HeadCell>
        <HeadCell className={WIDE}>Technician</HeadCell>
        <HeadCell className={WIDE}>Job</HeadCell>
        <HeadCell>So far</HeadCell>
      </TableHead>
      <tbody>
        {view.bookings.map((booking) => (
          <Row key={booking.id} chosen={booking.id === chosen}>
            <KeyCell className="whitespace-nowrap max-pad:py-1">
              <button
                type="button"
                className="t-figure text-pen hover:underline max-pad:min-h-11 max-pad:whitespace-normal"
                aria-pressed={booking.id === chosen}
                onClick={() => onChoose(booking.id)}
              >
                {spanWords(booking, view.day, view.zone)}
              </button>
            </KeyCell>
            <Cell className={WIDE} quiet>
              {booking.position.code}, {booking.position.name}
            </Cell>
            <Cell className="max-pad:py-2.5">
              <span className="whitespace-nowrap">
                <Link prefetch={false} href={`/samples/${booking.sample.id}`} className="font-semibold text-pen">
                  {booking.product.code}
                </Link>{' '}
                {booking.state && <StateTag label={booking.state.label} planned={booking.state.planned} />}
              </span>
              <span className="t-detail block pad:hidden">
                {booking.position.code}, {booking.work}, {whoOf(booking)}
              </span>
            </Cell>
            <Cell className={WIDE}>{booking.work}</Cell>
            <Cell className={WIDE} strong={booking.own} quiet={!booking.own}>
              {booking.own ? `${booking.technician.name}, you` : booking.technician.name}
            </Cell>
            <Cell className={WIDE} quiet>
              <span className="t-id">{booking.job.number}</span>
            </Cell>
            <Cell className="max-pad:py-2.5">
              <SoFar booking={booking} standing={stands.get(booking.id)!} />
            </Cell>
          </Row>
        ))}
      </tbody>
    </Table>
  );
}

const whoOf = ({ own, technician }: DayBooking) => (own ? 'you' : technician.name);

function SoFar({ booking: { verdict, runs, clashes }, standing }: { booking: DayBooking; standing: Standing }) {
  if (clashes.length > 0) return <span className="text-madder">{clashes.join(' ')}</span>;
  if (!verdict) return <span className="text-ink2">{STANDING_WORDS[standing]}</span>;
  return (
    <>
      <VerdictWord verdict={verdict} />{' '}
      <span className="text-ink2 max-wide:hidden">
        in {formatCount(runs)} {runs === 1 ? 'run' : 'runs'}
      </span>
    </>
  );
}
