import type { LimitLineView } from '@/schemas/sweep';
import published from '@fixtures/published/limits.json';

/** A line of fixtures/published/limits.json as the API answers it. */
export function publishedLine(id: string): LimitLineView {
  const found = published.lines.find((line) => line.id === id);
  if (!found) throw new Error(`no published line ${id}`);
  return {
    id: id
      .replace(/[^0-9a-z]/g, '')
      .padEnd(16, '0')
      .slice(0, 16),
    name: found.document,
    document: found.document,
    source: found.source,
    basis: found.basis,
    revision: 1,
    detector: found.detector as LimitLineView['detector'],
    bandwidthHz: found.bandwidthHz,
    unit: found.limitUnit as LimitLineView['unit'],
    distanceM: found.distanceM,
    segments: found.segments.map((part) => ({
      startHz: part.startMHz * 1e6,
      stopHz: part.stopMHz * 1e6,
      startLimit: part.startLimit,
      stopLimit: part.stopLimit,
      over: part.shape.includes('linear frequency') ? 'linear-frequency' : 'log-frequency',
    })),
  };
}
