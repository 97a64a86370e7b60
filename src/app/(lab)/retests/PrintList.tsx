import { formatFrequencyMhz } from '@/format/frequencies';
import {
  ABSENT,
  formatAzimuth,
  formatDb,
  formatHeight,
  formatMargin,
  formatTrimmed,
  unitLabel,
} from '@/format/quantities';
import { DETECTOR_WORDS } from '@/format/words';
import type { RetestItem } from '@/schemas/retest';
import { placeWords, stillIn } from './retestWords';

/** The frequency list on paper: what to tune to, what was read last, and room to write. Only a printer shows it. */
export function PrintList({ items }: { items: readonly RetestItem[] }) {
  const listed = items.filter(({ kind }) => kind !== 'repeat-prescan');
  const repeats = items.filter(({ kind, status }) => kind === 'repeat-prescan' && status !== 'cleared');
  return (
    <div className="retest-print" aria-hidden>
      <table>
        <thead>
          <tr>
            {['Ref', 'Sample', 'Measure', 'MHz', 'Detector', 'RBW kHz', 'Limit', 'Last', 'Margin dB', 'm', '°'].map(
              (head) => (
                <th key={head}>{head}</th>
              ),
            )}
            <th className="retest-print-room">Reading</th>
            <th className="retest-print-room">At m, °</th>
          </tr>
        </thead>
        <tbody>
          {listed.map((item) => (
            <tr key={item.id}>
              <td>{item.number}</td>
              <td>
                {item.sample.code} {item.state.label}
              </td>
              <td>{stillIn(item) ?? placeWords(item)}</td>
              <td>
                {item.kind === 'floor'
                  ? `${formatFrequencyMhz(item.fromHz!)}–${formatFrequencyMhz(item.toHz!)}`
                  : formatFrequencyMhz(item.frequencyHz!)}
              </td>
              <td>{item.line ? DETECTOR_WORDS[item.line.detector] : ABSENT}</td>
              <td>{item.line ? formatTrimmed(item.line.bandwidthHz / 1e3, 3) : ABSENT}</td>
              <td>{item.limit === null ? ABSENT : `${formatDb(item.limit)} ${unitLabel(item.line!.unit)}`}</td>
              <td>{item.level === null ? ABSENT : formatDb(item.level)}</td>
              <td>{item.marginDb === null ? ABSENT : formatMargin(item.marginDb)}</td>
              <td>{item.heightM === null ? ABSENT : formatHeight(item.heightM)}</td>
              <td>{item.azimuthDeg === null ? ABSENT : formatAzimuth(item.azimuthDeg)}</td>
              <td />
              <td />
            </tr>
          ))}
        </tbody>
      </table>
      {repeats.length > 0 && (
        <p>
          And the prescan again of{' '}
          {repeats.map((item) => `${item.sample.code} ${item.state.label}, ${placeWords(item)}`).join('; ')}.
        </p>
      )}
      <p>
        Pre-compliance record, not a certificate. Mains networks and RF fields can hurt: work by your local codes and
        with the licences they ask for.
      </p>
    </div>
  );
}
