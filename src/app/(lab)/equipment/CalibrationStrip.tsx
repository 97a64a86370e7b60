import type { EquipmentView } from '@/schemas/bench';
import { percentOf, type StripScale } from './calibrationScale';

type Dated = Pick<EquipmentView, 'calibratedOn' | 'dueOn' | 'due'>;

const HEIGHT = 32;
const MIDDLE = 16;
const inside = (percent: number) => Math.min(100, Math.max(0, percent));
const at = (percent: number) => `${percent.toFixed(2)}%`;

/** A line from the last calibration to its due date; lapsed time is dotted; the pen line is today. Decoration: the words stand beside it. */
export function CalibrationStrip({ item, scale }: { item: Dated; scale: StripScale }) {
  const today = percentOf(scale.today, scale);
  return (
    <svg width="100%" height={HEIGHT} className="block overflow-visible" aria-hidden="true">
      <line x1={at(today)} x2={at(today)} y1="-1" y2={HEIGHT + 1} className="stroke-pen" strokeWidth="1.4" />
      {item.calibratedOn && <Span item={item} from={percentOf(item.calibratedOn, scale)} scale={scale} />}
    </svg>
  );
}

function Span({ item, from, scale }: { item: Dated; from: number; scale: StripScale }) {
  const to = item.dueOn ? percentOf(item.dueOn, scale) : Infinity;
  const today = percentOf(scale.today, scale);
  return (
    <>
      <line
        x1={at(inside(from))}
        x2={at(inside(to))}
        y1={MIDDLE}
        y2={MIDDLE}
        className="stroke-ink"
        strokeWidth="1.5"
      />
      {from >= 0 && (
        <line x1={at(from)} x2={at(from)} y1={MIDDLE - 4} y2={MIDDLE + 4} className="stroke-ink" strokeWidth="1.5" />
      )}
      {item.due === 'lapsed' && (
        <line
          x1={at(inside(to))}
          x2={at(today)}
          y1={MIDDLE}
          y2={MIDDLE}
          className="stroke-madder"
          strokeWidth="1.6"
          strokeDasharray="1.6 3.2"
        />
      )}
      {to > 100 ? (
        <svg x="100%" y={MIDDLE - 4} width="8" height="8" overflow="visible">
          <path d="M-6 0L0 4L-6 8" fill="none" className="stroke-ink" strokeWidth="1.4" />
        </svg>
      ) : (
        to >= 0 && (
          <svg x={at(to)} y="0" width="8" height={HEIGHT} overflow="visible">
            <DueMark due={item.due} />
          </svg>
        )
      )}
    </>
  );
}

/** The same three positions as a verdict: under the line, across it, above it. */
function DueMark({ due }: { due: Dated['due'] }) {
  if (due === 'lapsed') return <rect x="-4" y={MIDDLE - 10} width="8" height="8" className="fill-madder" />;
  if (due === 'due-soon')
    return (
      <rect x="-3.5" y={MIDDLE - 3.5} width="7" height="7" className="fill-sheet stroke-ochre" strokeWidth="1.6" />
    );
  return <rect x="-4" y={MIDDLE + 2} width="8" height="8" className="fill-kelp" />;
}

/** The head of the strips: months, and the flag of today where its line begins. */
export function StripHead({ scale }: { scale: StripScale }) {
  const today = percentOf(scale.today, scale);
  return (
    <svg width="100%" height="28" className="-mb-1.5 block overflow-visible" aria-hidden="true">
      {scale.ticks.map(({ percent, label }) => (
        <g key={percent}>
          <line x1={at(percent)} x2={at(percent)} y1="22" y2="28" className="stroke-ink3" strokeWidth="1" />
          {label && (
            <text
              x={at(percent)}
              y="15"
              fontSize="12"
              className="fill-ink3 font-mono tracking-[-0.02em] [word-spacing:-0.22em] max-wide:hidden"
            >
              {label}
            </text>
          )}
        </g>
      ))}
      <line x1={at(today)} x2={at(today)} y1="18" y2="30" className="stroke-pen" strokeWidth="1.4" />
      <svg x={at(today)} y="2" width="40" height="16" overflow="visible">
        <rect x="-19" y="0" width="38" height="16" className="fill-pen" />
        <text
          x="0"
          y="12"
          textAnchor="middle"
          fontSize="12"
          fontWeight="600"
          className="fill-sheet font-mono tracking-[-0.02em]"
        >
          today
        </text>
      </svg>
    </svg>
  );
}
