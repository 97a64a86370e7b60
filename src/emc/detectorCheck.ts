import { detectorOrder } from './detectors';
import type { Interval } from './intervals';
import type { Detector, LineDetector } from './kinds';
import type { AverageKind, DetectorFinding, DetectorRelation } from './receiverFinding';

/**
 * Whether a reading in this detector may be compared with a line to show under: it is the line's own or reads at or
 * above it (average <= quasi-peak <= peak). Against a line in average the kind of average decides; where nobody stated
 * it that is unknown. Source: CISPR 16-1-1, detector definitions; the kinds of average from memory.
 */
export function detectorFinding(
  { fromHz, toHz }: Interval,
  detector: Detector,
  averageKind: AverageKind | null,
  asked: LineDetector,
): DetectorFinding {
  const relation = relationOf(detector, averageKind, asked);
  const usable = relation === 'same' || relation === 'at-or-above';
  return {
    what: 'detector',
    fromHz,
    toHz,
    outcome: relation === null ? 'unknown' : usable ? 'ok' : 'fails',
    figures: { detector, averageKind, asked, relation },
    because: relation !== null ? null : detector === 'unknown' ? 'The detector is not known.' : WHICH_AVERAGE,
    source: 'CISPR 16-1-1, detector definitions',
  };
}

const WHICH_AVERAGE = 'Whether a linear or a CISPR average was read is not stated; they differ on slow pulses.';

function relationOf(detector: Detector, kind: AverageKind | null, asked: LineDetector): DetectorRelation | null {
  if (detector === 'unknown') return null;
  const order = detectorOrder(detector);
  if (order === null) return 'none';
  const ahead = order - detectorOrder(asked)!;
  if (ahead !== 0) return ahead > 0 ? 'at-or-above' : 'at-or-below';
  if (detector !== 'average') return 'same';
  return kind === null ? null : kind === 'cispr' ? 'same' : 'at-or-below';
}
