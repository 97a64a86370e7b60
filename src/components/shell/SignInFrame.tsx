import type { ReactNode } from 'react';
import { RoomToggle, type Room } from './RoomToggle';
import { spectrum, SPECTRUM_HEIGHT, SPECTRUM_WIDTH } from './spectrum';

export interface SignInFrameProps {
  /** `Sign in`, `Choose a new password`, `Accept the invitation`. */
  title: string;
  /** Whose record this is; null until a lab has been named. */
  labName: string | null;
  room: Room;
  /** The form: e-mail and password, the button with the reset link beside it. */
  children: ReactNode;
  /** Under a hairline at the foot of the slip. */
  foot?: ReactNode;
}

/** The first sight of the product: one line, the wordmark under it, and the form hanging on two threads. */
export function SignInFrame({ title, labName, room, children, foot }: SignInFrameProps) {
  return (
    <div className="signin">
      <SpectrumPicture />
      <div className="signin-line" />
      <header>
        <div className="signin-above">
          <p>A limit is a line. A quiet product stays under it.</p>
          <p>
            Bench PC in the chamber? <RoomToggle room={room} />
          </p>
        </div>
        <div className="signin-words">
          <p className="signin-word">Stillfield</p>
          <p className="signin-of">
            The working record of
            <br />
            <strong>{labName ?? 'your lab'}</strong>
          </p>
        </div>
      </header>
      <main className="signin-slip" id="sheet">
        <h1 className="signin-title">{title}</h1>
        {children}
        {foot && <div className="signin-foot">{foot}</div>}
      </main>
    </div>
  );
}

const DRAWN = spectrum();
const part = (share: number) => `${(share * 100).toFixed(2)}%`;

/** The trace stretches with the window; threads and squares keep their shape and only their places follow. */
function SpectrumPicture() {
  const ground = `${DRAWN.trace}V${SPECTRUM_HEIGHT}H0Z`;
  return (
    <svg className="signin-spectrum" aria-hidden>
      <svg width="100%" height="100%" viewBox={`0 0 ${SPECTRUM_WIDTH} ${SPECTRUM_HEIGHT}`} preserveAspectRatio="none">
        <path className="signin-ground" d={ground} />
        <path className="signin-trace" d={DRAWN.trace} />
      </svg>
      {DRAWN.hung.map(({ x, y }) => (
        <g key={x}>
          <line className="signin-thread" x1={part(x)} x2={part(x)} y1="0" y2={part(y)} />
          <rect
            className="signin-square"
            x={part(x)}
            y={part(y)}
            width="9"
            height="9"
            transform="translate(-4.5 -4.5)"
          />
        </g>
      ))}
      {DRAWN.marks.map(({ x, name }) => (
        <text key={name} className="signin-axis" x={part(x)} y="100%" dy="-20" textAnchor="middle">
          {name}
        </text>
      ))}
      <text className="signin-axis" x="6.67%" y="100%" dy="-20">
        MHz
      </text>
    </svg>
  );
}
