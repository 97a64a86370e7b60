import { wallOf } from '@/schemas/labTime';
import { SEARCHED_DAYS, type Clash } from './bookingSlots';
import type { WholeBooking } from './bookingViews';
import { stateLabel } from './samples';

interface Found {
  shared: Clash['shared'];
  booking: Pick<WholeBooking, 'startsAt' | 'endsAt' | 'position' | 'technician' | 'sample' | 'modification'>;
}

const MONTHS = 'Jan Feb Mar Apr May Jun Jul Aug Sep Oct Nov Dec'.split(' ');

function dayWords(day: string): string {
  const [year, month, date] = day.split('-').map(Number);
  return `${date} ${MONTHS[month! - 1]} ${year}`;
}

/** `1 Dec 2026, 13:00 to 15:30`; with both days where it crosses midnight. */
function spanWords(startsAt: Date, endsAt: Date, zone: string): string {
  const [from, to] = [wallOf(startsAt, zone), wallOf(endsAt, zone)];
  const until = from.day === to.day ? to.time : `${dayWords(to.day)}, ${to.time}`;
  return `${dayWords(from.day)}, ${from.time} to ${until}`;
}

/**
 * What is shared, when and with whom, and when there is room: for the lab's own people only.
 * `Position A, 3 m chamber, is taken 1 Dec 2026, 13:00 to 15:30 by TP-9 M0 with Ewan Dray. …`
 */
export function clashWords(found: readonly Found[], free: Date | null, zone: string): string {
  const sentences = found.map(({ shared, booking }) => {
    const { position, technician, sample, modification } = booking;
    const state = modification ? ` ${stateLabel(modification.position)}` : '';
    const what = `${sample.job.product.code}${state} (${sample.code})`;
    const when = spanWords(booking.startsAt, booking.endsAt, zone);
    return shared === 'position'
      ? `Position ${position.code}, ${position.name}, is taken ${when} by ${what} with ${technician.name}.`
      : `${technician.name} is booked ${when} at position ${position.code}, ${position.name}, for ${what}.`;
  });
  const next = free && wallOf(free, zone);
  const room = next
    ? `Position and person are next free together for as long from ${dayWords(next.day)}, ${next.time}.`
    : `They are not free together for as long within ${SEARCHED_DAYS} days.`;
  return [...sentences, room].join(' ');
}
