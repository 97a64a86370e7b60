/** Mulberry32, a small generator with a period long enough for noise that does not repeat within a file. */
function noise(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
}

/**
 * A peak and an average trace of 30 to 1000 MHz: a floor that wanders by 3 dB, and a harmonic of 4.97 MHz every so
 * often, each as wide as a receiver's filter shows it.
 */
export function sweepText(points: number): string {
  const random = noise(points);
  const step = 970e6 / (points - 1);
  const rows = Array.from({ length: points }, (_, i) => {
    const hz = 30e6 + i * step;
    const away = Math.abs(hz - Math.round(hz / 4.97e6) * 4.97e6);
    const line = 26 * Math.exp(-((away / 60e3) ** 2));
    const peak = 20 + 3 * random() + line;
    return `${hz.toFixed(1)},${peak.toFixed(3)},${(peak - 4 - 3 * random()).toFixed(3)}`;
  });
  return `RBW,120 kHz\nFrequency (Hz),Peak (dBuV),Average (dBuV)\n${rows.join('\n')}\n`;
}
