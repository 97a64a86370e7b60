import Link from 'next/link';
import type { ReactNode } from 'react';
import type { MarginSection } from '@/components/shell/marginSection';
import { formatDay, formatDayTime } from '@/format/dates';
import { formatCount } from '@/format/quantities';
import type { FactorTableView } from '@/schemas/tables';

/** What stands behind one revision: where it is from, who entered it and why, which paths and runs use it. */
export function tableSections(table: FactorTableView | null, zone: string): MarginSection[] {
  if (!table) return [];
  return [
    {
      id: 'record',
      title: 'This revision',
      subject: `${table.revision} of ${table.name}`,
      children: <RevisionRecord table={table} zone={zone} />,
    },
    {
      id: 'used',
      title: 'Used by',
      remark: table.runs.count === 1 ? '1 run' : `${formatCount(table.runs.count)} runs`,
      count: table.runs.count,
      children: <Uses table={table} />,
    },
  ];
}

function RevisionRecord({ table, zone }: { table: FactorTableView; zone: string }) {
  const { calibration, file } = table;
  return (
    <>
      <dl className="column-pair">
        <Pair name="Source">{table.source}</Pair>
        {calibration && (
          <>
            <Pair name="Certificate">{calibration.certificate}</Pair>
            <Pair name="By">{calibration.laboratory}</Pair>
            <Pair name="Calibrated">{formatDay(calibration.calibratedOn)}</Pair>
            <Pair name="Due">{calibration.dueOn ? formatDay(calibration.dueOn) : 'no due date'}</Pair>
          </>
        )}
        <Pair name="Entered">
          {formatDayTime(table.enteredAt, zone)}
          {table.enteredBy && `, ${table.enteredBy.name}`}
        </Pair>
        {table.reason && <Pair name="Reason">{table.reason}</Pair>}
        {file && (
          <Pair name="File">
            {file.name}
            <span className="column-quiet block">SHA-256 {file.sha256.slice(0, 16)}…</span>
          </Pair>
        )}
      </dl>
      <p className="mt-[22px]">
        <a href={`/api/factor-tables/${table.id}/csv`} download className="text-pen underline">
          Download revision {table.revision} as CSV
        </a>
      </p>
    </>
  );
}

function Uses({ table }: { table: FactorTableView }) {
  const { paths, runs } = table;
  return (
    <>
      {paths.length === 0 && <p className="column-quiet">No signal path names it.</p>}
      <ul>
        {paths.map(({ id, code, name, revision, current }) => (
          <li key={`${id} ${revision}`}>
            path <span className="t-id">{code}</span> revision {revision}
            <span className="column-quiet block">
              {current ? `${name}; new runs use it` : `${name}; an earlier revision`}
            </span>
          </li>
        ))}
      </ul>
      {runs.count === 0 ? (
        <p className="column-quiet">No run was corrected with it.</p>
      ) : (
        <p>
          {runs.latest.map(({ id, number }, i) => (
            <span key={id}>
              {i > 0 && ', '}
              <Link href={`/sweeps/${id}`} className="t-id text-pen">
                {number}
              </Link>
            </span>
          ))}
          {runs.count > runs.latest.length && `, and ${formatCount(runs.count - runs.latest.length)} earlier`}
        </p>
      )}
    </>
  );
}

function Pair({ name, children }: { name: string; children: ReactNode }) {
  return (
    <>
      <dt>{name}</dt>
      <dd className="[overflow-wrap:anywhere]">{children}</dd>
    </>
  );
}
