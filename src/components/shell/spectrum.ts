/** The decorative spectrum of the sign-in page: invented, the same on every request, drawn from 30 MHz to 1 GHz. */

export interface Spectrum {
  /** SVG path of the trace in a box of SPECTRUM_WIDTH × SPECTRUM_HEIGHT; its end is open. */
  trace: string;
  /** Emissions that hang from the line, as parts of the box (0 to 1). */
  hung: { x: number; y: number }[];
  /** Frequencies named on the floor, as parts of the width. */
  marks: { x: number; name: string }[];
}

export const SPECTRUM_WIDTH = 1440;
export const SPECTRUM_HEIGHT = 614;

const FROM_MHZ = 30;
const TO_MHZ = 1000;
const STEP_PX = 1.5;
const CLOCK_MHZ = 12;

/** Multiples of the clock, with how high their peaks stand above the floor, in the box's units. */
const PEAKS: Record<number, number> = Object.fromEntries(
  '3:165 4:135 5:106 6:82 7:112 8:58 9:72 10:78 11:110 12:176 13:216 14:154 15:76 17:140 18:74 20:178 22:74 26:122 30:76 34:70 40:78 46:56 52:50'
    .split(' ')
    .map((peak) => peak.split(':').map(Number) as [number, number]),
);
const HUNG = [12, 13, 14, 17, 20];
const MARKS_MHZ = [50, 100, 200, 300, 500];

const across = (megahertz: number) => Math.log(megahertz / FROM_MHZ) / Math.log(TO_MHZ / FROM_MHZ);
const bell = (distance: number, width: number) => Math.exp(-((distance / width) ** 2));

/** Where the noise lies at a part of the width: falling from the left, humped where a converter rings, rising at the end. */
function floorAt(x: number): number {
  return 486 - 22 * Math.min(1, x / 0.3) - 46 * bell(x - 0.468, 0.09) + 6 * bell(x - 0.7, 0.08) - 26 * x ** 8;
}

/** A linear congruential generator (Numerical Recipes constants): decoration wants repeatable, not random. */
function repeatable(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

export function spectrum(): Spectrum {
  const next = repeatable(2611);
  const peaks = Object.entries(PEAKS).map(([multiple, height]) => {
    const x = across(Number(multiple) * CLOCK_MHZ);
    return { multiple: Number(multiple), px: x * SPECTRUM_WIDTH, x, top: floorAt(x) - height };
  });
  const points: string[] = [];
  for (let px = 0; px <= SPECTRUM_WIDTH; px += STEP_PX) {
    const noise = (next() + next() + next() - 1.5) * 26;
    let y = floorAt(px / SPECTRUM_WIDTH) + noise;
    for (const peak of peaks) {
      const away = Math.abs(px - peak.px);
      if (away < 7) y = Math.min(y, peak.top + (y - peak.top) * (1 - bell(Math.max(0, away - STEP_PX / 2), 1.7)));
    }
    points.push(`${px} ${y.toFixed(1)}`);
  }
  const hung = peaks.filter(({ multiple }) => HUNG.includes(multiple));
  return {
    trace: `M${points.join('L')}`,
    hung: hung.map(({ x, top }) => ({ x, y: top / SPECTRUM_HEIGHT })),
    marks: MARKS_MHZ.map((megahertz) => ({ x: across(megahertz), name: String(megahertz) })),
  };
}
