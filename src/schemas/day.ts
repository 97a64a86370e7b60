import type { BookingView, PositionView } from './booking';
import type { SweepView } from './sweep';

/** A booking on its day, with what is known of it by now. */
export interface DayBooking extends BookingView {
  /** The reader's own. */
  own: boolean;
  /** The worst verdict of the runs measured within it, when any were; trials, voided and ambient runs say nothing. */
  verdict: SweepView['evaluation']['verdict'] | null;
  runs: number;
  /** Waiting or scheduled for its state, or for any state of its sample where none is named. */
  openRetests: number;
  /** What came up after it was booked and stands in its way, as sentences; of one that is over there is none. */
  clashes: string[];
  /** Where its sample was last said to be, and since when; null while nobody has said. */
  place: { place: string; at: string } | null;
}

/** One day of the lab: every position with what is booked there. */
export interface DayView {
  /** `2026-12-01`, in the lab's zone. */
  day: string;
  zone: string;
  now: string;
  today: string;
  before: string;
  after: string;
  /** First instant of the day and of the next: 23, 24 or 25 hours apart. */
  from: string;
  to: string;
  /** By their codes; retired ones only where something is booked that day. */
  positions: PositionView[];
  /** In the order they begin. */
  bookings: DayBooking[];
}

/** What a manager chooses from when booking. */
export interface BookingChoices {
  positions: { id: string; word: string }[];
  people: { id: string; name: string }[];
  samples: { id: string; word: string; states: { id: string; word: string }[] }[];
}
