const UNITS: Record<string, number> = { hz: 1, khz: 1e3, mhz: 1e6, ghz: 1e9 };

/**
 * A frequency as someone types it: `12`, `12.000 MHz`, `65 kHz`, `24,576`. MHz where no unit is said.
 * @returns Hz, or null when it is no positive frequency
 */
export function parseFrequency(text: string): number | null {
  const match = /^(\d+(?:[.,]\d+)?|[.,]\d+)\s*([kmg]?hz)?$/i.exec(text.trim());
  if (!match) return null;
  const hz = Number(match[1]!.replace(',', '.')) * (UNITS[(match[2] ?? 'mhz').toLowerCase()] ?? 1e6);
  return Number.isFinite(hz) && hz > 0 ? hz : null;
}
