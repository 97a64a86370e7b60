'use client';

import { Fragment, useEffect, useRef } from 'react';
import { VerdictGlyph } from '@/components/ui/VerdictGlyph';
import { classes } from '@/components/ui/classes';
import { formatTime } from '@/format/dates';
import { VERDICT_WORDS } from '@/format/words';
import type { DayBooking, DayView } from '@/schemas/day';
import { spanWords, type Standing } from './dayWords';
import { laneScale, percentAt, type LaneScale } from './laneScale';
import './lanes.css';

interface Props {
  view: DayView;
  nowMs: number;
  stands: Map<string, Standing>;
  chosen: string | null;
  onChoose: (id: string) => void;
}

/** Percent of the width that the flag of now takes to each side; an hour below it is not written. */
const FLAG_REACH = 4.5;

const at = (percent: number) => `${percent.toFixed(3)}%`;

/** Each position is a line; bookings are slips that hang on two threads from it, across an hour ruler. */
export function Lanes({ view, nowMs, stands, chosen, onChoose }: Props) {
  const scale = laneScale(view);
  const now = view.day === view.today ? nowMs : null;
  const frame = useRef<HTMLDivElement>(null);
  const inside = now !== null && now >= scale.fromMs && now <= scale.toMs;
  const shown = view.bookings.find(({ id }) => id === chosen);
  const middle = shown ? percentAt(shown.startsAt, scale) : inside ? percentAt(now, scale) : 0;
  useEffect(() => {
    // Where the lanes are wider than a phone, what the sheet opens with comes into view.
    const element = frame.current;
    if (element) element.scrollLeft = (element.scrollWidth - element.clientWidth) * (middle / 100);
  }, [middle]);
  return (
    <div
      ref={frame}
      className="lanes-frame"
      role="group"
      aria-label="Positions over the hours; the table below says the same"
      {...(view.bookings.length === 0 && { tabIndex: 0 })}
    >
      <div className="lanes">
        <span className="lane-name" />
        <Ruler scale={scale} now={now} inside={inside} zone={view.zone} />
        {view.positions.map((position) => (
          <Fragment key={position.id}>
            <span className="lane-name">
              <strong>{position.name}</strong>
              <span className="lane-code">
                position {position.code}
                {position.state === 'retired' && ', retired'}
              </span>
            </span>
            <svg className="lane" width="100%" height="62" aria-hidden={view.bookings.length === 0 || undefined}>
              {scale.hours.map(({ percent }) => (
                <line key={percent} x1={at(percent)} x2={at(percent)} y1="0" y2="100%" className="stroke-rule" />
              ))}
              {view.bookings
                .filter((booking) => booking.position.id === position.id)
                .map((booking) => (
                  <Slip
                    key={booking.id}
                    booking={booking}
                    view={view}
                    scale={scale}
                    standing={stands.get(booking.id)!}
                    chosen={booking.id === chosen}
                    onChoose={onChoose}
                  />
                ))}
              <line x1="0" x2="100%" y1="1" y2="1" className="stroke-ink" strokeWidth="1.5" />
              {inside && <NowLine percent={percentAt(nowMs, scale)} />}
            </svg>
          </Fragment>
        ))}
      </div>
    </div>
  );
}

function NowLine({ percent }: { percent: number }) {
  return <line x1={at(percent)} x2={at(percent)} y1="0" y2="100%" className="lane-now" strokeWidth="1.4" />;
}

/** Hours above a line of quarter ticks, with the flag of now; outside the hours the flag stays at the nearer end. */
function Ruler({ scale, now, inside, zone }: { scale: LaneScale; now: number | null; inside: boolean; zone: string }) {
  const flag = now === null ? null : percentAt(now, scale);
  return (
    <svg className="lane-ruler" width="100%" height="34" aria-hidden>
      {scale.quarters.map((percent) => (
        <line key={percent} x1={at(percent)} x2={at(percent)} y1="22" y2="26" className="stroke-ink3" strokeWidth="1" />
      ))}
      {scale.hours.map(({ percent, label }) => (
        <Fragment key={percent}>
          <line x1={at(percent)} x2={at(percent)} y1="18" y2="34" className="stroke-ink3" strokeWidth="1" />
          {label && !(flag !== null && Math.abs(flag - percent) < FLAG_REACH) && (
            <text x={at(percent)} y="12" textAnchor="middle" className="lane-hour">
              {label}
            </text>
          )}
        </Fragment>
      ))}
      <line x1="0" x2="100%" y1="26" y2="26" className="stroke-ink" strokeWidth="1" />
      {flag !== null && (
        <>
          {inside && <NowLine percent={flag} />}
          <svg x={at(flag)} y="0" width="1" height="17" overflow="visible">
            <g transform={flag < 3 ? 'translate(24 0)' : flag > 97 ? 'translate(-24 0)' : undefined}>
              <rect x="-24" y="0" width="48" height="17" className="fill-pen" />
              <text x="0" y="13" textAnchor="middle" className="lane-flag">
                {formatTime(new Date(now!), zone)}
              </text>
            </g>
          </svg>
        </>
      )}
    </svg>
  );
}

interface SlipProps {
  booking: DayBooking;
  view: DayView;
  scale: LaneScale;
  standing: Standing;
  chosen: boolean;
  onChoose: (id: string) => void;
}

function Slip({ booking, view, scale, standing, chosen, onChoose }: SlipProps) {
  const { id, product, state, work, technician, own, verdict, position, clashes } = booking;
  const [from, to] = [percentAt(booking.startsAt, scale), percentAt(booking.endsAt, scale)];
  const [before, beyond] = [booking.startsAt < view.from, booking.endsAt > view.to];
  const who = own ? 'you' : technician.name;
  const named = `${product.code}${state ? ` ${state.label}` : ''}`;
  const word = { done: verdict ? VERDICT_WORDS[verdict] : 'done', now: 'running', next: 'next', later: '' }[standing];
  const said = [
    spanWords(booking, view.day, view.zone),
    named,
    work,
    who,
    `position ${position.code}`,
    word,
    ...clashes,
  ];
  return (
    <svg x={at(from)} y="1" width={at(to - from)} height="60" overflow="visible">
      {!before && <line x1="7" x2="7" y1="0" y2="8" className="stroke-ink" strokeWidth="1" />}
      {!beyond && (
        <line x1="100%" x2="100%" y1="0" y2="8" transform="translate(-7 0)" className="stroke-ink" strokeWidth="1" />
      )}
      <foreignObject x="0" y="7" width="100%" height="46" className="lane-slip-place">
        <button
          type="button"
          className={classes(
            'lane-slip',
            `lane-slip-${standing}`,
            own && 'lane-slip-own',
            clashes.length > 0 && 'lane-slip-clash',
            before && 'lane-slip-before',
            beyond && 'lane-slip-beyond',
          )}
          aria-pressed={chosen}
          title={said.filter(Boolean).join(', ')}
          onClick={() => onChoose(id)}
        >
          <span className="lane-slip-head">
            <strong>{product.code}</strong>
            {state && <span className="t-figure">{state.label}</span>}
            <span className="lane-slip-mark">
              {standing === 'done' && verdict && <VerdictGlyph verdict={verdict} />}
              {clashes.length > 0 ? 'clash' : standing === 'next' && 'next'}
            </span>
          </span>
          <span className="lane-slip-work">
            {work}
            {standing === 'now' ? ', running' : `, ${own ? 'you' : technician.name.split(' ')[0]}`}
          </span>
          <span className="sr-only">{said.filter(Boolean).join(', ')}</span>
        </button>
      </foreignObject>
    </svg>
  );
}
