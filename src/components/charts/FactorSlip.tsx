import type { WorkingView } from '@/schemas/sweep';
import { formatFrequencyMhz } from '@/format/frequencies';
import { formatDb, formatFigure, formatTrimmed } from '@/format/quantities';
import { FORCED } from './chartText';

type FactorRows = NonNullable<WorkingView['terms'][number]['table']>;

interface Props {
  table: FactorRows;
  frequencyHz: number;
  /** The interpolated factor, dB. */
  factorDb: number;
}

const LEFT = 28;
const RIGHT = 77;
const UPPER_PX = 44;
const LOWER_PX = 64;
const FLOOR_PX = 80;
/** A longer name leaves no room for more beside `log f`; the figure's name says it all the same. */
const LONG_NAME = 22;

/**
 * A pasted slip: the two table rows a factor lies between and the point on the straight line over log f. Nothing is
 * drawn beyond the rows. Positions across are shares of the width, so the slip fits its column.
 */
export function FactorSlip({ table, frequencyHz, factorDb }: Props) {
  const { lowerHz, upperHz, lowerDb, upperDb } = table;
  const onRow = lowerHz === upperHz;
  const share = onRow ? 0.5 : Math.log(frequencyHz / lowerHz) / Math.log(upperHz / lowerHz);
  const x = LEFT + share * (RIGHT - LEFT);
  const rising = upperDb > lowerDb;
  const level = upperDb === lowerDb;
  const [startY, endY] = level ? [54, 54] : rising ? [LOWER_PX, UPPER_PX] : [UPPER_PX, LOWER_PX];
  const y = onRow ? 54 : startY + share * (endY - startY);
  const name = onRow
    ? `${table.name}: the row at ${mhz(frequencyHz)} MHz, ${formatDb(factorDb)} dB`
    : `${table.name}: ${formatFigure(factorDb, 2)} dB at ${formatFrequencyMhz(frequencyHz)} MHz, between ${formatDb(lowerDb)} dB at ${mhz(lowerHz)} MHz and ${formatDb(upperDb)} dB at ${mhz(upperHz)} MHz, straight over log f`;
  // Its own figure keeps clear of the row figures at either end.
  const figureLeft = share > 0.62;
  return (
    <figure className={`border border-rule2 bg-sheet ${FORCED}`} aria-label={name}>
      <svg width="100%" height="100" aria-hidden="true" className="block text-[12px]">
        <text x="8" y="19" fontWeight="600" className="fill-ink">
          {table.name}
          {onRow || table.name.length > LONG_NAME ? '' : ', between table rows'}
        </text>
        {onRow ? null : (
          <>
            <line x1={`${LEFT}%`} y1={startY} x2={`${RIGHT}%`} y2={endY} className="stroke-ink" strokeWidth="1.6" />
            <Row x={LEFT} y={startY} db={lowerDb} hz={lowerHz} dx={-3} unit="" />
            <Row x={RIGHT} y={endY} db={upperDb} hz={upperHz} dx={3} unit=" MHz" />
          </>
        )}
        <line x1="8%" x2="95%" y1={FLOOR_PX} y2={FLOOR_PX} className="stroke-rule2" />
        <line
          x1={`${x}%`}
          x2={`${x}%`}
          y1={y + 5}
          y2={FLOOR_PX}
          className="stroke-pen"
          strokeWidth="1.2"
          strokeDasharray="2 3"
        />
        <circle cx={`${x}%`} cy={y} r="4" className="fill-sheet stroke-pen" strokeWidth="1.8" />
        <text
          x={`${x}%`}
          dx={figureLeft ? -7 : 7}
          y={figureLeft === rising ? y - 7 : y - 5}
          textAnchor={figureLeft ? 'end' : 'start'}
          fontWeight="600"
          className="t-figure fill-pen"
        >
          {formatFigure(factorDb, 2)}
        </text>
        <text
          x={`${x}%`}
          dx={figureLeft ? -7 : 7}
          y={FLOOR_PX - 4}
          textAnchor={figureLeft ? 'end' : 'start'}
          className="t-figure fill-pen"
        >
          {formatFrequencyMhz(frequencyHz)}
        </text>
        <text x="97%" y="19" textAnchor="end" className="fill-ink2">
          log <tspan className="italic">f</tspan>
        </text>
      </svg>
    </figure>
  );
}

const mhz = (hz: number) => formatTrimmed(hz / 1e6, 3);

function Row({ x, y, db, hz, dx, unit }: { x: number; y: number; db: number; hz: number; dx: number; unit: string }) {
  return (
    <>
      <svg x={`${x}%`} y={y} className="overflow-visible">
        <rect x="-3" y="-3" width="6" height="6" className="fill-ink" />
      </svg>
      <text x={`${x}%`} dx={dx} y={y - 8} textAnchor="middle" className="t-figure fill-ink2">
        {formatDb(db)}
      </text>
      <text x={`${x}%`} y={FLOOR_PX + 14} textAnchor="middle" className="t-figure fill-ink2">
        {mhz(hz)}
        {unit}
      </text>
    </>
  );
}
