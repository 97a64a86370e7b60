import Link from 'next/link';
import { Figure } from '@/components/ui/Figure';
import { formatDay, formatDayTime } from '@/format/dates';
import { formatBandwidth } from '@/format/frequencies';
import { formatAzimuth, formatHeight, formatLevel, formatMargin, formatMarginDb } from '@/format/quantities';
import { capitalised, DETECTOR_WORDS } from '@/format/words';
import type { RetestItem, RetestView } from '@/schemas/retest';
import { changeWords, placeWords, STATUS_WORDS, stillIn } from './retestWords';

/** What is known of a retest and what it asks for. */
export function RetestRecord({ item }: { item: RetestItem }) {
  const { line, run, carriedFrom, sample, state } = item;
  const still = stillIn(item);
  return (
    <div>
      <p>
        <strong className="font-semibold">{capitalised(STATUS_WORDS[item.status])}</strong>: {item.statusReason}.
      </p>
      {item.scheduledOn && <p>Placed on {formatDay(item.scheduledOn)}.</p>}
      {item.because && item.status === 'waiting' && <p className="column-quiet">{item.because}</p>}
      <p>
        <Link prefetch={false} href={`/samples/${sample.id}`} className="t-id text-pen">
          {sample.code}
        </Link>{' '}
        {state.label}, {placeWords(item)}
        {still && `; still to be measured: ${still}`}
      </p>
      {line && (
        <>
          <p>
            Measure {DETECTOR_WORDS[line.detector]} in <Figure value={formatBandwidth(line.bandwidthHz)} />
          </p>
          <p className="column-quiet">{line.name}</p>
          <p>
            Last <Figure value={formatLevel(item.level!, line.unit)} />, limit{' '}
            <Figure value={formatLevel(item.limit!, line.unit)} />:{' '}
            <Figure value={formatMarginDb(item.marginDb!)} strong />
          </p>
        </>
      )}
      {(item.heightM !== null || item.azimuthDeg !== null) && (
        <p>
          Read worst
          {item.heightM !== null && (
            <>
              {' '}
              at <Figure value={formatHeight(item.heightM)} unit="m" />
            </>
          )}
          {item.azimuthDeg !== null && (
            <>
              , <Figure value={formatAzimuth(item.azimuthDeg)} />°
            </>
          )}
        </p>
      )}
      {run && (
        <p>
          from run{' '}
          <Link prefetch={false} href={`/sweeps/${run.id}`} className="t-id text-pen">
            {run.number}
          </Link>
        </p>
      )}
      {carriedFrom && (
        <p className="column-quiet">
          Carried from {carriedFrom.state}, <span className="t-id">{carriedFrom.number}</span>
        </p>
      )}
    </div>
  );
}

/** Every change with its person, time, reason and run, newest first. */
export function RetestHistory({ retest, zone }: { retest: RetestView; zone: string }) {
  return (
    <ol>
      {retest.changes.map((change, at) => (
        <li key={at}>
          {changeWords(change)}: {change.reason}
          {change.scheduledOn && `, for ${formatDay(change.scheduledOn)}`}
          {moved(change)}
          <span className="column-quiet block">
            {change.by.name}, {formatDayTime(change.at, zone)}
            {change.run && (
              <>
                ,{' '}
                <Link prefetch={false} href={`/sweeps/${change.run.id}`} className="t-id text-pen">
                  {change.run.number}
                </Link>
              </>
            )}
          </span>
        </li>
      ))}
    </ol>
  );
}

/** `, 2.0 under to 6.2 over`, where the margin moved by what a reader can see. */
function moved({ marginFromDb: before, marginToDb: now }: RetestView['changes'][number]): string {
  if (before === null || now === null || formatMargin(before) === formatMargin(now)) return '';
  return `, ${formatMargin(before)} to ${formatMargin(now)}`;
}
