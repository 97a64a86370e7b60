import type { SweepView } from '@/schemas/sweep';

/** `radiated at 3 m, horizontal`, `mains, line L`. */
export function runWords(sweep: Pick<SweepView, 'port' | 'distanceM' | 'polarisation' | 'line' | 'purpose'>): string {
  const parts: string[] = [];
  if (sweep.port === 'enclosure') {
    parts.push(sweep.distanceM === null ? 'radiated' : `radiated at ${sweep.distanceM} m`);
    if (sweep.polarisation) parts.push(sweep.polarisation);
  } else {
    parts.push(sweep.port === 'ac-mains' ? 'mains' : 'wired network');
    if (sweep.line) parts.push(`line ${sweep.line}`);
  }
  return parts.join(', ');
}

/** What stands beside a detector in a tooltip: H, V, L, N, L1… */
export function orientationOf(sweep: Pick<SweepView, 'polarisation' | 'line'>): string {
  if (sweep.polarisation) return sweep.polarisation === 'horizontal' ? 'H' : 'V';
  return sweep.line ?? '';
}
